import { queryOptions, useQuery } from '@tanstack/react-query';
import { packPageSchema } from '../../../../server/contracts/packs.ts';
import { request } from '../../../lib/http.ts';

const packPageOptions = (token: string) =>
  queryOptions({
    queryKey: ['packs', 'page', token],
    queryFn: ({ signal }) =>
      request(packPageSchema, `/api/packs/${encodeURIComponent(token)}`, { signal }),
  });

export function usePackPage(token: string) {
  return useQuery(packPageOptions(token));
}
