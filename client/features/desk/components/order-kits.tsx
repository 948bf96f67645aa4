import type { DeskOrder } from '../../../../server/contracts/desk.ts';
import { bindUnits, keepTogether } from '../../../lib/spaces.ts';
import { Money } from '../../../ui/money.tsx';
import { PartsTable } from '../../../ui/parts-table.tsx';
import { PulseStrip } from '../../../ui/pulse-strip.tsx';
import { kitsWords } from '../order-words.ts';

/** What was bought, each pack with its pulse strip and the promise that was frozen with it. */
export function OrderKits({ lines }: { lines: DeskOrder['lines'] }) {
  return (
    <section aria-labelledby="kits">
      <h2 id="kits" className="mb-2 text-title font-strong">
        What was ordered
      </h2>
      <ul className="border-t-2 border-ink">
        {lines.map((line) => (
          <li
            key={line.id}
            className="ledger-line grid gap-x-8 gap-y-3 py-5 sm:grid-cols-[11rem_1fr_auto]"
          >
            <PulseStrip strip={line.strip} className="h-16 bg-wash/70" />
            <div>
              <h3 className="text-lead leading-snug font-strong">{bindUnits(line.sentence)}</h3>
              <p className="mt-1 text-soft">
                Promised: {keepTogether(`${line.promise.text.rate} ${line.promise.text.unit}`)},{' '}
                {keepTogether(line.promise.text.band)}. Pack {line.identifier}.
              </p>
              <details className="mt-1">
                <summary className="inline-block py-1 font-strong text-spruce underline underline-offset-4">
                  Parts of this kit
                </summary>
                <PartsTable parts={line.parts} caption={`Parts of ${line.identifier}`} />
              </details>
            </div>
            <div className="sm:text-right">
              <Money value={line.total} className="text-title font-heavy" />
              <p className="text-small text-soft">
                {kitsWords(line.quantity)} at <Money value={line.unitPrice} />
              </p>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}
