import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { auditPageSchema } from '../../../../server/contracts/desk.ts';
import { queryString, request } from '../../../lib/http.ts';

export const auditKey = ['desk', 'audit'] as const;

interface AuditQuery {
  search: string;
  page: number;
}

function auditOptions(query: AuditQuery) {
  return queryOptions({
    queryKey: [...auditKey, query],
    queryFn: ({ signal }) =>
      request(auditPageSchema, `/api/desk/audit${queryString({ ...query, pageSize: 50 })}`, {
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}

export const useAudit = (query: AuditQuery) => useQuery(auditOptions(query));
