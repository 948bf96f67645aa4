import { queryOptions, useQuery } from '@tanstack/react-query';
import { shopSchema } from '../../server/contracts/shop.ts';
import type { Shop } from '../../server/contracts/shop.ts';
import { request } from './http.ts';

export const shopOptions = queryOptions({
  queryKey: ['shop'],
  queryFn: ({ signal }) => request(shopSchema, '/api/shop', { signal }),
  staleTime: Infinity,
});

/** What the shop says of itself; `undefined` until it has answered. */
export function useShop(): Shop | undefined {
  return useQuery(shopOptions).data;
}
