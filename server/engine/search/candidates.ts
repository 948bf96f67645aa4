import { periodAt, prepareSingle, type PreparedSingle } from '../prepared-single.ts';
import { firstNotBelow, type Composites } from './composites.ts';
import { compositeMakeable } from './demand.ts';
import { frameCircuit, type Frame } from './frame.ts';
import type { SearchBrief, StockedResistor } from './shelf.ts';
import { timingRoot } from './timing-root.ts';

/** One pack as the search sees it: a frame, a timing composite, and the nominal rate they give. */
export interface Candidate {
  frame: Frame;
  timingOhms: number;
  first: StockedResistor;
  second: StockedResistor | null;
  join: 'series' | 'parallel' | null;
  frequencyHz: number;
  /** |ln(frequency/target)|. */
  distance: number;
  priceMinor: number;
}

/** A frame made ready for a target: reduced circuit, and where its ideal timing resistance lies. */
export interface AimedFrame {
  frame: Frame;
  prepared: PreparedSingle;
  idealOhms: number;
  /** False when no allowed resistance gives the target, so that `idealOhms` is a limit. */
  reaches: boolean;
}

/** Reduces a frame's nominal circuit and finds the timing resistance that would hit the target. */
export function aimFrame(frame: Frame, brief: SearchBrief): AimedFrame {
  const prepared = prepareSingle(frameCircuit(frame, brief));
  const idealOhms = timingRoot(prepared, 1 / brief.targetHz);
  const miss = Math.abs(Math.log(periodAt(prepared, idealOhms) * brief.targetHz));
  return { frame, prepared, idealOhms, reaches: miss < 1e-6 && idealOhms >= frame.minTimingOhms };
}

/** Forms a candidate from composite `index`; null when the circuit would not oscillate with it. */
export function candidateAt(
  aimed: AimedFrame,
  composites: Composites,
  index: number,
  brief: SearchBrief,
): Candidate | null {
  const timingOhms = composites.ohms[index]!;
  const period = periodAt(aimed.prepared, timingOhms);
  if (!(period > 0)) return null;
  const first = composites.resistors[composites.first[index]!]!;
  const secondAt = composites.second[index]!;
  const second = secondAt < 0 ? null : composites.resistors[secondAt]!;
  const parallel = composites.parallel[index] === 1;
  return {
    frame: aimed.frame,
    timingOhms,
    first,
    second,
    join: second === null ? null : parallel ? 'parallel' : 'series',
    frequencyHz: 1 / period,
    distance: Math.abs(Math.log(period * brief.targetHz)),
    priceMinor: aimed.frame.priceMinor + first.priceMinor + (second?.priceMinor ?? 0),
  };
}

/**
 * The stocked composites next to the ideal resistance, up to `perSide` below and above it, plus all
 * that share the ohms of the last one taken, so that a tie never depends on sorting. Since the
 * period rises with resistance, no other composite of this frame can be closer.
 */
export function nearestCandidates(
  aimed: AimedFrame,
  composites: Composites,
  brief: SearchBrief,
  perSide: number,
): Candidate[] {
  const found: Candidate[] = [];
  const start = firstNotBelow(composites, Math.max(aimed.idealOhms, aimed.frame.minTimingOhms));
  for (const step of [-1, 1]) {
    let taken = 0;
    let lastOhms = NaN;
    for (let k = step < 0 ? start - 1 : start; k >= 0 && k < composites.ohms.length; k += step) {
      if (composites.ohms[k]! < aimed.frame.minTimingOhms) break;
      const tied = Math.abs(composites.ohms[k]! / lastOhms - 1) < 1e-12;
      if (taken >= perSide && !tied) break;
      if (!compositeMakeable(composites, k, aimed.frame.demand, brief.quantity)) continue;
      const candidate = candidateAt(aimed, composites, k, brief);
      if (candidate === null) break;
      found.push(candidate);
      if (!tied) taken += 1;
      lastOhms = composites.ohms[k]!;
    }
  }
  return found;
}

/**
 * Orders candidates by closeness; equal within 1e-12 they go by price, fewer parts, then the ids of
 * their parts, so that the order never depends on how they were found.
 */
export function byCloseness(a: Candidate, b: Candidate): number {
  if (Math.abs(a.distance - b.distance) > 1e-12) return a.distance - b.distance;
  return byPriceThenIds(a, b);
}

/** Orders candidates by price, then fewer parts, then ids. */
export function byPriceThenIds(a: Candidate, b: Candidate): number {
  return (
    a.priceMinor - b.priceMinor ||
    Number(a.second !== null) - Number(b.second !== null) ||
    a.frame.comparator.id - b.frame.comparator.id ||
    a.frame.capacitor.id - b.frame.capacitor.id ||
    a.frame.thresholds.r3.id - b.frame.thresholds.r3.id ||
    a.first.id - b.first.id ||
    (a.second?.id ?? 0) - (b.second?.id ?? 0) ||
    (a.join ?? '').localeCompare(b.join ?? '')
  );
}
