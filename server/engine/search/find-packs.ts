import {
  aimFrame,
  byCloseness,
  byPriceThenIds,
  nearestCandidates,
  type AimedFrame,
  type Candidate,
} from './candidates.ts';
import { formTimingTables, type TimingTables } from './composites.ts';
import { frameCircuit, framesFor } from './frame.ts';
import { guaranteedBand, worseEnd, type GuaranteedBand } from './guaranteed-band.ts';
import { holdsBand, kitYield, type KitYield } from './kit-yield.ts';
import type { SearchBrief, Shelf } from './shelf.ts';
import type { Circuit } from '../circuit.ts';

export type Rank = 'closest' | 'best-value' | 'steadiest';

/** A candidate with its promise. */
export interface RankedPack extends Candidate, KitYield {
  circuit: Circuit;
  guaranteed: GuaranteedBand;
  topology: 'equal-thresholds' | 'shifted-thresholds';
  wins: Rank[];
}

/** What the search found, best first by the asked rank. */
export interface FoundPacks {
  packs: RankedPack[];
  /** How many combinations the shelf and the rules allow, made or not. */
  considered: number;
}

/** A pack is best value only when at least this share of kits holds the band. */
export const valueYield = 0.99;
const shortlistLength = 48;

/**
 * Finds packs for a brief on a shelf, ranked. *Closest* is exact over the whole space: no stocked
 * combination that the rules allow is nearer to the target by |ln(f/target)|. *Best value* is the
 * lowest price among shortlisted packs of which at least 99 % hold the band; *steadiest* has the
 * guaranteed band whose worse end is nearest to the target. Ties are broken by price, part count and
 * ids. The further packs differ from one another in capacitor or comparator.
 * `tables` must have been formed from the shelf's resistors; formed anew when left out. Empty when no frame of the shelf can run the brief.
 */
export function findPacks(
  shelf: Shelf,
  brief: SearchBrief,
  rank: Rank,
  limit: number,
  tables: TimingTables = formTimingTables(shelf.resistors),
): FoundPacks {
  const frames = framesFor(shelf, brief);
  const aimed = frames.map((frame) => aimFrame(frame, brief));
  const closest = aimed
    .flatMap((frame) => nearestCandidates(frame, tables.all, brief, 1))
    .sort(byCloseness);
  const considered = frames.length * tables.all.ohms.length;
  if (closest.length === 0) return { packs: [], considered };
  const winners: Record<Rank, Candidate | null> = {
    closest: closest[0]!,
    'best-value': findBestValue(aimed, tables, brief),
    steadiest: findSteadiest(aimed, tables, brief),
  };
  const packs = arrange(winners, rank, closest, limit).map((candidate) =>
    promise(candidate, brief),
  );
  for (const pack of packs) {
    pack.wins = (Object.keys(winners) as Rank[]).filter((name) => isSamePack(winners[name], pack));
  }
  return { packs, considered };
}

/** The steadiest pack alone, with its promise; null when no frame of the shelf can run the brief. */
export function findSteadiestPack(
  shelf: Shelf,
  brief: SearchBrief,
  tables: TimingTables = formTimingTables(shelf.resistors),
): RankedPack | null {
  const aimed = framesFor(shelf, brief).map((frame) => aimFrame(frame, brief));
  const steadiest = findSteadiest(aimed, tables, brief);
  return steadiest === null ? null : { ...promise(steadiest, brief), wins: ['steadiest'] };
}

/** The winner of the asked rank first, then the other winners, then varied close packs. */
function arrange(
  winners: Record<Rank, Candidate | null>,
  rank: Rank,
  closest: readonly Candidate[],
  limit: number,
): Candidate[] {
  const order: Rank[] = [rank, 'best-value', 'closest', 'steadiest'];
  const chosen: Candidate[] = [];
  const add = (candidate: Candidate | null) => {
    if (
      candidate &&
      chosen.length < limit &&
      !chosen.some((other) => isSamePack(other, candidate))
    ) {
      chosen.push(candidate);
    }
  };
  order.forEach((name) => add(winners[name]));
  const seen = new Set(chosen.map((candidate) => candidate.frame.capacitor.id));
  for (const candidate of closest) {
    if (chosen.length >= limit) break;
    if (seen.has(candidate.frame.capacitor.id)) continue;
    seen.add(candidate.frame.capacitor.id);
    add(candidate);
  }
  for (const candidate of closest) add(candidate);
  return chosen;
}

/** True when two candidates are made of the same parts joined the same way. */
export function isSamePack(a: Candidate | null, b: Candidate): boolean {
  return a !== null && byPriceThenIds(a, b) === 0;
}

/**
 * Adds the promise to a candidate: its nominal circuit, guaranteed band and yield.
 */
export function promise(candidate: Candidate, brief: SearchBrief): RankedPack {
  const guaranteed = guaranteedBand(candidate, brief);
  const { r1, r2, r3 } = candidate.frame.thresholds;
  return {
    ...candidate,
    ...kitYield(candidate, brief, guaranteed),
    circuit: frameCircuit(candidate.frame, brief, candidate.timingOhms),
    guaranteed,
    topology: r1.id === r2.id && r2.id === r3.id ? 'equal-thresholds' : 'shifted-thresholds',
    wins: [],
  };
}

/** Cheapest first, nearer first among equals, until one holds the band often enough. */
function findBestValue(
  aimed: readonly AimedFrame[],
  tables: TimingTables,
  brief: SearchBrief,
): Candidate | null {
  const pool = aimed
    .flatMap((frame) => [
      ...nearestCandidates(frame, tables.singles, brief, 4),
      ...nearestCandidates(frame, tables.all, brief, 1),
    ])
    .filter((candidate) => candidate.distance <= Math.log1p(brief.band))
    .sort((a, b) => a.priceMinor - b.priceMinor || byCloseness(a, b));
  return pool.find((candidate) => holdsBand(candidate, brief, valueYield)) ?? null;
}

/** Tolerances of the passive parts, a quick bound by which candidates are shortlisted. */
function passiveTolerance(candidate: Candidate): number {
  const { r1, r2, r3 } = candidate.frame.thresholds;
  const capacitor = candidate.frame.capacitor;
  const timing = Math.max(candidate.first.tolerance, candidate.second?.tolerance ?? 0);
  return (
    candidate.distance +
    timing +
    capacitor.tolerance +
    capacitor.temperatureSpread +
    0.36 * (r1.tolerance + r2.tolerance) +
    0.72 * r3.tolerance
  );
}

function findSteadiest(
  aimed: readonly AimedFrame[],
  tables: TimingTables,
  brief: SearchBrief,
): Candidate | null {
  const pool = aimed
    .flatMap((frame) =>
      [tables.precise, tables.good, tables.all].flatMap((table) =>
        nearestCandidates(frame, table, brief, 1),
      ),
    )
    .sort((a, b) => passiveTolerance(a) - passiveTolerance(b) || byPriceThenIds(a, b))
    .slice(0, shortlistLength);
  let best: Candidate | null = null;
  let bestEnd = Number.POSITIVE_INFINITY;
  for (const candidate of pool) {
    const end = worseEnd(guaranteedBand(candidate, brief), brief.targetHz);
    if (end < bestEnd - 1e-12) {
      best = candidate;
      bestEnd = end;
    }
  }
  return best;
}
