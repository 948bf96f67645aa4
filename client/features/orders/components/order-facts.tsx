import type { Order } from '../../../../server/contracts/orders.ts';
import { formatDateTime, formatMoment } from '../../../lib/format-time.ts';
import { Money } from '../../../ui/money.tsx';

/** What it came to, where it goes, and how. */
export function OrderFacts({ order }: { order: Order }) {
  const { shippingAddress: to } = order;
  const lines = [
    to.name,
    to.line1,
    to.line2,
    `${to.postalCode} ${to.city}`.trim(),
    to.region,
    countryName(to.country),
  ];
  return (
    <div className="grid gap-x-14 gap-y-8 sm:grid-cols-2">
      <Sums order={order} />
      <div className="space-y-5">
        <div>
          <h2 className="text-title font-strong">Goes to</h2>
          <address className="mt-1 not-italic">
            {lines
              .filter((line) => line !== undefined && line !== '')
              .map((line, index) => (
                <span key={index} className="block">
                  {line}
                </span>
              ))}
          </address>
          <p className="text-soft">{order.email}</p>
        </div>
        <p>
          {order.shippingMethod.name}.{' '}
          {order.shipment !== null ? (
            <>
              Sent {formatDateTime(order.shipment.shippedAt)} with {order.shipment.carrier},
              tracking <strong className="font-heavy">{order.shipment.tracking}</strong>.
            </>
          ) : (
            order.shipBy !== null && <>We ship it by {formatMoment(order.shipBy)}.</>
          )}
        </p>
      </div>
    </div>
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

function Sums({ order }: { order: Order }) {
  const rows = [
    { name: 'Kits', value: order.goods },
    { name: 'Sending', value: order.shipping },
  ];
  return (
    <section>
      <h2 className="text-title font-strong">Comes to</h2>
      <dl className="mt-1 border-t-2 border-ink">
        {rows.map((row) => (
          <div key={row.name} className="ledger-line flex justify-between py-1.5">
            <dt>{row.name}</dt>
            <dd>
              <Money value={row.value} />
            </dd>
          </div>
        ))}
        <div className="flex justify-between pt-2 text-lead font-heavy">
          <dt>Total</dt>
          <dd>
            <Money value={order.total} />
          </dd>
        </div>
        <div className="flex justify-between text-small text-soft">
          <dt>of which tax</dt>
          <dd>
            <Money value={order.tax} />
          </dd>
        </div>
        {order.refunded.amount > 0 && (
          <div className="flex justify-between font-strong">
            <dt>Refunded</dt>
            <dd>
              <Money value={order.refunded} />
            </dd>
          </div>
        )}
      </dl>
    </section>
  );
}
