import type { ReactNode } from 'react';
import type { Order } from '../../../../server/contracts/orders.ts';
import { bindUnits, keepTogether } from '../../../lib/spaces.ts';
import { Money } from '../../../ui/money.tsx';
import { PulseStrip } from '../../../ui/pulse-strip.tsx';
import { PartsTable } from '../../../ui/parts-table.tsx';

type Line = Order['lines'][number];

/** What was ordered, with the promise frozen on the day. */
export function OrderLines(props: { order: Order; lineLinks: (line: Line) => ReactNode }) {
  return (
    <ul className="border-t-2 border-ink">
      {props.order.lines.map((line) => (
        <li key={line.id} className="ledger-line py-6">
          <div className="grid gap-x-8 gap-y-3 sm:grid-cols-[11rem_1fr_auto]">
            <PulseStrip strip={line.strip} className="h-16 bg-wash/70" />
            <div>
              <h3 className="text-lead leading-snug font-strong">{bindUnits(line.sentence)}</h3>
              <p className="mt-1 text-soft">
                Promised: {keepTogether(`${line.promise.text.rate} ${line.promise.text.unit}`)},{' '}
                {keepTogether(line.promise.text.band)}; every kit between {line.promise.text.from}{' '}
                and {keepTogether(`${line.promise.text.to} ${line.promise.text.unit}`)}. Pack{' '}
                {line.identifier}.
              </p>
              <div className="no-print mt-2 flex flex-wrap gap-x-6">{props.lineLinks(line)}</div>
              <details className="mt-2">
                <summary className="inline-block py-1 font-strong text-spruce underline underline-offset-4">
                  Parts of this kit
                </summary>
                <div className="mt-2">
                  <PartsTable parts={line.parts} caption={`Parts of ${line.identifier}`} />
                </div>
              </details>
            </div>
            <div className="sm:text-right">
              <Money value={line.total} className="text-title font-heavy" />
              <p className="text-small text-soft">
                {line.quantity === 1 ? 'one kit' : `${line.quantity} kits`} at{' '}
                <Money value={line.unitPrice} />
              </p>
            </div>
          </div>
        </li>
      ))}
    </ul>
  );
}
