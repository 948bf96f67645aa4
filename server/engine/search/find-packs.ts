import { findBestValue, valueYield } from './best-value.ts';
import { byCloseness, byValue, isSamePack, type Candidate } from './candidate.ts';
import { aimFrames, closestByCapacitor } from './closest.ts';
import { fittedPacks, steadiestTrimmed } from './fitted-packs.ts';
import { worseEnd } from './guaranteed-band.ts';
import { headsFor } from './heads.ts';
import { cheapestThatHolds, steadiestOf } from './listed-packs.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { promise, type Rank, type RankedPack } from './promise.ts';
import { capacitorSuits } from './rules.ts';
import type { SearchBrief, StockedCapacitor } from './shelf.ts';
import { findSteadiest, type Steady } from './steadiest.ts';
import { steeredPacks } from './steered.ts';
import { listOffers } from './timing-choice.ts';

/** What the search found, best first by the asked rank. */
export interface FoundPacks {
  packs: RankedPack[];
  /** How many combinations the shelf and the rules allow, made or not. */
  considered: number;
}

interface Pool {
  /** The closest of every capacitor, and all steered, tuned or trimmed packs, nearest first. */
  closest: Candidate[];
  bestValue: Candidate | null;
  steadiest: Steady | null;
  considered: number;
}

/**
 * Finds packs for a brief on a shelf, ranked. *Closest* has the least |ln(f/target)| of every
 * combination that the shelf holds and the rules allow; *best value* is the cheapest of which at
 * least 99 % of kits hold the band; *steadiest* has the guaranteed band whose worse end is nearest to
 * the target. Ties are broken by price, part count and ids. The packs after the winners differ from
 * one another in their capacitor and go by the asked rank. Empty when nothing on the shelf can run
 * the brief.
 */
export function findPacks(
  shelf: PreparedShelf,
  brief: SearchBrief,
  rank: Rank,
  limit: number,
): FoundPacks {
  const { closest, bestValue, steadiest, considered } = searchPool(shelf, brief);
  if (closest.length === 0) return { packs: [], considered };
  const winners: Record<Rank, Candidate | null> = {
    closest: closest[0]!,
    'best-value': bestValue,
    steadiest: steadiest?.candidate ?? null,
  };
  const packs = arrange(winners, rank, closest, limit, brief, shelf);
  for (const pack of packs) {
    pack.wins = (Object.keys(winners) as Rank[]).filter((name) => isSamePack(winners[name], pack));
  }
  return { packs, considered };
}

/** The steadiest pack alone, with its promise; null when nothing on the shelf can run the brief. */
export function findSteadiestPack(shelf: PreparedShelf, brief: SearchBrief): RankedPack | null {
  const { aimed, capacitors, offers } = aimShelf(shelf, brief);
  if (brief.care === 'trimmer-fitted') {
    const trimmed = steadiestTrimmed(aimed, brief, shelf);
    return trimmed && { ...promise(trimmed.candidate, brief, shelf), wins: ['steadiest'] };
  }
  const fitted = fittedPacks(aimed, brief, shelf);
  const steadiest =
    fitted === null
      ? steadiestOf(
          steeredPacks(shelf, capacitors, offers, brief),
          findSteadiest(aimed, brief, shelf),
          brief,
          shelf,
        )
      : steadiestOf(fitted, null, brief, shelf);
  return steadiest && { ...promise(steadiest.candidate, brief, shelf), wins: ['steadiest'] };
}

/** Every frame of the shelf, aimed at the target. */
function aimShelf(shelf: PreparedShelf, brief: SearchBrief) {
  const offers = listOffers(shelf.values, brief.quantity);
  const capacitors = cheapestAlike(
    shelf.shelf.capacitors.filter((part) => capacitorSuits(part, brief)),
  );
  const stock = { table: shelf.table, offers, quantity: brief.quantity };
  const heads = headsFor(shelf, brief);
  const combinations = heads.length * capacitors.length * shelf.table.ohms.length;
  const aimed = aimFrames(heads, capacitors, stock, brief);
  return { aimed, capacitors, offers, combinations };
}

/** Of capacitors that differ in nothing but price and stock, the cheapest, then the lowest id. */
function cheapestAlike(capacitors: readonly StockedCapacitor[]): StockedCapacitor[] {
  const best = new Map<string, StockedCapacitor>();
  for (const part of capacitors) {
    const key = [
      part.farads,
      part.tolerance,
      part.deviation,
      part.temperatureCoefficientPerKelvin,
      part.temperatureSpread,
      part.insulationSeconds,
      part.leakageAmps,
    ].join();
    const known = best.get(key);
    if (!known || (part.priceMinor - known.priceMinor || part.id - known.id) < 0) {
      best.set(key, part);
    }
  }
  return [...best.values()];
}

function searchPool(shelf: PreparedShelf, brief: SearchBrief): Pool {
  const { aimed, capacitors, offers, combinations } = aimShelf(shelf, brief);
  const fitted = fittedPacks(aimed, brief, shelf);
  if (fitted !== null) return poolOf(fitted, null, null, combinations, brief, shelf);
  const steered = steeredPacks(shelf, capacitors, offers, brief);
  return poolOf(
    [...closestByCapacitor(aimed, brief), ...steered],
    findBestValue(aimed, brief, shelf),
    findSteadiest(aimed, brief, shelf),
    combinations + steered.length,
    brief,
    shelf,
  );
}

/** Picks the winners over a list and what was found beside it. */
function poolOf(
  listed: readonly Candidate[],
  bestValue: Candidate | null,
  steadiest: Steady | null,
  considered: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Pool {
  const others = listed.filter(
    (candidate) => candidate.timing.kind !== 'single' || brief.care === 'bench-tuned',
  );
  return {
    closest: [...listed].sort(byCloseness),
    bestValue: cheapestThatHolds(others, bestValue, brief, shelf),
    steadiest: steadiestOf(others, steadiest, brief, shelf),
    considered,
  };
}

/** The winner of the asked rank first, then the other winners, then varied packs by the asked rank. */
function arrange(
  winners: Record<Rank, Candidate | null>,
  rank: Rank,
  closest: readonly Candidate[],
  limit: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): RankedPack[] {
  const chosen: Candidate[] = [];
  const add = (candidate: Candidate | null) => {
    if (candidate && !chosen.some((other) => isSamePack(other, candidate))) chosen.push(candidate);
  };
  ([rank, 'best-value', 'closest', 'steadiest'] as Rank[]).forEach((name) => add(winners[name]));
  const wanted = Math.max(0, limit - chosen.length);
  const seen = new Set(chosen.map((candidate) => candidate.frame.capacitor.id));
  const varied = closest.filter(({ frame }) => {
    const fresh = !seen.has(frame.capacitor.id);
    seen.add(frame.capacitor.id);
    return fresh;
  });
  const others = varied.slice(0, Math.max(wanted, variedLooked));
  const first = chosen.slice(0, limit).map((candidate) => promise(candidate, brief, shelf));
  const rest = others
    .map((candidate) => promise(candidate, brief, shelf))
    .sort(orderFor(rank, brief))
    .slice(0, wanted);
  return [...first, ...rest];
}

/** How many packs beside the winners are looked at before the asked rank picks among them. */
const variedLooked = 10;

function orderFor(rank: Rank, brief: SearchBrief): (a: RankedPack, b: RankedPack) => number {
  if (rank === 'closest') return byCloseness;
  const end = (pack: RankedPack) => worseEnd(pack.guaranteed, brief.targetHz);
  if (rank === 'steadiest') return (a, b) => end(a) - end(b) || byCloseness(a, b);
  const holds = (pack: RankedPack) => Number(pack.yieldWithinBand >= valueYield);
  return (a, b) =>
    holds(b) - holds(a) ||
    (holds(a) === 1 ? byValue(a, b) : b.yieldWithinBand - a.yieldWithinBand || byValue(a, b));
}
