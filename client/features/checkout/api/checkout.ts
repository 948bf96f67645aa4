import {
  keepPreviousData,
  queryOptions,
  useMutation,
  useQuery,
  useQueryClient,
} from '@tanstack/react-query';
import { useRef } from 'react';
import { checkoutResponseSchema, quoteSchema } from '../../../../server/contracts/orders.ts';
import type { CheckoutInput } from '../../../../server/contracts/orders.ts';
import { newIdempotencyKey, queryString, request } from '../../../lib/http.ts';

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
  return useMutation({
    mutationFn: (body: CheckoutInput) =>
      request(checkoutResponseSchema, '/api/checkout', {
        method: 'POST',
        body,
        idempotencyKey: keyFor(body),
      }),
    onSuccess: ({ paymentUrl }) => {
      void client.invalidateQueries({ queryKey: ['basket'] });
      window.location.assign(paymentUrl);
    },
  });
}
