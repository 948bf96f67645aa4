import { clsx } from 'clsx';
import { CircleAlert, Info, TriangleAlert } from 'lucide-react';
import type { ReactNode } from 'react';

export type NoticeTone = 'plain' | 'caution' | 'danger';

const tones = {
  plain: { box: 'border-spruce bg-wash', icon: Info, iconClass: 'text-spruce' },
  caution: {
    box: 'border-marigold bg-marigold-wash',
    icon: TriangleAlert,
    iconClass: 'text-marigold-ink',
  },
  danger: { box: 'border-brick bg-brick-wash', icon: CircleAlert, iconClass: 'text-brick' },
} as const;

/** A remark that must not be missed: its edge, its sign and its words say how grave it is. */
export function Notice(props: {
  tone?: NoticeTone;
  title?: ReactNode;
  children?: ReactNode;
  /** Read out at once by screen readers: for refusals that answer an action. */
  urgent?: boolean;
  className?: string;
}) {
  const tone = tones[props.tone ?? 'plain'];
  const Sign = tone.icon;
  return (
    <div
      role={props.urgent === true ? 'alert' : undefined}
      className={clsx('flex gap-3 border-l-[6px] px-4 py-3', tone.box, props.className)}
    >
      <Sign aria-hidden="true" className={clsx('mt-0.5 size-5 shrink-0', tone.iconClass)} />
      <div className="min-w-0">
        {props.title !== undefined && <div className="font-heavy">{props.title}</div>}
        {props.children !== undefined && <div>{props.children}</div>}
      </div>
    </div>
  );
}
