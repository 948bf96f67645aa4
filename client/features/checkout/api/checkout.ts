import {
  keepPreviousData,
  queryOptions,
  useMutation,
  useQuery,
  useQueryClient,
} from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { checkoutResponseSchema, quoteSchema } from '../../../../server/contracts/orders.ts';
import type { CheckoutInput } from '../../../../server/contracts/orders.ts';
import { newIdempotencyKey, queryString, request } from '../../../lib/http.ts';
import { rememberUnpaid } from '../../../lib/unpaid-order.ts';
import { forgetTyped } from '../typed-before.ts';

function quoteOptions(country: string, shippingMethod: string | undefined) {
  return queryOptions({
    queryKey: ['checkout', 'quote', country, shippingMethod],
    queryFn: ({ signal }) =>
      request(quoteSchema, `/api/checkout/quote${queryString({ country, shippingMethod })}`, {
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}

export function useQuote(country: string, shippingMethod: string | undefined) {
  return useQuery(quoteOptions(country, shippingMethod));
}

/** One key for one order as it is written; a changed form is another order and gets another key. */
function useKeyFor(): (body: CheckoutInput) => string {
  const last = useRef<{ text: string; key: string }>(undefined);
  return (body) => {
    const text = JSON.stringify(body);
    if (last.current?.text !== text) last.current = { text, key: newIdempotencyKey() };
    return last.current.key;
  };
}

export function usePlaceOrder() {
  const keyFor = useKeyFor();
  const client = useQueryClient();
  const place = useMutation({
    mutationFn: (body: CheckoutInput) =>
      request(checkoutResponseSchema, '/api/checkout', {
        method: 'POST',
        body,
        idempotencyKey: keyFor(body),
      }),
    onSuccess: ({ orderRef, paymentUrl }) => {
      rememberUnpaid({ orderRef, paymentUrl });
      forgetTyped();
      void client.invalidateQueries({ queryKey: ['basket'] });
      window.location.assign(paymentUrl);
    },
  });
  const { reset } = place;
  useEffect(() => {
    // The Back button may bring the page back as it was left: busy, with a basket that is gone.
    const wake = (event: PageTransitionEvent) => {
      if (!event.persisted) return;
      reset();
      void client.invalidateQueries({ queryKey: ['basket'] });
    };
    window.addEventListener('pageshow', wake);
    return () => window.removeEventListener('pageshow', wake);
  }, [client, reset]);
  return place;
}
