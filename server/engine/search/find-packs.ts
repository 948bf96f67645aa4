import type { Circuit } from '../circuit.ts';
import { byCloseness, byValue, isSamePack, type Candidate } from './candidate.ts';
import { aimFrames, closestByCapacitor, type AimedFrame } from './closest.ts';
import { findBestValue, holdsBand, mayHold, rememberHopeless, valueYield } from './best-value.ts';
import { guaranteedBand, worseEnd, type GuaranteedBand } from './guaranteed-band.ts';
import { headCircuit, headsFor } from './heads.ts';
import { inOrder } from './in-order.ts';
import { insulationSiemens } from './aim.ts';
import { conditionShifts, shiftRange, timingCoefficient } from './kit-effects.ts';
import { kitYield, type KitYield } from './kit-yield.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { capacitorSuits, limits } from './rules.ts';
import type { SearchBrief, StockedCapacitor } from './shelf.ts';
import { findSteadiest, quickBound, steadier, steadyOf, type Steady } from './steadiest.ts';
import { steeredCircuit, steeredPacks, steeredValues, supplyReach } from './steered.ts';
import { isEqualDuty } from './threshold-sets.ts';
import { listOffers } from './timing-choice.ts';
import { settingError, trimmedPack } from './trimmed.ts';
import { tunedClassOf } from './tuned-grid.ts';
import { tunedPacks } from './tuned.ts';

export type Rank = 'closest' | 'best-value' | 'steadiest';
export type Topology = 'equal-thresholds' | 'shifted-thresholds' | 'steered';

/** A candidate with its promise. */
export interface RankedPack extends Candidate, KitYield {
  circuit: Circuit;
  guaranteed: GuaranteedBand;
  topology: Topology;
  /** The ranks for which this pack is the first of all. */
  wins: Rank[];
}

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

/** Trimmed packs of the steadiest frames differ by their settings alone; so many are looked at. */
const trimmedLooked = 24;

/**
 * A steady trimmed pack alone: of the frames that supply, drift and dielectric leave the least, the
 * steadiest of the first two dozen packs.
 */
function steadiestTrimmed(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Steady | null {
  const fixed = shelf.shelf.resistors.filter(
    (part) => part.tolerance <= limits.thresholdTolerance * (1 + 1e-9),
  );
  const parts = [...fixed, ...shelf.shelf.trimmers];
  const coefficients = [...new Set(parts.map((part) => part.temperatureCoefficientPerKelvin))];
  const boundOf = (frame: AimedFrame) => {
    const shifts = conditionShifts(frame, frame.idealOhms, brief);
    // Set at 25 °C, a kit is as far off as it drifts to either side.
    const ends = coefficients.map((coefficient) => {
      const { up, down } = shiftRange(shifts, coefficient, -1);
      return Math.max(up, -down);
    });
    return 0.85 * frame.capacitor.temperatureSpread + 0.95 * Math.min(...ends);
  };
  const queue = inOrder(
    aimed.filter(({ reaches }) => reaches).map((frame) => ({ frame, bound: boundOf(frame) })),
    ({ bound }) => bound,
  );
  let best: Steady | null = null;
  let looked = 0;
  for (const { frame, bound } of queue) {
    if (best !== null && (bound > best.end || looked >= trimmedLooked)) break;
    const pack = trimmedPack(frame, brief, shelf);
    if (pack === null) continue;
    looked += 1;
    best = steadier(best, steadyOf(pack, brief, shelf));
  }
  return best;
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

/** The packs of care levels that fit the timing to each kit; null for those that do not. */
function fittedPacks(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate[] | null {
  if (brief.care === 'bench-tuned') return tunedPacks(aimed, brief, shelf);
  if (brief.care !== 'trimmer-fitted') return null;
  return aimed.flatMap((frame) => (frame.reaches ? (trimmedPack(frame, brief, shelf) ?? []) : []));
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

/** The cheapest of a list that holds the band and is cheaper than the best so far. */
function cheapestThatHolds(
  list: readonly Candidate[],
  before: Candidate | null,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate | null {
  const hopeless = rememberHopeless(brief);
  for (const candidate of [...list].sort(byValue)) {
    if (before !== null && byValue(candidate, before) >= 0) return before;
    if (candidate.distance > -Math.log1p(-brief.band)) continue;
    const { frame, timing } = candidate;
    if (timing.kind === 'single') {
      if (hopeless({ ...frame, idealOhms: timing.ohms })) continue;
      if (!mayHold({ ...candidate, timing }, brief)) continue;
    }
    if (holdsBand(candidate, brief, shelf)) return candidate;
  }
  return before;
}

function steadiestOf(
  list: readonly Candidate[],
  before: Steady | null,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Steady | null {
  const queue = list
    .map((candidate) => ({ candidate, bound: leastEnd(candidate, brief) }))
    .sort((a, b) => a.bound - b.bound);
  let best = before;
  for (const { candidate, bound } of queue) {
    if (best !== null && bound > best.end) break;
    best = steadier(best, steadyOf(candidate, brief, shelf));
  }
  return best;
}

/** Less than the worse end of a candidate: its tolerances, and nearly all of its drift. */
function leastEnd({ frame, timing }: Candidate, brief: SearchBrief): number {
  const { capacitor } = frame;
  if (timing.kind === 'steered') {
    const least = Math.min(timing.charge.tolerance, timing.discharge.tolerance);
    return joined(quickBound(frame, least), 0.9 * supplyReach(frame, timing, brief));
  }
  const plain = conditionShifts(frame, timing.ohms, brief);
  const coefficient =
    timing.kind === 'single'
      ? timingCoefficient(timing)
      : timing.fixed.temperatureCoefficientPerKelvin;
  const { up, down } = shiftRange(plain, coefficient, -1);
  if (timing.kind === 'trimmed') {
    return 0.85 * (capacitor.temperatureSpread + settingError(timing.ohms, timing.trimmer));
  }
  const measured = { ...frame, capacitor: { ...capacitor, tolerance: brief.meterUncertainty } };
  const least = Math.min(tunedClassOf(timing), timing.first.tolerance);
  return joined(quickBound(measured, least), (0.9 * (up - down)) / 2);
}

/** The worse end of a band whose half-width in ln is that of `bound` and `half` together. */
function joined(bound: number, half: number): number {
  return Math.tanh(Math.atanh(Math.min(bound, 0.999)) + half);
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

/** Adds the promise to a candidate: its nominal circuit, guaranteed band and yield. */
export function promise(
  candidate: Candidate,
  brief: SearchBrief,
  shelf: PreparedShelf,
): RankedPack {
  const guaranteed = guaranteedBand(candidate, brief, shelf);
  return {
    ...candidate,
    ...kitYield(candidate, brief, shelf, guaranteed),
    circuit: candidateCircuit(candidate, brief),
    guaranteed,
    topology: topologyOf(candidate, brief),
    wins: [],
  };
}

/** The nominal circuit of a candidate at 25 °C and the nominal supply. */
export function candidateCircuit({ frame, timing }: Candidate, brief: SearchBrief): Circuit {
  if (timing.kind === 'steered') {
    return steeredCircuit(frame, timing.diode, steeredValues(timing, frame), brief);
  }
  const { head, capacitor } = frame;
  const circuit = headCircuit(head, brief);
  const siemens = insulationSiemens(capacitor);
  return {
    ...circuit,
    timing: { kind: 'single', ohms: timing.ohms },
    capacitor: {
      ...circuit.capacitor,
      farads: capacitor.farads,
      leakageOhms: siemens > 0 ? 1 / siemens : null,
      leakageAmps: capacitor.leakageAmps,
    },
  };
}

function topologyOf({ timing, frame }: Candidate, brief: SearchBrief): Topology {
  if (timing.kind === 'steered') return 'steered';
  const { r1, r2, r3 } = frame.head.thresholds;
  const equal = r1.id === r2.id && r2.id === r3.id;
  return equal && isEqualDuty(brief.duty) ? 'equal-thresholds' : 'shifted-thresholds';
}
