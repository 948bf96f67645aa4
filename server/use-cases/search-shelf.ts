import type { ResolvedBrief } from '../contracts/brief.ts';
import type { CataloguePart } from '../domain/catalogue.ts';
import type { Accessories } from '../domain/pack-choice.ts';
import { shelfOf } from '../domain/shelf.ts';
import { prepareShelf, type PreparedShelf } from '../engine/search/prepared-shelf.ts';
import type { PackBook } from './pack-book.ts';

type Kept = Map<string, PreparedShelf>;

/** Shelves made ready for searching, for as long as the stock they were made from is the latest. */
const ready = new WeakMap<readonly CataloguePart[], Kept>();
/** The latest of each kind, whose timing table serves until a resistor value comes or goes. */
const latest: Kept = new Map();

/**
 * The shelf a brief is searched on, prepared once for each state of the stock, each mounting and
 * whether capacitors go by their lots.
 */
export function searchShelf(
  book: Pick<PackBook, 'catalogue' | 'settings'>,
  brief: Pick<ResolvedBrief, 'mounting' | 'careLevel'>,
): PreparedShelf {
  const lotChecked = brief.careLevel === 'lot-checked' ? book.settings : null;
  const key = `${brief.mounting} ${lotChecked?.meterUncertainty ?? ''}`;
  const kept = ready.get(book.catalogue) ?? new Map<string, PreparedShelf>();
  ready.set(book.catalogue, kept);
  let shelf = kept.get(key);
  if (!shelf) {
    const parts = shelfOf(book.catalogue, brief.mounting, lotChecked);
    shelf = prepareShelf(parts, latest.get(brief.mounting) ?? null);
    kept.set(key, shelf);
    latest.set(brief.mounting, shelf);
  }
  return shelf;
}

/** The same shelf with only the comparators that a stocked board takes. */
export function withBoards(shelf: PreparedShelf, { boardFor }: Accessories): PreparedShelf {
  const comparators = shelf.shelf.comparators.filter((part) => boardFor(part.sections) !== null);
  return comparators.length === shelf.shelf.comparators.length
    ? shelf
    : { ...shelf, shelf: { ...shelf.shelf, comparators } };
}
