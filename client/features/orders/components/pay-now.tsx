import { useEffect, useState } from 'react';
import type { Order } from '../../../../server/contracts/orders.ts';
import { formatMoment, minutesUntil } from '../../../lib/format-time.ts';
import { ButtonAnchor } from '../../../ui/button.tsx';
import { Notice } from '../../../ui/notice.tsx';

function useMinutesLeft(until: string): number {
  const [minutes, setMinutes] = useState(() => minutesUntil(until));
  useEffect(() => {
    const timer = setInterval(() => setMinutes(minutesUntil(until)), 15_000);
    return () => clearInterval(timer);
  }, [until]);
  return minutes;
}

function Reserved({ until }: { until: string }) {
  const minutes = useMinutesLeft(until);
  if (minutes === 0) return <p>The parts are about to go back on the shelf.</p>;
  return (
    <p>
      The parts stay reserved for you until{' '}
      <strong className="font-heavy">{formatMoment(until)}</strong>, another{' '}
      {minutes === 1 ? 'minute' : `${minutes} minutes`}.
    </p>
  );
}

/** For an order that is not paid yet: how long the parts are kept, and the way to the card page. */
export function PayNow({ order }: { order: Order }) {
  if (order.status !== 'awaiting_payment') return null;
  return (
    <Notice title="This order is not paid yet." className="no-print">
      {order.reservedUntil !== null && <Reserved until={order.reservedUntil} />}
      {order.paymentUrl !== null && (
        <div className="mt-3">
          <ButtonAnchor href={order.paymentUrl}>Pay now</ButtonAnchor>
        </div>
      )}
    </Notice>
  );
}
