import { keepPreviousData, queryOptions, skipToken, useQuery } from '@tanstack/react-query';
import type { SolveRequestInput } from '../../../../server/contracts/brief.ts';
import { solveResponseSchema } from '../../../../server/contracts/packs.ts';
import { request } from '../../../lib/http.ts';

function solveOptions(brief: SolveRequestInput | undefined) {
  return queryOptions({
    queryKey: ['packs', 'solve', brief],
    queryFn:
      brief === undefined
        ? skipToken
        : ({ signal }) =>
            request(solveResponseSchema, '/api/packs/solve', {
              method: 'POST',
              body: brief,
              signal,
            }),
    placeholderData: keepPreviousData,
    staleTime: 10_000,
  });
}

/** The packs for a brief; the last answer stays until the next one is there. */
export function useSolvedPacks(brief: SolveRequestInput | undefined) {
  return useQuery(solveOptions(brief));
}
