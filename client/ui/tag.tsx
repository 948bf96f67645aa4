import { clsx } from 'clsx';
import type { ElementType, ReactNode } from 'react';

/** The bag tag: a card with a punched hole, cut corners and a torn lower edge. */
export function Tag(props: {
  as?: ElementType;
  className?: string;
  cardClass?: string;
  label?: string;
  children: ReactNode;
}) {
  const Element = props.as ?? 'div';
  return (
    <Element className={clsx('tag', props.className)} aria-label={props.label}>
      <div className={clsx('tag-card flex flex-col pb-3', props.cardClass)}>{props.children}</div>
      <span aria-hidden="true" className="tag-eyelet" />
    </Element>
  );
}

/** The line beside the hole: what this tag is hung up for. */
export function TagHead({ children, end }: { children: ReactNode; end?: ReactNode }) {
  return (
    <div className="flex min-h-[4.25rem] items-center justify-between gap-3 pr-5 pl-16">
      <div className="text-lead leading-tight font-heavy text-spruce">{children}</div>
      {end}
    </div>
  );
}
