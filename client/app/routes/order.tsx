import { useEffect } from 'react';
import { Link, useParams, useSearchParams } from 'react-router-dom';
import type { Order } from '../../../server/contracts/orders.ts';
import { sheetPdfUrl } from '../../features/build-sheet/api/build-sheet.ts';
import { useOrder } from '../../features/orders/api/orders.ts';
import { OrderFacts } from '../../features/orders/components/order-facts.tsx';
import { OrderLines } from '../../features/orders/components/order-lines.tsx';
import { OrderSteps } from '../../features/orders/components/order-steps.tsx';
import { PayNow } from '../../features/orders/components/pay-now.tsx';
import { openingFor, wordsForStatus } from '../../features/orders/model.ts';
import { formatDateTime } from '../../lib/format-time.ts';
import { forgetUnpaid } from '../../lib/unpaid-order.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { Button } from '../../ui/button.tsx';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Ledger } from '../../ui/ledger.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import { paths } from '../paths.ts';

export function Component() {
  const { ref = '' } = useParams();
  const [query] = useSearchParams();
  const token = query.get('token');
  const order = useOrder(ref, token);
  const status = order.data?.status;
  useEffect(() => {
    if (status !== undefined && status !== 'awaiting_payment') forgetUnpaid(ref);
  }, [status, ref]);
  usePageTitle(`Order ${ref}`);
  return (
    <Page>
      {order.isPending && <Waiting words="Opening the order" />}
      {order.isError && (
        <div className="pt-10">
          <ErrorPanel
            isPage
            title="This order could not be opened"
            error={order.error}
            onRetry={() => void order.refetch()}
          />
        </div>
      )}
      {order.data !== undefined && <OrderView order={order.data} token={token} />}
    </Page>
  );
}

function OrderView({ order, token }: { order: Order; token: string | null }) {
  const opening = openingFor(order);
  return (
    <>
      <Opening>
        {opening.light} <strong>{opening.heavy}</strong>.
      </Opening>
      <p className="-mt-4 mb-6 text-soft">
        Order <strong className="font-heavy text-ink">{order.ref}</strong>, placed{' '}
        {formatDateTime(order.placedAt)}.
      </p>
      <div className="space-y-10">
        <OrderSteps status={order.status} />
        <PayNow order={order} />
        <section aria-labelledby="lines">
          <h2 id="lines" className="mb-2 text-title font-strong">
            What you ordered
          </h2>
          <OrderLines
            order={order}
            lineLinks={(line) => (
              <>
                <Link className="link py-1" to={paths.buildSheet.link(order.ref, line.id, token)}>
                  Build sheet
                </Link>
                <a
                  className="link py-1"
                  href={sheetPdfUrl({ ref: order.ref, lineId: line.id, token })}
                >
                  Build sheet as PDF
                </a>
              </>
            )}
          />
        </section>
        <OrderFacts order={order} />
        <section aria-labelledby="ledger">
          <h2 id="ledger" className="mb-2 text-title font-strong">
            What happened
          </h2>
          <Ledger
            label="What happened with this order"
            entries={order.events.map((event, index) => ({
              ...event,
              from: wordsForStatus(event.from),
              to: wordsForStatus(event.to),
              key: `${index}`,
            }))}
          />
        </section>
        <Button look="outline" className="no-print" onClick={() => window.print()}>
          Print this page
        </Button>
      </div>
    </>
  );
}
