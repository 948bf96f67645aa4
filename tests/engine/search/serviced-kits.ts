import type { Candidate } from '../../../server/engine/search/candidate.ts';
import type { SearchBrief, Shelf } from '../../../server/engine/search/shelf.ts';
import { drawKit, kitHz, type Draw, type Kit } from './drawn-kits.ts';
import { recipeOf } from './engine-candidates.ts';
import {
  isOnTheShelf,
  rateOf,
  timings,
  type Recipe,
  type SingleTiming,
} from './exhaustive-search.ts';

/** What the bench may take R4 from: all that resistors of the pack's class make beside its other parts. */
export function benchGrid(pack: Candidate, shelf: Shelf, brief: SearchBrief): SingleTiming[] {
  const { frame, timing } = recipeOf(pack);
  if (timing.kind !== 'single') throw new Error('Only a single timing resistance is tuned.');
  const worst = Math.max(timing.first.tolerance, timing.second?.tolerance ?? 0);
  const limit = [0.001, 0.01, 1].find((each) => worst <= each * 1.000001)!;
  const usable = shelf.resistors.filter((part) => part.tolerance <= limit * 1.000001);
  return timings(usable)
    .filter((way) => isOnTheShelf({ frame, timing: way }, brief.quantity))
    .sort((a, b) => a.ohms - b.ohms);
}

/** The way nearest to a resistance by ratio. */
export function nearestWay(grid: readonly SingleTiming[], ohms: number): SingleTiming {
  let low = 0;
  let high = grid.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (grid[middle]!.ohms < ohms) low = middle + 1;
    else high = middle;
  }
  const above = grid[low]!;
  const below = grid[Math.max(0, low - 1)]!;
  return ohms / below.ohms < above.ohms / ohms ? below : above;
}

/** The timing resistance with which a rate hits the target: the rate goes nearly with its inverse. */
export function neededOhms(rateAt: (ohms: number) => number, start: number, hertz: number): number {
  let ohms = start;
  for (let step = 0; step < 12; step += 1) ohms *= rateAt(ohms) / hertz;
  return ohms;
}

/** What the bench computes from a reading: R4 of the nominal circuit with that capacitance. */
export function ohmsForReading(pack: Candidate, farads: number, brief: SearchBrief): number {
  const { frame, timing } = recipeOf(pack);
  if (timing.kind !== 'single') throw new Error('Only a single timing resistance is tuned.');
  const measured = { ...frame.capacitor, farads };
  const { insulationSeconds } = frame.capacitor;
  // The leakage stays what it is for the printed value.
  const scaled = insulationSeconds && (insulationSeconds * farads) / frame.capacitor.farads;
  const capacitor = { ...measured, insulationSeconds: scaled };
  const rateAt = (ohms: number) => {
    const recipe: Recipe = { frame: { ...frame, capacitor }, timing: { ...timing, ohms } };
    return rateOf(recipe, brief) ?? 0;
  };
  return neededOhms(rateAt, timing.ohms, brief.targetHz);
}

/** A kit whose capacitor was measured within the meter's uncertainty and given the nearest R4. */
export function drawTunedKit(
  pack: Candidate,
  grid: readonly SingleTiming[],
  brief: SearchBrief,
  draw: Draw,
  normal: () => number,
): Kit {
  const { farads } = drawKit(pack, brief, draw, normal);
  const reading = farads / (1 + brief.meterUncertainty * draw(-1, 1));
  const timing = nearestWay(grid, ohmsForReading(pack, reading, brief));
  return { ...drawKit({ ...pack, timing }, brief, draw, normal), farads };
}

/**
 * A kit that its maker set to the target at 25 °C and the nominal supply, to within half a percent
 * of the trimmer's track.
 */
export function drawTrimmedKit(
  pack: Candidate,
  brief: SearchBrief,
  draw: Draw,
  normal: () => number,
): Kit {
  const { timing } = pack;
  if (timing.kind !== 'trimmed') throw new Error('The pack has no trimmer.');
  const kit = drawKit(pack, brief, draw, normal);
  const [fixed, track] = [kit.timing[0]!, kit.timing[1]!];
  const set = (ohms: number): Kit => ({ ...kit, timing: [fixed, { ...track, ohms }] });
  const bench = { celsius: 25, volts: brief.supplyVolts };
  // What the dielectric does over the temperature range comes after the setting.
  const rateAt = (ohms: number) =>
    kitHz({ ...set(ohms - fixed.ohms), dielectric: 0 }, brief, bench);
  const total = neededOhms(rateAt, timing.ohms, brief.targetHz);
  return set(total - fixed.ohms + 0.005 * timing.trimmer.ohms * draw(-1, 1));
}
