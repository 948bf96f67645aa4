import type { PartHistory } from '../../../../server/contracts/desk.ts';
import { formatDateTime } from '../../../lib/format-time.ts';
import { bindUnits } from '../../../lib/spaces.ts';

type Entry = PartHistory['ledger'][number];

/** Stock movements: when, from which bin, why and by whom; from how many to how many. */
export function StockLedger(props: { entries: readonly Entry[]; label: string }) {
  return (
    <ol aria-label={props.label} className="border-t-2 border-ink">
      {props.entries.map((entry, index) => (
        <li
          key={`${entry.at} ${entry.lot} ${index}`}
          className="ledger-line grid grid-cols-[4rem_1fr_auto] gap-x-4 py-2.5"
        >
          <strong className="font-heavy">{entry.bin}</strong>
          <span>
            {bindUnits(entry.what)}
            <span className="block text-small text-soft">
              <time dateTime={entry.at}>{formatDateTime(entry.at)}</time> · {entry.who} · lot{' '}
              {entry.lot}
            </span>
          </span>
          <span className="text-right font-strong whitespace-nowrap">
            {entry.from} <span aria-label="to">→</span> {entry.to}
          </span>
        </li>
      ))}
    </ol>
  );
}
