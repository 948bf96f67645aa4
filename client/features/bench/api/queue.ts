import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { queuePageSchema } from '../../../../server/contracts/bench.ts';
import { queryString, request } from '../../../lib/http.ts';

const pageSize = 25;
const refreshMs = 5000;

export const queueKey = ['bench', 'queue'] as const;

function queueOptions(page: number) {
  return queryOptions({
    queryKey: [...queueKey, page],
    queryFn: ({ signal }) =>
      request(queuePageSchema, `/api/bench/queue${queryString({ page, pageSize })}`, { signal }),
  });
}

/** The queue as it stands now: it asks again by itself, and keeps the last answer in between. */
export function useQueue(page: number) {
  return useQuery({
    ...queueOptions(page),
    placeholderData: keepPreviousData,
    staleTime: 0,
    refetchInterval: refreshMs,
  });
}
