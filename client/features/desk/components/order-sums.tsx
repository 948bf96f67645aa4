import type { Money as MoneyValue } from '../../../../server/contracts/common.ts';
import type { DeskOrder } from '../../../../server/contracts/desk.ts';
import { formatDateTime, formatMoment } from '../../../lib/format-time.ts';
import { Money } from '../../../ui/money.tsx';

/** What it came to, and where it goes. */
export function OrderSums({ order }: { order: DeskOrder }) {
  const rows = [
    { name: 'Kits', value: order.goods },
    { name: order.shippingMethod.name, value: order.shipping },
  ];
  return (
    <div className="space-y-12">
      <section aria-labelledby="sums">
        <h2 id="sums" className="mb-2 text-title font-strong">
          Comes to
        </h2>
        <dl className="border-t-2 border-ink">
          {rows.map((row) => (
            <div key={row.name} className="ledger-line flex justify-between gap-6 py-2">
              <dt className="text-soft">{row.name}</dt>
              <dd>
                <Money value={row.value} />
              </dd>
            </div>
          ))}
          <div className="flex justify-between gap-6 pt-2 text-lead font-heavy">
            <dt>Total</dt>
            <dd>
              <Money value={order.total} />
            </dd>
          </div>
          <After name="of which tax" value={order.tax} />
          {order.refunded.amount > 0 && <After name="Refunded" value={order.refunded} />}
        </dl>
      </section>
      <section aria-labelledby="goes">
        <h2 id="goes" className="mb-2 text-title font-strong">
          Goes to
        </h2>
        <div className="border-t-2 border-ink pt-3">
          <address className="not-italic">
            {addressLines(order).map((line, index) => (
              <span key={index} className={index === 0 ? 'block font-heavy' : 'block'}>
                {line}
              </span>
            ))}
          </address>
          <p className="mt-3 text-soft">{shippingSentence(order)}</p>
        </div>
      </section>
    </div>
  );
}

function After({ name, value }: { name: string; value: MoneyValue }) {
  return (
    <div className="flex justify-between gap-6 text-small text-soft">
      <dt>{name}</dt>
      <dd>
        <Money value={value} />
      </dd>
    </div>
  );
}

function addressLines({ shippingAddress: to }: DeskOrder): string[] {
  const town = `${to.postalCode} ${to.city}`.trim();
  return [to.name, to.line1, to.line2, town, to.region, countryName(to.country)].filter(
    (line): line is string => line !== undefined && line !== '',
  );
}

/** The country in words; its code where the browser has no name for it. */
function countryName(code: string): string {
  try {
    return new Intl.DisplayNames(['en'], { type: 'region' }).of(code) ?? code;
  } catch {
    return code;
  }
}

function shippingSentence({ status, shipment, shipBy }: DeskOrder): string {
  if (shipment !== null) {
    return `Sent ${formatDateTime(shipment.shippedAt)} with ${shipment.carrier}, tracking ${shipment.tracking}.`;
  }
  const isOver = status === 'refunded' || status === 'cancelled';
  return shipBy === null || isOver
    ? 'Nothing to ship.'
    : `To be shipped by ${formatMoment(shipBy)}.`;
}
