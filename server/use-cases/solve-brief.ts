import { solveRequestSchema, type SolveRequest } from '../contracts/brief.ts';
import type { Advice, SolveResponse } from '../contracts/packs.ts';
import { adviseOn, isNear } from '../domain/advice.ts';
import { resolveBrief, type BriefInHand } from '../domain/brief.ts';
import {
  chooseAccessories,
  choiceOf,
  missingAccessory,
  type Accessories,
} from '../domain/pack-choice.ts';
import { shelfOf } from '../domain/shelf.ts';
import { formTimingTables, restock, type TimingTables } from '../engine/search/composites.ts';
import {
  findPacks,
  findSteadiestPack,
  type FoundPacks,
  type RankedPack,
} from '../engine/search/find-packs.ts';
import type { Shelf } from '../engine/search/shelf.ts';
import type { Deps } from '../ports.ts';
import { assess, openPackBook, type PackBook } from './pack-book.ts';
import { Refusal } from './refusal.ts';

const nothing: FoundPacks = { packs: [], considered: 0 };

/**
 * Finds the packs that today's unreserved stock can make for a brief, best first. A brief that no
 * physics can serve is refused; one that the shelves cannot hold gets the nearest packs and advice.
 */
export async function solveBrief(
  deps: Pick<Deps, 'db' | 'stockView' | 'signer'>,
  request: SolveRequest,
): Promise<SolveResponse> {
  const started = performance.now();
  const book = await openPackBook(deps);
  const inHand = resolveBrief(request, book.catalogue);
  if (inHand.kind === 'impossible') {
    throw new Refusal('impossible-brief', inHand.errors[0]!.message, inHand.errors);
  }
  const accessories = chooseAccessories(book.catalogue, inHand);
  const found = searchShelves(book, inHand, accessories, request);
  const offered = found.packs.filter((ranked) => isNear(ranked) && ranked.guaranteed.minHz > 0);
  const packs = offered.map((ranked) =>
    assess(book, deps.signer, request, inHand, ranked, choiceOf(ranked, inHand, accessories)),
  );
  return {
    brief: inHand.brief,
    packs: packs.map(({ pack }) => pack).filter((pack) => pack.makeable >= request.quantity),
    considered: found.considered,
    elapsedMs: Math.round((performance.now() - started) * 100) / 100,
    advice: advice(book, inHand, accessories, request, found),
  };
}

function searchShelves(
  book: PackBook,
  inHand: BriefInHand,
  accessories: Accessories,
  request: Pick<SolveRequest, 'rank' | 'limit'>,
): FoundPacks {
  const shelf = shelfFor(book, inHand, accessories);
  if (shelf === null) return nothing;
  return findPacks(shelf, inHand.search, request.rank, request.limit, timingTables(shelf));
}

/** The steadiest pack for a brief in hand, or null: what the coverage map asks for. */
export function steadiestOnShelves(book: PackBook, inHand: BriefInHand): RankedPack | null {
  const shelf = shelfFor(book, inHand, chooseAccessories(book.catalogue, inHand));
  return shelf && findSteadiestPack(shelf, inHand.search, timingTables(shelf));
}

/** The shelf a brief may take from; null when something every kit needs is missing. */
function shelfFor(book: PackBook, inHand: BriefInHand, accessories: Accessories): Shelf | null {
  if (inHand.brief.careLevel !== 'as-stocked') return null;
  if (missingAccessory(inHand, accessories) !== null) return null;
  return shelfOf(book.catalogue, inHand.brief.mounting, (comparator) =>
    accessories.boardFor(comparator.facts.sections),
  );
}

/** Forms the timing tables of both mountings ahead of the first brief. */
export async function warmSearch(deps: Pick<Deps, 'db' | 'stockView' | 'signer'>): Promise<void> {
  for (const mounting of ['through-hole', 'surface-mount'] as const) {
    const brief = { target: { value: 1, unit: 'Hz' as const }, mounting };
    await solveBrief(deps, solveRequestSchema.parse(brief));
  }
}

function advice(
  book: PackBook,
  inHand: BriefInHand,
  accessories: Accessories,
  request: SolveRequest,
  found: FoundPacks,
): Advice[] {
  const missing = missingAccessory(inHand, accessories);
  const retry = (change: Partial<BriefInHand['brief']>) => {
    const other = resolveBrief({ ...request, ...change }, book.catalogue);
    if (other.kind === 'impossible') return null;
    return (
      searchShelves(book, other, chooseAccessories(book.catalogue, other), {
        rank: 'closest',
        limit: 1,
      }).packs[0] ?? null
    );
  };
  return adviseOn(inHand.brief, found, missing, retry);
}

const tablesKept = 4;
const kept = new Map<string, TimingTables>();

/** Timing tables depend on which resistors the catalogue lists, not on how many are left: keep a few. */
function timingTables(shelf: Shelf): TimingTables {
  const key = shelf.resistors.map((part) => `${part.id}:${part.ohms}:${part.tolerance}`).join();
  let tables = kept.get(key);
  if (!tables) {
    tables = formTimingTables(shelf.resistors);
    if (kept.size >= tablesKept) kept.delete(kept.keys().next().value!);
    kept.set(key, tables);
  }
  return restock(tables, shelf.resistors);
}
