import { aimFrame, framePeriod, type Frame } from './aim.ts';
import { byCloseness, sameDistance, type Candidate } from './candidate.ts';
import type { Head } from './heads.ts';
import { firstNotBelow } from './resistor-values.ts';
import type { SearchBrief, StockedCapacitor } from './shelf.ts';
import {
  cheapestChoice,
  isMakeable,
  type SingleTimingParts,
  type TimingStock,
} from './timing-choice.ts';

/** A frame made ready for a target. */
export interface AimedFrame extends Frame {
  /** Timing resistance that would hit the target, or the limit nearest to it. */
  idealOhms: number;
  /** False when no allowed resistance gives the target. */
  reaches: boolean;
  /** Net price without the timing resistance, in minor units. */
  priceMinor: number;
  stock: TimingStock;
  /** Places in the timing table of the nearest entries that the shelf holds, below and above; −1 for none. */
  below: number;
  above: number;
  /** Least |ln(frequency/target)| of this frame over all that the shelf holds; ∞ for none. */
  distance: number;
}

/** Aims every head with every capacitor; see `AimedFrame`. */
export function aimFrames(
  heads: readonly Head[],
  capacitors: readonly StockedCapacitor[],
  stock: Omit<TimingStock, 'demand'>,
  brief: SearchBrief,
): AimedFrame[] {
  return heads.flatMap((head) => {
    const own = { ...stock, demand: head.demand };
    return capacitors.map((capacitor) => aimOne({ head, capacitor }, own, brief));
  });
}

function aimOne(frame: Frame, stock: TimingStock, brief: SearchBrief): AimedFrame {
  const { head, capacitor } = frame;
  const { ohms, reaches } = aimFrame(frame, brief);
  const aimed: AimedFrame = {
    head,
    capacitor,
    idealOhms: ohms,
    reaches: reaches && ohms >= head.minTimingOhms,
    priceMinor: head.priceMinor + capacitor.priceMinor,
    stock,
    below: -1,
    above: -1,
    distance: Number.POSITIVE_INFINITY,
  };
  findNeighbours(aimed, brief);
  return aimed;
}

/**
 * Since the period rises with resistance, nothing the shelf holds is nearer to the target than the
 * next entry below the ideal resistance and the next above.
 */
function findNeighbours(aimed: AimedFrame, brief: SearchBrief): void {
  const { table } = aimed.stock;
  const { minTimingOhms } = aimed.head;
  const start = firstNotBelow(table.ohms, Math.max(aimed.idealOhms, minTimingOhms));
  for (let k = start - 1; k >= 0 && table.ohms[k]! >= minTimingOhms; k -= 1) {
    if (!isMakeable(aimed.stock, k)) continue;
    aimed.below = k;
    break;
  }
  for (let k = start; k < table.ohms.length; k += 1) {
    if (!isMakeable(aimed.stock, k)) continue;
    aimed.above = k;
    break;
  }
  for (const k of [aimed.below, aimed.above]) {
    if (k < 0) continue;
    const distance = distanceAt(aimed, k, brief);
    if (distance < aimed.distance) aimed.distance = distance;
  }
}

/** NaN, which compares as no improvement, for an entry with which the circuit would not oscillate. */
function distanceAt(aimed: AimedFrame, k: number, brief: SearchBrief): number {
  return Math.abs(Math.log(framePeriod(aimed, aimed.stock.table.ohms[k]!) * brief.targetHz));
}

/** Puts a frame and its timing parts together; null when they do not oscillate. */
export function formCandidate(
  frame: Frame,
  timing: SingleTimingParts,
  brief: SearchBrief,
): Candidate<SingleTimingParts> | null {
  const period = framePeriod(frame, timing.ohms);
  if (!(period > 0)) return null;
  return {
    frame: { head: frame.head, capacitor: frame.capacitor },
    timing,
    frequencyHz: 1 / period,
    distance: Math.abs(Math.log(period * brief.targetHz)),
    priceMinor:
      frame.head.priceMinor +
      frame.capacitor.priceMinor +
      timing.first.priceMinor +
      (timing.second?.priceMinor ?? 0),
  };
}

/** The closest candidate of one frame, ties by price and ids; null when the shelf holds none. */
export function closestOfFrame(
  aimed: AimedFrame,
  brief: SearchBrief,
): Candidate<SingleTimingParts> | null {
  let best: Candidate<SingleTimingParts> | null = null;
  for (const k of tiedEntries(aimed)) {
    const timing = cheapestChoice(aimed.stock, k);
    const candidate = timing && formCandidate(aimed, timing, brief);
    if (candidate && (best === null || byCloseness(candidate, best) < 0)) best = candidate;
  }
  return best;
}

/** The neighbours and all entries that share their ohms, so that a tie never depends on sorting. */
function tiedEntries({ below, above, stock }: AimedFrame): number[] {
  const { ohms } = stock.table;
  const found: number[] = [];
  const same = (a: number, b: number) => Math.abs(ohms[a]! / ohms[b]! - 1) < sameDistance;
  for (let k = below; k >= 0 && same(k, below); k -= 1) found.push(k);
  for (let k = above; k >= 0 && k < ohms.length && same(k, above); k += 1) found.push(k);
  return found;
}

/**
 * The closest candidate of every capacitor, nearest first. The first is the closest of all that the
 * shelf holds and the rules allow.
 */
export function closestByCapacitor(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
): Candidate<SingleTimingParts>[] {
  const least = new Map<number, number>();
  for (const { capacitor, distance } of aimed) {
    if (distance < (least.get(capacitor.id) ?? Number.POSITIVE_INFINITY)) {
      least.set(capacitor.id, distance);
    }
  }
  const best = new Map<number, Candidate<SingleTimingParts>>();
  for (const frame of aimed) {
    if (!(frame.distance <= (least.get(frame.capacitor.id) ?? -1) + sameDistance)) continue;
    const candidate = closestOfFrame(frame, brief);
    const known = best.get(frame.capacitor.id);
    if (candidate && (!known || byCloseness(candidate, known) < 0)) {
      best.set(frame.capacitor.id, candidate);
    }
  }
  return [...best.values()].sort(byCloseness);
}
