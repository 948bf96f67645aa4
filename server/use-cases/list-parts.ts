import type { Part, PartsPage } from '../contracts/parts.ts';
import type { CataloguePart } from '../domain/catalogue.ts';
import { money } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import { listPublicParts, type PartsFilter } from '../store/parts.ts';

/** A part as everybody may see it. */
export function toPublicPart(part: CataloguePart): Part {
  return {
    ...part.facts,
    mounting: part.mounting,
    available: part.available,
    unitPrice: money(part.priceMinor),
  };
}

/** A page of the public catalogue. */
export async function listParts(deps: Pick<Deps, 'db'>, filter: PartsFilter): Promise<PartsPage> {
  const { parts, total } = await listPublicParts(deps.db, filter);
  return { items: parts.map(toPublicPart), page: filter.page, pageSize: filter.pageSize, total };
}
