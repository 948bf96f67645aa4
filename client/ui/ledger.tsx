import type { ReactNode } from 'react';
import { formatDateTime } from '../lib/format-time.ts';

export interface LedgerEntry {
  key: string;
  at: string;
  who: string;
  what: ReactNode;
  from?: ReactNode;
  to?: ReactNode;
}

/** Dated lines: when, what, who, from → to. */
export function Ledger({ entries, label }: { entries: readonly LedgerEntry[]; label: string }) {
  return (
    <ol aria-label={label} className="border-t-2 border-ink">
      {entries.map((entry) => (
        <li
          key={entry.key}
          className="ledger-line grid gap-x-6 gap-y-0.5 py-2.5 sm:grid-cols-[11rem_1fr_auto]"
        >
          <time dateTime={entry.at} className="text-small text-soft sm:pt-px sm:text-base">
            {formatDateTime(entry.at)}
          </time>
          <span>
            {entry.what}
            <span className="text-soft"> · {entry.who}</span>
          </span>
          {entry.to !== undefined && entry.to !== null && (
            <span className="font-strong sm:text-right">
              {entry.from !== undefined && entry.from !== null && (
                <>
                  {entry.from} <span aria-label="to">→</span>{' '}
                </>
              )}
              {entry.to}
            </span>
          )}
        </li>
      ))}
    </ol>
  );
}
