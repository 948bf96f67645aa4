import { queryOptions, useQuery } from '@tanstack/react-query';
import { coverageSchema, deskTodaySchema } from '../../../../server/contracts/desk.ts';
import { request } from '../../../lib/http.ts';

const minute = 60_000;

export const todayOptions = queryOptions({
  queryKey: ['desk', 'today'],
  queryFn: ({ signal }) => request(deskTodaySchema, '/api/desk/today', { signal }),
});

export const coverageOptions = queryOptions({
  queryKey: ['desk', 'coverage'],
  queryFn: ({ signal }) => request(coverageSchema, '/api/desk/coverage', { signal }),
  staleTime: minute,
});

export function useToday() {
  return useQuery({ ...todayOptions, staleTime: 0, refetchInterval: minute });
}

export function useCoverage() {
  return useQuery(coverageOptions);
}
