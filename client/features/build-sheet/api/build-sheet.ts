import { queryOptions, useQuery } from '@tanstack/react-query';
import { buildSheetSchema } from '../../../../server/contracts/orders.ts';
import { queryString, request } from '../../../lib/http.ts';

export interface SheetAddress {
  ref: string;
  lineId: string;
  token: string | null;
}

function apiPath({ ref, lineId }: SheetAddress): string {
  return `/api/orders/${encodeURIComponent(ref)}/lines/${encodeURIComponent(lineId)}/build-sheet`;
}

const sheetOptions = (address: SheetAddress) =>
  queryOptions({
    queryKey: ['build-sheet', address],
    queryFn: ({ signal }) =>
      request(buildSheetSchema, `${apiPath(address)}${queryString({ token: address.token })}`, {
        signal,
      }),
  });

export function useBuildSheet(address: SheetAddress) {
  return useQuery(sheetOptions(address));
}

/** Where the same sheet is as a PDF. */
export function sheetPdfUrl(address: SheetAddress): string {
  return `${apiPath(address)}.pdf${queryString({ token: address.token })}`;
}
