import { queryOptions, useQuery } from '@tanstack/react-query';
import { meSchema } from '../../server/contracts/auth.ts';
import type { Me } from '../../server/contracts/auth.ts';
import { request } from './http.ts';
import { isProblem } from './problem-error.ts';

async function fetchMe(signal: AbortSignal): Promise<Me | null> {
  try {
    return await request(meSchema, '/api/auth/me', { signal });
  } catch (error) {
    if (isProblem(error) && error.status === 401) return null;
    throw error;
  }
}

export const sessionOptions = queryOptions({
  queryKey: ['session'],
  queryFn: ({ signal }) => fetchMe(signal),
  staleTime: 5 * 60_000,
});

/** Who is signed in: `undefined` while unknown, `null` for a guest. */
export function useSession(): Me | null | undefined {
  const { data, isError } = useQuery(sessionOptions);
  return isError ? null : data;
}
