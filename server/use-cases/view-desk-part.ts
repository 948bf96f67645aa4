import type { DeskPart } from '../contracts/desk.ts';
import type { CataloguePart } from '../domain/catalogue.ts';
import { money } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import { findPart } from '../store/parts.ts';
import { lotsOfParts, type LotRow } from '../store/stock.ts';
import { toPublicPart } from './list-parts.ts';
import { Refusal } from './refusal.ts';

/** A part with its cost and its lots, as the desk sees it. */
export function toDeskPart(part: CataloguePart, lots: readonly LotRow[]): DeskPart {
  return {
    id: String(part.id),
    part: toPublicPart(part),
    cost: money(part.costMinor),
    onHand: part.onHand,
    reserved: part.reserved,
    active: part.active,
    lots: lots
      .filter((lot) => lot.partId === part.id)
      .map((lot) => ({
        id: String(lot.id),
        code: lot.code,
        bin: lot.bin,
        onHand: lot.onHand,
        reserved: lot.reserved,
        receivedOn: lot.receivedOn,
      })),
  };
}

/** One part with cost, stock and lots. */
export async function viewDeskPart(deps: Pick<Deps, 'db'>, id: number): Promise<DeskPart> {
  const part = await findPart(deps.db, id);
  if (part === null) throw new Refusal('not-found', 'The catalogue has no such part.');
  return toDeskPart(part, await lotsOfParts(deps.db, [id]));
}
