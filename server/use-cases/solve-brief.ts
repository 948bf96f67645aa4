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
import { findPacks, findSteadiestPack, type FoundPacks } from '../engine/search/find-packs.ts';
import type { RankedPack } from '../engine/search/promise.ts';
import type { Deps, Signer } from '../ports.ts';
import { assess, openPackBook, type PackBook } from './pack-book.ts';
import { Refusal } from './refusal.ts';
import { searchShelf, withBoards } from './search-shelf.ts';

const nothing: FoundPacks = { packs: [], considered: 0 };

type Answer = Omit<SolveResponse, 'elapsedMs'>;

/** Answers of the latest state of the shelves, by request; a bookmarked brief is asked again and again. */
const answers = new WeakMap<PackBook['catalogue'], Map<string, Answer>>();
const answersKept = 256;

/**
 * Finds the packs that today's unreserved stock can make for a brief, best first. A brief that no
 * physics can serve is refused; one that the shelves cannot hold gets the nearest packs and advice.
 * The same request gets the same answer without another search as long as stock, prices and fees stand.
 */
export async function solveBrief(
  deps: Pick<Deps, 'db' | 'stockView' | 'signer'>,
  request: SolveRequest,
): Promise<SolveResponse> {
  const started = performance.now();
  const book = await openPackBook(deps);
  const kept = answers.get(book.catalogue) ?? new Map<string, Answer>();
  answers.set(book.catalogue, kept);
  const key = JSON.stringify([request, book.rule, book.settings]);
  let answer = kept.get(key);
  if (!answer) {
    answer = solve(book, deps.signer, request);
    if (kept.size >= answersKept) kept.delete(kept.keys().next().value!);
    kept.set(key, answer);
  }
  const elapsedMs = Math.round((performance.now() - started) * 100) / 100;
  return { ...answer, elapsedMs };
}

function solve(book: PackBook, signer: Signer, request: SolveRequest): Answer {
  const inHand = resolveBrief(request, book.catalogue, book.settings);
  if (inHand.kind === 'impossible') {
    throw new Refusal('impossible-brief', inHand.errors[0]!.message, inHand.errors);
  }
  const accessories = chooseAccessories(book.catalogue, inHand);
  const found = searchShelves(book, inHand, accessories, request);
  const offered = found.packs.filter((ranked) => isNear(ranked) && ranked.guaranteed.minHz > 0);
  const packs = offered.map((ranked) =>
    assess(book, signer, request, inHand, ranked, choiceOf(ranked, inHand, accessories)),
  );
  return {
    brief: inHand.brief,
    packs: packs.map(({ pack }) => pack).filter((pack) => pack.makeable >= request.quantity),
    considered: found.considered,
    advice: advice(book, inHand, accessories, request, found),
  };
}

function searchShelves(
  book: PackBook,
  inHand: BriefInHand,
  accessories: Accessories,
  request: Pick<SolveRequest, 'rank' | 'limit'>,
): FoundPacks {
  if (missingAccessory(inHand, accessories) !== null) return nothing;
  const shelf = withBoards(searchShelf(book, inHand.brief), accessories);
  return findPacks(shelf, inHand.search, request.rank, request.limit);
}

/** The steadiest pack for a brief in hand, or null: what the coverage map and the advice ask for. */
export function steadiestOnShelves(book: PackBook, inHand: BriefInHand): RankedPack | null {
  const accessories = chooseAccessories(book.catalogue, inHand);
  if (missingAccessory(inHand, accessories) !== null) return null;
  return findSteadiestPack(withBoards(searchShelf(book, inHand.brief), accessories), inHand.search);
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
    const other = resolveBrief({ ...request, ...change }, book.catalogue, book.settings);
    return other.kind === 'impossible' ? null : steadiestOnShelves(book, other);
  };
  return adviseOn(inHand.brief, found, missing, retry);
}
