import type { Frame } from './aim.ts';
import type { StockedDiode, StockedResistor, StockedTrimmer } from './shelf.ts';
import type { SingleTimingParts } from './timing-choice.ts';

/** Two resistors, each behind one of two like diodes. */
export interface SteeredTimingParts {
  kind: 'steered';
  charge: StockedResistor;
  discharge: StockedResistor;
  diode: StockedDiode;
}

/** A resistor in series with a trimmer; `ohms` is what both make together at the target. */
export interface TrimmedTimingParts {
  kind: 'trimmed';
  ohms: number;
  fixed: StockedResistor;
  trimmer: StockedTrimmer;
}

export type TimingParts = SingleTimingParts | SteeredTimingParts | TrimmedTimingParts;

/** One pack as the search sees it: a frame, its timing parts, and the nominal rate they give. */
export interface Candidate<Timing extends TimingParts = TimingParts> {
  frame: Frame;
  timing: Timing;
  frequencyHz: number;
  /** |ln(frequency/target)|. */
  distance: number;
  /** Net price of the parts that vary between packs, in minor units. */
  priceMinor: number;
}

/** Ids of the timing parts in a fixed order, for ties; 0 where there is none. */
function timingIds(timing: TimingParts): readonly [number, number, number] {
  if (timing.kind === 'single') return [timing.first.id, timing.second?.id ?? 0, 0];
  if (timing.kind === 'steered') return [timing.charge.id, timing.discharge.id, timing.diode.id];
  return [timing.fixed.id, timing.trimmer.id, 0];
}

const kindOrder = { single: 0, steered: 1, trimmed: 2 } as const;
const joinOrder = { series: 1, parallel: 2 } as const;

function joinRank(timing: TimingParts): number {
  return timing.kind === 'single' && timing.join !== null ? joinOrder[timing.join] : 0;
}

/**
 * Orders candidates by price, then simpler timing, then the ids of their parts, so that the order
 * never depends on how they were found. Zero only for packs of the same parts.
 */
export function byPriceThenIds(a: Candidate, b: Candidate): number {
  const [a1, a2, a3] = timingIds(a.timing);
  const [b1, b2, b3] = timingIds(b.timing);
  return (
    a.priceMinor - b.priceMinor ||
    kindOrder[a.timing.kind] - kindOrder[b.timing.kind] ||
    Number(joinRank(a.timing) > 0) - Number(joinRank(b.timing) > 0) ||
    a.frame.head.comparator.id - b.frame.head.comparator.id ||
    a.frame.capacitor.id - b.frame.capacitor.id ||
    a.frame.head.thresholds.r3.id - b.frame.head.thresholds.r3.id ||
    a1 - b1 ||
    a2 - b2 ||
    a3 - b3 ||
    joinRank(a.timing) - joinRank(b.timing)
  );
}

/** Distances nearer to each other than this count as equal. */
export const sameDistance = 1e-12;

/** Orders candidates by closeness to the target; equals go by price and ids. */
export function byCloseness(a: Candidate, b: Candidate): number {
  if (Math.abs(a.distance - b.distance) > sameDistance) return a.distance - b.distance;
  return byPriceThenIds(a, b);
}

/** Orders candidates by price, then closeness. */
export function byValue(a: Candidate, b: Candidate): number {
  return a.priceMinor - b.priceMinor || byCloseness(a, b);
}

/** True when two candidates are made of the same parts joined the same way. */
export function isSamePack(a: Candidate | null, b: Candidate): boolean {
  return a !== null && byPriceThenIds(a, b) === 0;
}
