import type { Frame } from './aim.ts';
import { inOrder } from './in-order.ts';
import { byValue, type Candidate } from './candidate.ts';
import { formCandidate, type AimedFrame } from './closest.ts';
import { densityOfSum, distributionWith, integrals, momentsOf, type Integrals } from './density.ts';
import { guaranteedBand } from './guaranteed-band.ts';
import {
  frameEffects,
  frameMoves,
  shiftRange,
  timingCoefficient,
  type FrameMoves,
  type KitEffect,
} from './kit-effects.ts';
import {
  frameSpread,
  kitYield,
  shareBetween,
  shareWithin,
  timingSpread,
  type FrameSpread,
} from './kit-yield.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { firstNotBelow } from './resistor-values.ts';
import type { SearchBrief } from './shelf.ts';
import { keptWith } from './kept-with.ts';
import { chosenParts, visitChoices, type Offers, type SingleTimingParts } from './timing-choice.ts';
import { firstShare, leastTolerance } from './least-tolerance.ts';
import { kindsNear, type TimingKind } from './timing-kinds.ts';

/** A pack is best value only when at least this share of kits holds the band. */
export const valueYield = 0.99;
/** Quick bounds are this near to the stated yield. */
const yieldSlack = 0.002;

/**
 * The cheapest candidate of which at least 99 % of kits hold the band, the nearer one among equals in
 * price, over every frame and every timing resistance that the shelf holds. Frames go by price, so
 * the walk ends once even the cheapest resistor would make the next one dearer. Null when no pack
 * holds the band.
 */
export function findBestValue(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate | null {
  const cheapest = shelf.shelf.resistors.reduce(
    (least, part) => Math.min(least, part.priceMinor),
    Number.POSITIVE_INFINITY,
  );
  const hopeless = rememberHopeless(brief);
  const queue = inOrder(
    aimed.filter((frame) => frame.distance <= -Math.log1p(-brief.band)),
    (frame) => frame.priceMinor,
  );
  let best: Candidate | null = null;
  for (const frame of queue) {
    if (best !== null && frame.priceMinor + cheapest > best.priceMinor) break;
    if (hopeless(frame)) continue;
    const moves = frameMoves(frame, frame.idealOhms, brief);
    const kinds = kindsNear(shelf.values, frame.stock.offers, frame.idealOhms);
    const window = widestWindow(moves, kinds, brief);
    if (isTooWide(moves.effects, window.upper - window.lower)) continue;
    const spread = frameSpread(frame, frame.idealOhms, brief, moves);
    const tightest = kinds.reduce((least, kind) => Math.min(least, kind.tolerance), 1);
    const promising = promisingOffsets(spread, window, tightest * mixing);
    if (promising === null) continue;
    best = cheapestOfFrame({ frame, spread, window, promising }, brief, best);
  }
  return best;
}

/** Standard deviations to either side that 99 % of a single uniform cause take, and of a normal one. */
const uniformDeviations = 0.99 * Math.sqrt(3);
const normalDeviations = 2.576;

/**
 * True when the causes leave too few kits in the band, told from their moments alone: 99 % of a sum
 * take the more standard deviations the nearer its kurtosis is to the normal's. Less than the truth
 * for sums of two and more uniform causes, with 3 % to spare.
 */
function isTooWide(effects: readonly KitEffect[], room: number): boolean {
  let [variance, squares] = [0, 0];
  for (const { effect } of effects) {
    const own = momentsOf(effect).variance;
    variance += own;
    squares += own * own;
  }
  const likeUniform = Math.min(1, squares / (variance * variance));
  const deviations = normalDeviations + (uniformDeviations - normalDeviations) * likeUniform ** 0.7;
  return 0.97 * deviations * Math.sqrt(variance) > room / 2;
}

/**
 * Tells frames whose capacitor and thresholds alone spread too far: with a perfect timing resistor
 * on the target they would not hold the band. Remembered by what decides it.
 */
export function rememberHopeless(
  brief: SearchBrief,
): (frame: Frame & { idealOhms: number }) => boolean {
  const known = new Map<string, boolean>();
  return (frame) => {
    const { capacitor, head } = frame;
    const { r1, r2, r3 } = head.thresholds;
    const key = [
      ...[capacitor, r1, r2, r3].map((part) => part.tolerance),
      capacitor.deviation,
      capacitor.temperatureSpread,
      r1.ohms / r3.ohms,
      r2.ohms / r3.ohms,
    ].join();
    let answer = known.get(key);
    if (answer === undefined) {
      const effects = frameEffects(frame, frame.idealOhms, brief)
        .filter(({ cause }) => cause === 'capacitor' || cause === 'thresholds')
        .map(({ effect }) => effect);
      const most = mostWithin(integrals(densityOfSum(effects)), bandWidth(brief));
      answer = most < valueYield - yieldSlack;
      known.set(key, answer);
    }
    return answer;
  };
}

/**
 * False when a pack's causes, told from their moments alone, leave too few kits in the band beside
 * what supply and temperature take of it.
 */
export function mayHold(
  { frame, timing }: Candidate<SingleTimingParts>,
  brief: SearchBrief,
): boolean {
  const moves = frameMoves(frame, timing.ohms, brief);
  const kind = { tolerance: 0, coefficientPerKelvin: timingCoefficient(timing) };
  const window = widestWindow(moves, [kind], brief);
  return window.upper > window.lower && !isTooWide(moves.effects, window.upper - window.lower);
}

/** Width of the asked band in ln of the rate. */
function bandWidth({ band }: SearchBrief): number {
  return Math.log((1 + band) / (1 - band));
}

/** Limits of ln of the rate at 25 °C and the nominal supply within which a kit holds the band. */
interface Window {
  lower: number;
  upper: number;
}

/** The widest window that a timing resistor of any kind leaves; each end by the kind that suits it. */
function widestWindow(
  { shifts, sensitivity }: FrameMoves,
  kinds: readonly TimingKind[],
  brief: SearchBrief,
): Window {
  const window = { lower: Number.POSITIVE_INFINITY, upper: Number.NEGATIVE_INFINITY };
  for (const { coefficientPerKelvin } of kinds) {
    const { up, down } = shiftRange(shifts, coefficientPerKelvin, sensitivity);
    window.upper = Math.max(window.upper, Math.log(1 + brief.band) - up);
    window.lower = Math.min(window.lower, Math.log(1 - brief.band) - down);
  }
  return window;
}

/** Two like resistors together spread less than one; at best as one of this share of their tolerance. */
const mixing = 0.5;
const windowStep = 16;

/**
 * Between which nominal rates (ln over the target) a resistor that spreads by `half` could have enough
 * kits in a window; null where none could.
 */
function promisingOffsets(
  { parts }: FrameSpread,
  { lower, upper }: Window,
  half: number,
): Window | null {
  let found: Window | null = null;
  const step = windowStep * parts[0]!.of.step;
  for (let offset = lower - step; offset <= upper + step; offset += step) {
    const share = shareBetween(parts, lower - offset, upper - offset, [half, 0]);
    if (share < valueYield - scanSlack) continue;
    if (found === null) found = { lower: offset - step, upper: offset + step };
    else found.upper = offset + step;
  }
  return found;
}

/** The scan's steps are so wide that the best place may hold this much more than the best step. */
const scanSlack = 0.01;

/** The most that a window of a width can hold, wherever it lies. */
function mostWithin(of: Integrals, width: number): number {
  let best = 0;
  for (let k = 0; k < of.once.length; k += windowStep) {
    const to = of.start + k * of.step;
    const share = distributionWith(of, to, 0, 0) - distributionWith(of, to - width, 0, 0);
    if (share > best) best = share;
  }
  return best;
}

/** A frame that may hold the band, with what bounds its packs. */
interface PromisingFrame {
  frame: AimedFrame;
  spread: FrameSpread;
  window: Window;
  promising: Window;
}

function cheapestOfFrame(
  { frame, spread, window, promising }: PromisingFrame,
  brief: SearchBrief,
  before: Candidate | null,
): Candidate | null {
  let best = before;
  const { stock, head, idealOhms } = frame;
  const { table } = stock;
  const prices = leastPrices(stock.offers);
  const visit = (k: number, offset: number) => {
    const secondAt = table.second[k]!;
    const least = prices[table.first[k]!]! + (secondAt < 0 ? 0 : prices[secondAt]!);
    if (least === Number.POSITIVE_INFINITY) return;
    if (best !== null) {
      const room = best.priceMinor - frame.priceMinor - least;
      // At the best price so far only a nearer pack is of use.
      if (room < 0 || (room === 0 && Math.abs(offset) > 1.2 * best.distance + 1e-9)) return;
    }
    const half = mixing * leastTolerance(frame, k, firstShare(frame, k));
    const [lower, upper] = [window.lower - offset, window.upper - offset];
    const most = shareBetween(spread.parts, lower, upper, [half, 0]);
    if (most < valueYield - yieldSlack) return;
    visitChoices(stock, k, (first, second) => {
      const price = frame.priceMinor + first.priceMinor + (second?.priceMinor ?? 0);
      if (best !== null && price > best.priceMinor) return;
      const timing = chosenParts(table, k, { first, second });
      const estimate = shareWithin(spread, timingSpread(timing, offset), brief);
      if (estimate < valueYield - yieldSlack) return;
      const candidate = formCandidate(frame, timing, brief);
      if (candidate === null || (best !== null && byValue(candidate, best) >= 0)) return;
      const actual = Math.log(candidate.frequencyHz / brief.targetHz);
      if (shareWithin(spread, timingSpread(timing, actual), brief) >= valueYield) {
        best = candidate;
      }
    });
  };
  const start = firstNotBelow(table.ohms, Math.max(idealOhms, head.minTimingOhms));
  // Outwards from the target, so that a good pack is found early and prices out the rest.
  for (let [down, up] = [start - 1, start]; down >= 0 || up < table.ohms.length;) {
    if (up < table.ohms.length) {
      const offset = spread.sensitivity * Math.log(table.ohms[up]! / idealOhms);
      if (offset < promising.lower) up = table.ohms.length;
      else visit(up++, offset);
    }
    if (down >= 0) {
      const offset = spread.sensitivity * Math.log(table.ohms[down]! / idealOhms);
      if (offset > promising.upper || table.ohms[down]! < head.minTimingOhms) down = -1;
      else visit(down--, offset);
    }
  }
  return best;
}

/** The least price of each value's offers; ∞ for none. */
const leastPrices = keptWith((offers: Offers) =>
  Float64Array.from(offers, (parts) => parts[0]?.priceMinor ?? Number.POSITIVE_INFINITY),
);

/** Whether at least 99 % of a candidate's kits hold the band, as its promise says. */
export function holdsBand(candidate: Candidate, brief: SearchBrief, shelf: PreparedShelf): boolean {
  const guaranteed = guaranteedBand(candidate, brief, shelf);
  return kitYield(candidate, brief, shelf, guaranteed).yieldWithinBand >= valueYield;
}
