import type { Frame } from './aim.ts';
import { byPriceThenIds, type Candidate } from './candidate.ts';
import { closestOfFrame, formCandidate, type AimedFrame } from './closest.ts';
import { guaranteedBand, timingAt, worseEnd } from './guaranteed-band.ts';
import {
  capacitanceAt,
  extremeRate,
  fewCorners,
  headCorners,
  logDrift,
  type HeadCorners,
} from './head-corners.ts';
import { inOrder } from './in-order.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { firstNotBelow } from './resistor-values.ts';
import type { SearchBrief } from './shelf.ts';
import { firstShare, leastTolerance } from './least-tolerance.ts';
import { kindsNear, mixedKinds, type TimingKind } from './timing-kinds.ts';
import { chosenParts, visitChoices, type SingleTimingParts } from './timing-choice.ts';

/** A candidate with the worse end of its guaranteed band, as a fraction of the target. */
export interface Steady {
  candidate: Candidate;
  end: number;
}

const sameEnd = 1e-12;

/** The better of two by the worse end, equals by price and ids. */
export function steadier(a: Steady | null, b: Steady | null): Steady | null {
  if (a === null || b === null) return a ?? b;
  if (Math.abs(a.end - b.end) > sameEnd) return a.end < b.end ? a : b;
  return byPriceThenIds(a.candidate, b.candidate) <= 0 ? a : b;
}

/**
 * The candidate whose guaranteed band has the least worse end, over every frame and every timing
 * resistance that the shelf holds; null when it holds none. Frames go by a lower bound of what they
 * can reach, and within a frame the walk outwards from the middle ends where even a
 * perfect resistor would be too far off, so nothing that could win is left out. Only where a frame's
 * kits stray by more than 30 % whatever the resistor, its nearest pack stands for all.
 */
export function findSteadiest(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Steady | null {
  const kinds = mixedKinds(aimed[0]?.stock.offers ?? []);
  const tolerance = kinds.reduce((least, kind) => Math.min(least, kind.tolerance), 1);
  const kindsAt = ({ stock, idealOhms, reaches }: AimedFrame) =>
    reaches ? kindsNear(shelf.values, stock.offers, idealOhms) : kinds;
  const queue = inOrder(
    aimed
      .filter((frame) => frame.distance < Number.POSITIVE_INFINITY)
      .map((frame) => ({
        frame,
        // A band has its nominal rate inside.
        bound: Math.max(quickBound(frame, tolerance), -Math.expm1(-frame.distance)),
      })),
    ({ bound }) => bound,
  );
  let best: Steady | null = null;
  for (let from = 0; from < queue.length; from += batchLength) {
    const batch = queue.slice(from, from + batchLength);
    if (best !== null && batch[0]!.bound > best.end) break;
    const closer = batch
      .filter(({ bound }) => best === null || bound <= best.end)
      .map(({ frame }) => ({ frame, bound: leastEnd(partialReach(frame, brief), kindsAt(frame)) }))
      .sort((a, b) => a.bound - b.bound);
    for (const { frame, bound } of closer) {
      if (best !== null && bound - estimateSlack > best.end) break;
      best = steadiestOfFrame(frame, brief, shelf, kindsAt(frame), best);
    }
  }
  return best;
}

/** Frames are looked at in batches: by a quick bound between them, by a closer one within. */
const batchLength = 256;

/**
 * The period goes with at least this power of R, C and the thresholds' ratio: delays take a tenth of
 * it at most, and the rest is left for leakage and output resistance.
 */
const leastPower = 0.85;

/**
 * Less than any pack of the frame can reach, from tolerances alone: a band of ratio q about the target
 * has a worse end of (q − 1)/(q + 1) at least.
 */
export function quickBound({ capacitor, head }: Frame, timingTolerance: number): number {
  const { r1, r2, r3 } = head.thresholds;
  const [x1, x2] = [r1.ohms / (r1.ohms + r3.ohms), r2.ohms / (r2.ohms + r3.ohms)];
  const log = Math.log1p(r1.ohms / r3.ohms) + Math.log1p(r2.ohms / r3.ohms);
  const thresholds =
    (x1 * (r1.tolerance + r3.tolerance) + x2 * (r2.tolerance + r3.tolerance)) / log;
  const half =
    capacitor.tolerance + capacitor.temperatureSpread + timingTolerance + leastPower * thresholds;
  return Math.tanh(leastPower * half);
}

/** How far the corners of a frame reach with a perfect timing resistor of the ideal value. */
interface Reach {
  celsius: readonly number[];
  /** ln of slowest and fastest rate over the target, by temperature. */
  slow: number[];
  fast: number[];
  /** −d ln f / d ln R4 of the slowest and the fastest kit, towards more and less resistance. */
  slowPower: number;
  fastPower: number;
}

/** Step in R4 by which the powers are found: as wide as the widest tolerance. */
const powerStep = 0.05;

function reachOf(frame: AimedFrame, brief: SearchBrief): Reach {
  return reachOver(frame, brief, headCorners(frame.head, brief));
}

/** As `reachOf` over a few of the corners that are the furthest as a rule: never wider. */
function partialReach(frame: AimedFrame, brief: SearchBrief): Reach {
  return reachOver(frame, brief, fewCorners(frame.head, brief));
}

function reachOver(frame: AimedFrame, brief: SearchBrief, corners: HeadCorners): Reach {
  const { capacitor, idealOhms } = frame;
  const logAt = (corner: 'slow' | 'fast', t: number, ohms: number) => {
    const farads = capacitanceAt(capacitor, corner, corners.celsius[t]!);
    return Math.log(extremeRate(corners, corner, t, ohms, farads, capacitor) / brief.targetHz);
  };
  const slow = corners.celsius.map((_, t) => logAt('slow', t, idealOhms));
  const fast = corners.celsius.map((_, t) => logAt('fast', t, idealOhms));
  const slower = logAt('slow', 0, idealOhms * (1 + powerStep));
  const faster = logAt('fast', 0, idealOhms * (1 - powerStep));
  return {
    celsius: corners.celsius,
    slow,
    fast,
    slowPower: finiteOrOne((slow[0]! - slower) / Math.log1p(powerStep)),
    fastPower: finiteOrOne((fast[0]! - faster) / Math.log1p(-powerStep)),
  };
}

/** A corner that stands still has no power; any will do, since its end is the worst there is. */
function finiteOrOne(power: number): number {
  return Number.isFinite(power) ? power : 1;
}

/** Estimates are this near to the band by the full model, as a fraction of the rate. */
const estimateSlack = 4e-6;
/** Once an estimate of a frame was put right by the full model, the others are this near. */
const correctedSlack = 2e-7;

/** No pack that strays further is steady; of a frame that can do no better only the nearest is looked at. */
const steadyEnd = 0.3;

function nearestOfFrame(
  frame: AimedFrame,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Steady | null {
  const nearest = closestOfFrame(frame, brief);
  return nearest && steadyOf(nearest, brief, shelf);
}

function steadiestOfFrame(
  frame: AimedFrame,
  brief: SearchBrief,
  shelf: PreparedShelf,
  kinds: readonly TimingKind[],
  before: Steady | null,
): Steady | null {
  let best = before;
  const reach = reachOf(frame, brief);
  const least = leastEnd(reach, kinds);
  if (best !== null && least - estimateSlack > best.end) return best;
  if (!(least <= steadyEnd)) return steadier(best, nearestOfFrame(frame, brief, shelf));
  const { table } = frame.stock;
  const middle = frame.idealOhms * Math.exp(middleOf(reach, kinds));
  const start = firstNotBelow(table.ohms, Math.max(middle, frame.head.minTimingOhms));
  let [correction, slack] = [0, estimateSlack];
  const windowNow = () =>
    windowFor(reach, kinds, (best?.end ?? Number.POSITIVE_INFINITY) - correction + slack);
  let [from, to] = windowNow();
  for (const step of [-1, 1]) {
    for (let k = step < 0 ? start - 1 : start; k >= 0 && k < table.ohms.length; k += step) {
      if (table.ohms[k]! < frame.head.minTimingOhms) break;
      const away = Math.log(table.ohms[k]! / frame.idealOhms);
      if (step < 0 ? away < from : away > to) break;
      const most = best === null ? 1 : mostTolerance(reach, away, best.end - correction + slack);
      const share = firstShare(frame, k);
      if (leastTolerance(frame, k, share) > most) continue;
      visitChoices(frame.stock, k, (first, second) => {
        const tolerance = share * first.tolerance + (1 - share) * (second?.tolerance ?? 0);
        if (tolerance > most) return;
        const timing = chosenParts(table, k, { first, second });
        const end = estimatedEnd(frame, reach, timing);
        if (best !== null && end + correction - slack > best.end) return;
        const found = assess(frame, timing, brief, shelf);
        if (found === null) return;
        [correction, slack] = [found.end - end, correctedSlack];
        const better = steadier(best, found);
        if (better === best) return;
        best = better;
        [from, to] = windowNow();
      });
    }
  }
  return best;
}

/** Where a resistor of the best kind should lie, in ln from the ideal value, for both ends to be equally far. */
function middleOf(reach: Reach, kinds: readonly TimingKind[]): number {
  let [least, middle] = [Number.POSITIVE_INFINITY, 0];
  for (const kind of kinds) {
    const [low, high] = endsOf(reach, kind);
    if (high - low >= least) continue;
    least = high - low;
    const end = Math.tanh(least / 2);
    middle =
      (high - Math.log1p(end)) / reach.fastPower / 2 +
      (low - Math.log1p(-end)) / reach.slowPower / 2;
  }
  return Number.isFinite(middle) ? middle : 0;
}

/** ln of the extreme rates with a resistor of a kind at the ideal value. */
function endsOf(
  { slow, fast, celsius, slowPower, fastPower }: Reach,
  kind: TimingKind,
): [number, number] {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (let t = 0; t < celsius.length; t += 1) {
    const drifted = logDrift(kind.coefficientPerKelvin, celsius[t]!);
    low = Math.min(low, slow[t]! - slowPower * drifted);
    high = Math.max(high, fast[t]! - fastPower * drifted);
  }
  return [
    low - slowPower * Math.log1p(kind.tolerance),
    high - fastPower * Math.log1p(-kind.tolerance),
  ];
}

/** The least worse end that a resistor of any of the kinds and of any value could reach. */
function leastEnd(reach: Reach, kinds: readonly TimingKind[]): number {
  return kinds.reduce((least, kind) => {
    const [low, high] = endsOf(reach, kind);
    return Math.min(least, Math.tanh((high - low) / 2));
  }, 1);
}

/**
 * How far from the ideal resistance (ln, downwards and upwards) a resistor of some kind can be for a
 * worse end under `end`.
 */
function windowFor(reach: Reach, kinds: readonly TimingKind[], end: number): [number, number] {
  let [from, to] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const kind of kinds) {
    const [low, high] = endsOf(reach, kind);
    const least = (high - Math.log1p(end)) / reach.fastPower;
    const most = end < 1 ? (low - Math.log1p(-end)) / reach.slowPower : Number.POSITIVE_INFINITY;
    if (least > most) continue;
    from = Math.min(from, least);
    to = Math.max(to, most);
  }
  return [from, to];
}

/**
 * More than the tolerance with which a resistance `away` (ln) from the ideal one can have a worse end
 * under `end`: what is left at 25 °C, where nothing drifts. 1 where 25 °C is not in the range.
 */
function mostTolerance(reach: Reach, away: number, end: number): number {
  const t = reach.celsius.indexOf(25);
  if (t < 0 || end >= 1) return 1;
  const fast = away + (Math.log1p(end) - reach.fast[t]!) / reach.fastPower;
  const slow = (reach.slow[t]! - Math.log1p(-end)) / reach.slowPower - away;
  // Two parts side by side spread a little less than their shares say.
  return Math.min(Math.expm1(slow), -Math.expm1(-fast)) * 1.05 + 1e-5;
}

/** Worse end of timing parts, from the reach of their frame and the parts' own corners. */
function estimatedEnd(
  { idealOhms }: AimedFrame,
  { celsius, slow, fast, slowPower, fastPower }: Reach,
  timing: SingleTimingParts,
): number {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (let t = 0; t < celsius.length; t += 1) {
    const most = timingAt(timing, 1, celsius[t]!);
    const least = timingAt(timing, -1, celsius[t]!);
    low = Math.min(low, slow[t]! - slowPower * Math.log(most / idealOhms));
    high = Math.max(high, fast[t]! - fastPower * Math.log(least / idealOhms));
  }
  return Math.max(Math.expm1(high), -Math.expm1(low));
}

function assess(
  frame: AimedFrame,
  timing: SingleTimingParts,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Steady | null {
  const candidate = formCandidate(frame, timing, brief);
  return candidate === null ? null : steadyOf(candidate, brief, shelf);
}

/** A candidate with its worse end. */
export function steadyOf(candidate: Candidate, brief: SearchBrief, shelf: PreparedShelf): Steady {
  const end = worseEnd(guaranteedBand(candidate, brief, shelf), brief.targetHz);
  return { candidate, end };
}
