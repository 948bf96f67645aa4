import { useEffect, useState } from 'react';
import { formatMoment } from '../../../lib/format-time.ts';
import { unpaidOrder } from '../../../lib/unpaid-order.ts';
import { ButtonAnchor } from '../../../ui/button.tsx';
import { Notice } from '../../../ui/notice.tsx';

/** For somebody who came back from the card page: the order is there, and here is the way to pay it. */
export function UnpaidNotice() {
  const [order, setOrder] = useState(() => unpaidOrder());
  useEffect(() => {
    const look = () => setOrder(unpaidOrder());
    const timer = setInterval(look, 15_000);
    window.addEventListener('pageshow', look);
    return () => {
      clearInterval(timer);
      window.removeEventListener('pageshow', look);
    };
  }, []);
  if (order === undefined) return null;
  return (
    <Notice className="mt-8 mb-2">
      <p>
        Order <strong className="font-heavy whitespace-nowrap">{order.orderRef}</strong> waits for
        payment; its parts are kept until{' '}
        <strong className="font-heavy whitespace-nowrap">{formatMoment(order.keptUntil)}</strong>.
      </p>
      <div className="mt-3">
        <ButtonAnchor href={order.paymentUrl}>Pay now</ButtonAnchor>
      </div>
    </Notice>
  );
}
