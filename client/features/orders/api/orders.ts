import { queryOptions, useQuery } from '@tanstack/react-query';
import { orderSchema, ordersPageSchema } from '../../../../server/contracts/orders.ts';
import { queryString, request } from '../../../lib/http.ts';

export function myOrdersOptions(page: number) {
  return queryOptions({
    queryKey: ['orders', 'mine', page],
    queryFn: ({ signal }) =>
      request(ordersPageSchema, `/api/orders${queryString({ page, pageSize: 20 })}`, { signal }),
  });
}

export function orderOptions(ref: string, token: string | null) {
  return queryOptions({
    queryKey: ['orders', 'one', ref, token],
    queryFn: ({ signal }) =>
      request(orderSchema, `/api/orders/${encodeURIComponent(ref)}${queryString({ token })}`, {
        signal,
      }),
  });
}

export function useMyOrders(page: number) {
  return useQuery(myOrdersOptions(page));
}

export function useOrder(ref: string, token: string | null) {
  return useQuery(orderOptions(ref, token));
}

/** Asks about once a second while the payment's word is outstanding, then rests. */
export function useOrderUntilPaid(ref: string, token: string | null) {
  return useQuery({
    ...orderOptions(ref, token),
    staleTime: 0,
    refetchInterval: (query) => (query.state.data?.status === 'awaiting_payment' ? 1000 : false),
  });
}
