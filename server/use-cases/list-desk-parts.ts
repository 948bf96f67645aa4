import type { DeskPartsPage } from '../contracts/desk.ts';
import type { Deps } from '../ports.ts';
import { listDeskParts, type DeskPartsFilter } from '../store/parts.ts';
import { lotsOfParts } from '../store/stock.ts';
import { toDeskPart } from './view-desk-part.ts';

/** A page of parts with cost, stock and lots. */
export async function listDeskPartsPage(
  deps: Pick<Deps, 'db'>,
  filter: DeskPartsFilter,
): Promise<DeskPartsPage> {
  const { parts, total } = await listDeskParts(deps.db, filter);
  const lots = await lotsOfParts(
    deps.db,
    parts.map((part) => part.id),
  );
  return {
    items: parts.map((part) => toDeskPart(part, lots)),
    page: filter.page,
    pageSize: filter.pageSize,
    total,
  };
}
