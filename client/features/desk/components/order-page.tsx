import { Link, useParams } from 'react-router-dom';
import type { DeskOrder } from '../../../../server/contracts/desk.ts';
import { formatDateTime } from '../../../lib/format-time.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Money } from '../../../ui/money.tsx';
import { Opening } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useOrder } from '../api/orders.ts';
import { deskPaths } from '../desk-paths.ts';
import { orderWords } from '../order-words.ts';
import { ChangeLedger } from './change-ledger.tsx';
import { OrderKits } from './order-kits.tsx';
import { OrderSums } from './order-sums.tsx';
import { Refund } from './refund.tsx';

/** One order with everything the shop knows of it. */
export function OrderPage() {
  const { ref = '' } = useParams();
  usePageTitle(`Order ${ref}`);
  const order = useOrder(ref);
  return (
    <>
      <p className="no-print pt-5">
        <Link className="link" to={deskPaths.orders.link()}>
          All orders
        </Link>
      </p>
      {order.isPending && <Waiting words="Opening the order" />}
      {order.isError && (
        <div className="pt-6">
          <ErrorPanel isPage error={order.error} onRetry={() => void order.refetch()} />
        </div>
      )}
      {order.data !== undefined && <OrderView order={order.data} />}
    </>
  );
}

function OrderView({ order }: { order: DeskOrder }) {
  return (
    <>
      <Opening>
        <strong>{order.ref}</strong>, {order.shippingAddress.name}, <Money value={order.total} />:{' '}
        <strong>{orderWords[order.status]}</strong>.
      </Opening>
      <p className="-mt-5 mb-8 text-soft">
        Placed {formatDateTime(order.placedAt)} by {order.email}.
      </p>
      <div className="space-y-12">
        <OrderKits lines={order.lines} />
        <div className="grid gap-x-14 gap-y-12 lg:grid-cols-[1.35fr_1fr]">
          <div className="space-y-12">
            <section aria-labelledby="happened">
              <h2 id="happened" className="mb-2 text-title font-strong">
                What happened
              </h2>
              <ChangeLedger
                label="What happened with this order"
                changes={order.events.map(worded)}
              />
            </section>
            <Payments payments={order.payments} />
            <Refund order={order} />
          </div>
          <OrderSums order={order} />
        </div>
      </div>
    </>
  );
}

const isStatus = (text: string): text is keyof typeof orderWords => Object.hasOwn(orderWords, text);

function worded(event: DeskOrder['events'][number]): DeskOrder['events'][number] {
  const words = (text: string | null) =>
    text !== null && isStatus(text) ? orderWords[text] : text;
  return { ...event, from: words(event.from), to: words(event.to) };
}

function Payments({ payments }: { payments: DeskOrder['payments'] }) {
  return (
    <section aria-labelledby="payments">
      <h2 id="payments" className="mb-2 text-title font-strong">
        Payments
      </h2>
      {payments.length === 0 ? (
        <p className="text-soft">Nothing was paid.</p>
      ) : (
        <ol className="border-t-2 border-ink">
          {payments.map((payment) => (
            <li
              key={`${payment.at} ${payment.reference}`}
              className="ledger-line grid grid-cols-[1fr_auto] gap-x-6 py-2.5"
            >
              <span className="min-w-0">
                {payment.what} · <strong className="font-strong">{payment.status}</strong>
                <span className="block text-small break-all text-soft">
                  <time dateTime={payment.at}>{formatDateTime(payment.at)}</time> ·{' '}
                  {payment.reference}
                </span>
              </span>
              <Money value={payment.amount} className="font-heavy" />
            </li>
          ))}
        </ol>
      )}
    </section>
  );
}
