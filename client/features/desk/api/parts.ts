import {
  keepPreviousData,
  queryOptions,
  useMutation,
  useQuery,
  useQueryClient,
} from '@tanstack/react-query';
import type { QueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  deskPartSchema,
  deskPartsPageSchema,
  partHistorySchema,
} from '../../../../server/contracts/desk.ts';
import type {
  changePriceSchema,
  changeStockSchema,
  DeskPart,
} from '../../../../server/contracts/desk.ts';
import { queryString, request } from '../../../lib/http.ts';
import type { PartsQuery } from '../parts-query.ts';
import { useKeyFor } from '../use-key-for.ts';
import { auditKey } from './audit.ts';
import { coverageOptions, todayOptions } from './today.ts';

type ChangePrice = z.infer<typeof changePriceSchema>;
type ChangeStock = z.infer<typeof changeStockSchema>;

const listKey = ['desk', 'parts'] as const;
const path = (id: string) => `/api/desk/parts/${encodeURIComponent(id)}`;

function partsOptions(query: PartsQuery) {
  return queryOptions({
    queryKey: [...listKey, query],
    queryFn: ({ signal }) =>
      request(deskPartsPageSchema, `/api/desk/parts${queryString({ ...query })}`, { signal }),
    placeholderData: keepPreviousData,
  });
}

function partOptions(id: string) {
  return queryOptions({
    queryKey: ['desk', 'part', id],
    queryFn: ({ signal }) => request(deskPartSchema, path(id), { signal }),
  });
}

function historyOptions(id: string) {
  return queryOptions({
    queryKey: ['desk', 'part', id, 'history'],
    queryFn: ({ signal }) => request(partHistorySchema, `${path(id)}/history`, { signal }),
  });
}

export const useParts = (query: PartsQuery) => useQuery(partsOptions(query));
export const usePart = (id: string) => useQuery(partOptions(id));
export const useHistory = (id: string) => useQuery(historyOptions(id));

/** A changed part changes lists, ledgers and what the shelves can serve. */
function keep(client: QueryClient, part: DeskPart): Promise<unknown> {
  client.setQueryData(partOptions(part.id).queryKey, part);
  const touched = [
    listKey,
    historyOptions(part.id).queryKey,
    todayOptions.queryKey,
    coverageOptions.queryKey,
    auditKey,
  ];
  return Promise.all(touched.map((queryKey) => client.invalidateQueries({ queryKey })));
}

export function useChangePrice(id: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangePrice) =>
      request(deskPartSchema, `${path(id)}/price`, { method: 'PATCH', body }),
    onSuccess: (part) => void keep(client, part),
  });
}

export function useChangeStock(id: string) {
  const client = useQueryClient();
  const keyFor = useKeyFor();
  return useMutation({
    mutationFn: (body: ChangeStock) =>
      request(deskPartSchema, `${path(id)}/stock`, {
        method: 'POST',
        body,
        idempotencyKey: keyFor(body),
      }),
    onSuccess: (part) => void keep(client, part),
  });
}
