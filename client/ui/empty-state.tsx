import type { ReactNode } from 'react';

/** Nothing here yet: an empty tag on its hook, a sentence, and the next step. */
export function EmptyState(props: { title: string; children?: ReactNode; action?: ReactNode }) {
  return (
    <div className="flex flex-col items-start gap-4 py-8 sm:flex-row sm:items-center sm:gap-8">
      <svg aria-hidden="true" viewBox="0 0 96 120" className="w-20 shrink-0">
        <path d="M4 8H92" className="stroke-steel" strokeWidth="6" strokeLinecap="round" />
        <path d="M34 8V46" className="stroke-cord" strokeWidth="2" />
        <path
          d="M26 32H70L82 44V108C76 112 70 107 63 109C56 112 50 107 43 109C36 112 30 107 23 109C19 110 16 110 14 108V44Z"
          className="fill-card stroke-soft"
          strokeWidth="1.5"
          strokeDasharray="4 3"
        />
        <circle cx="34" cy="47" r="5" className="fill-paper stroke-soft" strokeWidth="1.5" />
      </svg>
      <div className="flex flex-col items-start gap-3">
        <p className="text-title font-strong">{props.title}</p>
        {props.children !== undefined && <div className="max-w-prose">{props.children}</div>}
        {props.action}
      </div>
    </div>
  );
}
