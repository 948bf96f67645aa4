import { useEffect, useState } from 'react';
import { Link, useParams, useSearchParams } from 'react-router-dom';
import type { Order } from '../../../server/contracts/orders.ts';
import { useOrderUntilPaid } from '../../features/orders/api/orders.ts';
import { PayNow } from '../../features/orders/components/pay-now.tsx';
import { formatMoment } from '../../lib/format-time.ts';
import { bindUnits } from '../../lib/spaces.ts';
import { forgetUnpaid } from '../../lib/unpaid-order.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { ButtonLink } from '../../ui/button.tsx';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Money } from '../../ui/money.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { PulseStrip } from '../../ui/pulse-strip.tsx';
import { Tag, TagHead } from '../../ui/tag.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import { paths } from '../paths.ts';

const longWaitSeconds = 30;

function useLongWait(waiting: boolean): boolean {
  const [long, setLong] = useState(false);
  useEffect(() => {
    if (!waiting) return undefined;
    const timer = setTimeout(() => setLong(true), longWaitSeconds * 1000);
    return () => clearTimeout(timer);
  }, [waiting]);
  return long && waiting;
}

export function Component() {
  const { ref = '' } = useParams();
  const [query] = useSearchParams();
  const token = query.get('token');
  const order = useOrderUntilPaid(ref, token);
  const status = order.data?.status;
  useEffect(() => {
    if (status !== undefined && status !== 'awaiting_payment') forgetUnpaid(ref);
  }, [status, ref]);
  usePageTitle('Thank you');
  return (
    <Page className="pb-10">
      {order.isPending && <Waiting words="Opening the order" />}
      {order.isError && order.data === undefined && (
        <div className="pt-10">
          <ErrorPanel isPage error={order.error} onRetry={() => void order.refetch()} />
        </div>
      )}
      <div aria-live="polite">
        {order.data?.status === 'awaiting_payment' && <Awaiting order={order.data} />}
        {order.data !== undefined && order.data.status !== 'awaiting_payment' && (
          <Confirmed order={order.data} token={token} />
        )}
      </div>
    </Page>
  );
}

function Awaiting({ order }: { order: Order }) {
  const long = useLongWait(true);
  return (
    <>
      <Opening>
        Your order <strong className="whitespace-nowrap">{order.ref}</strong> is with us. We are
        waiting for word of the payment.
      </Opening>
      {long ? (
        <div className="space-y-4">
          <p className="max-w-prose">
            The word takes longer than usual. You may close this page: as soon as it comes we mail{' '}
            <strong className="font-heavy">{order.email}</strong>.
          </p>
          <PayNow order={order} />
        </div>
      ) : (
        <Waiting words="This takes a moment; there is nothing to do." />
      )}
    </>
  );
}

function Confirmed({ order, token }: { order: Order; token: string | null }) {
  const gone = order.status === 'cancelled' || order.status === 'refunded';
  return (
    <>
      <Opening>
        {gone ? (
          <>
            This order was <strong>{order.status}</strong>.
          </>
        ) : (
          <>
            Thank you. <strong className="whitespace-nowrap">{order.ref}</strong> is{' '}
            <strong>paid</strong>
            {order.status === 'paid' && ' and waits in the packers’ queue'}.
          </>
        )}
      </Opening>
      <p className="max-w-prose text-lead">
        {order.shipBy !== null && !gone && <>We ship it by {formatMoment(order.shipBy)}. </>}A
        confirmation goes to <strong className="font-heavy">{order.email}</strong>; it has the link
        to this order and to the build sheets.
      </p>
      <ul className="mt-8 grid gap-6 md:grid-cols-2 lg:grid-cols-3">
        {order.lines.map((line) => (
          <Tag as="li" key={line.id}>
            <TagHead end={<span className="text-title font-heavy">{line.quantity} ×</span>}>
              {line.promise.text.rate} {line.promise.text.unit}
            </TagHead>
            <PulseStrip strip={line.strip} className="h-16 bg-wash/70" />
            <div className="flex flex-1 flex-col justify-between gap-4 px-6 py-4">
              <p>{bindUnits(line.sentence)}</p>
              <div className="flex items-baseline justify-between">
                <Link className="link" to={paths.buildSheet.link(order.ref, line.id, token)}>
                  Build sheet
                </Link>
                <Money value={line.total} className="text-title font-heavy" />
              </div>
            </div>
          </Tag>
        ))}
      </ul>
      <div className="mt-8">
        <ButtonLink to={paths.order.link(order.ref, token)}>See the order</ButtonLink>
      </div>
    </>
  );
}
