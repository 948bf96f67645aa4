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

/** Frames further off than half as fast again, or half as slow, are no answer where others are nearer. */
const farthest = Math.log(1.5);

/**
 * Aims every head with every capacitor; see `AimedFrame`. Capacitors alike to the circuit share one
 * aim. Where some frame comes within half as fast again, those that do not are left out.
 */
export function aimFrames(
  heads: readonly Head[],
  capacitors: readonly StockedCapacitor[],
  stock: Omit<TimingStock, 'demand'>,
  brief: SearchBrief,
): AimedFrame[] {
  const groups = groupAlike(capacitors);
  let nearest = Number.POSITIVE_INFINITY;
  const aims = heads.map((head) => {
    const own = { ...stock, demand: head.demand };
    const aimed: Aim[] = [];
    capacitors.forEach((capacitor, k) => {
      const aim = (aimed[groups[k]!] ??= aimOne({ head, capacitor }, own, brief));
      nearest = Math.min(nearest, aim.distance);
    });
    return { head, own, aimed };
  });
  const limit = nearest <= farthest ? farthest : Number.POSITIVE_INFINITY;
  const frames: AimedFrame[] = [];
  for (const { head, own, aimed } of aims) {
    capacitors.forEach((capacitor, k) => {
      const { idealOhms, reaches, below, above, distance } = aimed[groups[k]!]!;
      if (distance > limit) return;
      frames.push({
        head,
        capacitor,
        idealOhms,
        reaches,
        priceMinor: head.priceMinor + capacitor.priceMinor,
        stock: own,
        below,
        above,
        distance,
      });
    });
  }
  return frames;
}

/** A number for each capacitor, the same for those of one value and leakage. */
function groupAlike(capacitors: readonly StockedCapacitor[]): number[] {
  const numbers = new Map<string, number>();
  return capacitors.map(({ farads, insulationSeconds, leakageAmps }) => {
    const key = `${farads} ${insulationSeconds} ${leakageAmps}`;
    const known = numbers.get(key) ?? numbers.size;
    numbers.set(key, known);
    return known;
  });
}

type Aim = Pick<AimedFrame, 'idealOhms' | 'reaches' | 'below' | 'above' | 'distance'>;

function aimOne(frame: Frame, stock: TimingStock, brief: SearchBrief): Aim {
  const { ohms, reaches } = aimFrame(frame, brief);
  const aim: Aim = {
    idealOhms: ohms,
    reaches: reaches && ohms >= frame.head.minTimingOhms,
    below: -1,
    above: -1,
    distance: Number.POSITIVE_INFINITY,
  };
  findNeighbours(frame, aim, stock, brief);
  return aim;
}

/**
 * Since the period rises with resistance, nothing the shelf holds is nearer to the target than the
 * next entry below the ideal resistance and the next above.
 */
function findNeighbours(frame: Frame, aim: Aim, stock: TimingStock, brief: SearchBrief): void {
  const { table } = stock;
  const { minTimingOhms } = frame.head;
  const start = firstNotBelow(table.ohms, Math.max(aim.idealOhms, minTimingOhms));
  for (let k = start - 1; k >= 0 && table.ohms[k]! >= minTimingOhms; k -= 1) {
    if (!isMakeable(stock, k)) continue;
    aim.below = k;
    break;
  }
  for (let k = start; k < table.ohms.length; k += 1) {
    if (!isMakeable(stock, k)) continue;
    aim.above = k;
    break;
  }
  for (const k of [aim.below, aim.above]) {
    if (k < 0) continue;
    // NaN, for an entry with which the circuit would not oscillate, compares as no improvement.
    const distance = Math.abs(Math.log(framePeriod(frame, table.ohms[k]!) * brief.targetHz));
    if (distance < aim.distance) aim.distance = distance;
  }
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
 * shelf holds and the rules allow. `aimed` must come from `aimFrames`.
 */
export function closestByCapacitor(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
): Candidate<SingleTimingParts>[] {
  const least = new Map<number, { distance: number; frames: AimedFrame[] }>();
  for (const frame of aimed) {
    if (frame.distance === Number.POSITIVE_INFINITY) continue;
    const known = least.get(frame.capacitor.id);
    if (!known || frame.distance < known.distance - sameDistance) {
      least.set(frame.capacitor.id, { distance: frame.distance, frames: [frame] });
    } else if (frame.distance <= known.distance + sameDistance) {
      known.frames.push(frame);
      known.distance = Math.min(known.distance, frame.distance);
    }
  }
  const best = [...least.values()].flatMap(({ frames }) => {
    const found = frames.flatMap((frame) => closestOfFrame(frame, brief) ?? []);
    return found.sort(byCloseness).slice(0, 1);
  });
  return best.sort(byCloseness);
}
