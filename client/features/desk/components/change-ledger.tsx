import { formatDateTime } from '../../../lib/format-time.ts';
import { bindUnits } from '../../../lib/spaces.ts';

interface Change {
  at: string;
  who: string;
  what: string;
  from: string | null;
  to: string | null;
}

/** Dated lines for a narrow column: what, then from → to, then when and who. */
export function ChangeLedger({ changes, label }: { changes: readonly Change[]; label: string }) {
  return (
    <ol aria-label={label} className="border-t-2 border-ink">
      {changes.map((change, index) => (
        <li key={`${change.at} ${index}`} className="ledger-line py-2.5">
          <div className="flex flex-wrap justify-between gap-x-6">
            <span>{bindUnits(change.what)}</span>
            {change.to !== null && (
              <span className="font-strong">
                {change.from !== null && (
                  <>
                    {change.from} <span aria-label="to">→</span>{' '}
                  </>
                )}
                {change.to}
              </span>
            )}
          </div>
          <span className="block text-small text-soft">
            <time dateTime={change.at}>{formatDateTime(change.at)}</time> · {change.who}
          </span>
        </li>
      ))}
    </ol>
  );
}
