import {
  keepPreviousData,
  queryOptions,
  useMutation,
  useQuery,
  useQueryClient,
} from '@tanstack/react-query';
import type { z } from 'zod';
import { deskOrderSchema, deskOrdersPageSchema } from '../../../../server/contracts/desk.ts';
import type { refundRequestSchema } from '../../../../server/contracts/desk.ts';
import { queryString, request } from '../../../lib/http.ts';
import { useKeyFor } from '../use-key-for.ts';
import { auditKey } from './audit.ts';
import { todayOptions } from './today.ts';

export interface OrdersQuery {
  search: string;
  status: string;
  page: number;
}

const listKey = ['desk', 'orders'] as const;
const path = (ref: string) => `/api/desk/orders/${encodeURIComponent(ref)}`;

function ordersOptions(query: OrdersQuery) {
  return queryOptions({
    queryKey: [...listKey, query],
    queryFn: ({ signal }) =>
      request(deskOrdersPageSchema, `/api/desk/orders${queryString({ ...query, pageSize: 50 })}`, {
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}

function orderOptions(ref: string) {
  return queryOptions({
    queryKey: ['desk', 'order', ref],
    queryFn: ({ signal }) => request(deskOrderSchema, path(ref), { signal }),
  });
}

export const useOrders = (query: OrdersQuery) => useQuery(ordersOptions(query));
export const useOrder = (ref: string) => useQuery(orderOptions(ref));

export function useRefund(ref: string) {
  const client = useQueryClient();
  const keyFor = useKeyFor();
  return useMutation({
    mutationFn: (body: z.infer<typeof refundRequestSchema>) =>
      request(deskOrderSchema, `${path(ref)}/refund`, {
        method: 'POST',
        body,
        idempotencyKey: keyFor(body),
      }),
    onSuccess: (order) => {
      client.setQueryData(orderOptions(ref).queryKey, order);
      for (const queryKey of [listKey, todayOptions.queryKey, auditKey]) {
        void client.invalidateQueries({ queryKey });
      }
    },
    onError: () => client.invalidateQueries({ queryKey: orderOptions(ref).queryKey }),
  });
}
