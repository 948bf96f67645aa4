import {
  aimFrame,
  byCloseness,
  byPriceThenIds,
  nearestCandidates,
  type AimedFrame,
  type Candidate,
} from './candidates.ts';
import { formTimingTables, type TimingTables } from './composites.ts';
import { frameCircuit, framesFor, type Frame } from './frame.ts';
import { guaranteedBand, worseEnd, type GuaranteedBand } from './guaranteed-band.ts';
import { holdsBand, holdsBandAtBest, kitYield, type KitYield } from './kit-yield.ts';
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
/** Below the wanted yield, since a pack a little off the target can be in the band a little more often. */
const hopelessYield = 0.98;
const shortlistLength = 48;
const framesShortlisted = 120;

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
  const steadiest = findSteadiest(aimed, tables, brief);
  const winners: Record<Rank, Candidate | null> = {
    closest: closest[0]!,
    'best-value': betterValue(findBestValue(aimed, tables, brief), steadiest, brief),
    steadiest,
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

/**
 * The cheapest pack that holds the band often enough; the nearer one among equals in price. Frames go
 * by price, so the walk ends once even the cheapest resistor would make the next one dearer.
 */
function findBestValue(
  aimed: readonly AimedFrame[],
  tables: TimingTables,
  brief: SearchBrief,
): Candidate | null {
  const cheapest = Math.min(...tables.all.resistors.map((part) => part.priceMinor));
  const byPrice = [...aimed].sort((a, b) => a.frame.priceMinor - b.frame.priceMinor);
  const hopeless = createHopeless(brief);
  let best: Candidate | null = null;
  for (const frame of byPrice) {
    if (best !== null && frame.frame.priceMinor + cheapest > best.priceMinor) break;
    if (hopeless(frame.frame)) continue;
    const pool = [
      ...nearestCandidates(frame, tables.singles, brief, 4),
      ...[tables.all, tables.good, tables.precise].flatMap((table) =>
        nearestCandidates(frame, table, brief, 2),
      ),
    ].sort(byValue);
    for (const candidate of pool) {
      if (best !== null && byValue(candidate, best) >= 0) break;
      if (candidate.distance <= Math.log1p(brief.band) && holdsBand(candidate, brief, valueYield)) {
        best = candidate;
        break;
      }
    }
  }
  return best;
}

/** The steadiest pack is best value where it costs less, or where nothing else holds the band. */
function betterValue(
  best: Candidate | null,
  steadiest: Candidate | null,
  brief: SearchBrief,
): Candidate | null {
  if (steadiest === null || (best !== null && byValue(best, steadiest) <= 0)) return best;
  const { yieldWithinBand } = kitYield(steadiest, brief, guaranteedBand(steadiest, brief));
  return yieldWithinBand >= valueYield ? steadiest : best;
}

function byValue(a: Candidate, b: Candidate): number {
  return a.priceMinor - b.priceMinor || byCloseness(a, b);
}

/**
 * Tells frames whose capacitor and thresholds alone spread too far: a perfect timing resistor that hit
 * the target exactly would not hold the band. Remembered by tolerances, which few frames differ in.
 */
function createHopeless(brief: SearchBrief): (frame: Frame) => boolean {
  const known = new Map<string, boolean>();
  return (frame) => {
    const { capacitor, thresholds } = frame;
    const { r1, r2, r3 } = thresholds;
    const key = [
      capacitor.tolerance,
      capacitor.temperatureCoefficientPerKelvin,
      ...[r1, r2, r3].map((part) => part.tolerance),
      r1.ohms / r3.ohms,
      r2.ohms / r3.ohms,
    ].join();
    let answer = known.get(key);
    if (answer === undefined) {
      answer = !holdsBandAtBest(perfectCandidate(frame, brief), brief, hopelessYield);
      known.set(key, answer);
    }
    return answer;
  };
}

function perfectCandidate(frame: Frame, brief: SearchBrief): Candidate {
  const coefficient = -frame.capacitor.temperatureCoefficientPerKelvin;
  return {
    frame,
    timingOhms: 1,
    first: {
      ...frame.thresholds.r3,
      ohms: 1,
      tolerance: 0,
      temperatureCoefficientPerKelvin: coefficient,
    },
    second: null,
    join: null,
    frequencyHz: brief.targetHz,
    distance: 0,
    priceMinor: 0,
  };
}

/** Tolerances of a frame's own parts, a quick bound by which frames are shortlisted. */
function frameTolerance({ capacitor, thresholds: { r1, r2, r3 } }: Frame): number {
  return (
    capacitor.tolerance +
    capacitor.temperatureSpread +
    0.36 * (r1.tolerance + r2.tolerance) +
    0.72 * r3.tolerance
  );
}

/** The same for a whole candidate, its distance from the target included. */
function passiveTolerance(candidate: Candidate): number {
  const timing = Math.max(candidate.first.tolerance, candidate.second?.tolerance ?? 0);
  return candidate.distance + timing + frameTolerance(candidate.frame);
}

function findSteadiest(
  aimed: readonly AimedFrame[],
  tables: TimingTables,
  brief: SearchBrief,
): Candidate | null {
  const reaching = aimed.filter((frame) => frame.reaches);
  const tightest = (reaching.length > 0 ? reaching : [...aimed])
    .sort((a, b) => frameTolerance(a.frame) - frameTolerance(b.frame))
    .slice(0, framesShortlisted);
  const pool = tightest
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
