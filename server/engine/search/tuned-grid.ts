import { aimFrame, type Frame } from './aim.ts';
import type { Head } from './heads.ts';
import { keptByName } from './kept-with.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { firstNotBelow } from './resistor-values.ts';
import { limits } from './rules.ts';
import type { SearchBrief, StockedResistor } from './shelf.ts';
import {
  makeableEntries,
  listOffers,
  type Offers,
  type SingleTimingParts,
  type TimingStock,
} from './timing-choice.ts';

/** The stocked resistances that a tuned kit may take R4 from, once its capacitor is measured. */
export interface TunedGrid {
  /** Tolerance of any resistor of the grid, as a fraction. */
  tolerance: number;
  /** Least and greatest temperature coefficient among them. */
  coefficientsPerKelvin: readonly number[];
  /** Half of the widest gap between neighbours, in ln R: the most a tuned kit is off by it. */
  halfGap: number;
  /** Root mean square of the distance to the nearest of the grid, in ln R. */
  rmsGap: number;
  /** What the largest, the middle and the smallest capacitor read, in farads, and the ohms each asks for. */
  readings: readonly { farads: number; ohms: number }[];
}

/** The tolerance classes that a tuned kit's resistors come from: 0.1 %, 1 %, and all there are. */
export const tunedClasses: readonly number[] = [
  limits.preciseTolerance,
  limits.thresholdTolerance,
  1,
];

/** The class of a pack's timing parts: that of the worse one. */
export function tunedClassOf({ first, second }: SingleTimingParts): number {
  const worst = Math.max(first.tolerance, second?.tolerance ?? 0);
  return tunedClasses.find((limit) => worst <= limit * (1 + 1e-9)) ?? 1;
}

/** Every resistance of a class that the shelf can make beside a head, with what its gaps amount to. */
interface ClassGrid {
  tolerance: number;
  coefficientsPerKelvin: readonly number[];
  /** Ascending; gap k lies between entries k and k + 1, in ln R. */
  ohms: Float64Array;
  /** Their places in the timing table. */
  places: Int32Array;
  /** Sum of the cubes of the gaps before entry k. */
  cubesBefore: Float64Array;
  /** Widest gap of each block of `blockLength`. */
  widestOfBlock: Float64Array;
}

const blockLength = 64;

/** The offers of a class of tolerance. Kept with the shelf's offers. */
export function classOffers(shelf: PreparedShelf, limit: number, quantity: number): Offers {
  return offersWithin(listOffers(shelf.values, quantity), limit);
}

const offersWithin = keptByName((offers: Offers, limit: number): Offers => {
  const suits = (part: StockedResistor) => part.tolerance <= limit * (1 + 1e-9);
  return offers.map((parts) => (parts.every(suits) ? parts : parts.filter(suits)));
});

/** The grid of a class beside what a head takes, kept with the offers as long as the stock stands. */
function classGrid(
  { table, values }: PreparedShelf,
  limit: number,
  { demand }: Head,
  quantity: number,
): ClassGrid {
  const offers = offersWithin(listOffers(values, quantity), limit);
  const beside = [...demand.ids, ...demand.counts].join();
  return gridBeside(offers, beside, { table, offers, demand, quantity });
}

const gridBeside = keptByName((_offers: Offers, _beside: string, stock: TimingStock) =>
  formGrid(stock),
);

function formGrid(stock: TimingStock): ClassGrid {
  const { table, offers } = stock;
  const makeable = makeableEntries(stock);
  const places = Int32Array.from(makeable);
  const ohms = Float64Array.from(makeable, (k) => table.ohms[k]!);
  const cubesBefore = new Float64Array(ohms.length + 1);
  const widestOfBlock = new Float64Array(Math.ceil(ohms.length / blockLength));
  for (let k = 0; k + 1 < ohms.length; k += 1) {
    const gap = gapAt(ohms, k);
    cubesBefore[k + 1] = cubesBefore[k]! + gap ** 3;
    const block = Math.floor(k / blockLength);
    widestOfBlock[block] = Math.max(widestOfBlock[block]!, gap);
  }
  const all = offers.flat();
  const coefficients = all.map((part) => part.temperatureCoefficientPerKelvin);
  const least = coefficients.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const most = coefficients.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  return {
    tolerance: all.reduce((worst, part) => Math.max(worst, part.tolerance), 0),
    coefficientsPerKelvin: all.length === 0 ? [] : [...new Set([least, most])],
    ohms,
    places,
    cubesBefore,
    widestOfBlock,
  };
}

function gapAt(ohms: Float64Array, k: number): number {
  return Math.log(ohms[k + 1]! / ohms[k]!);
}

/** Widest of the gaps from place `from` up to before place `to`. */
function widestGap({ ohms, widestOfBlock }: ClassGrid, from: number, to: number): number {
  let widest = 0;
  for (let k = from; k < to;) {
    const wholeBlock = k % blockLength === 0 && k + blockLength <= to;
    widest = Math.max(widest, wholeBlock ? widestOfBlock[k / blockLength]! : gapAt(ohms, k));
    k += wholeBlock ? blockLength : 1;
  }
  return widest;
}

/**
 * What the grid of a class is for a frame: every resistance the shelf holds between what the capacitor
 * would need at either end of its tolerance and of the meter's uncertainty. Null when the shelf does
 * not reach over the whole of that range.
 */
export function tunedGrid(
  frame: Frame,
  limit: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): TunedGrid | null {
  const { capacitor, head } = frame;
  const wide = (1 + capacitor.tolerance) * (1 + brief.meterUncertainty) - 1;
  const needed = (share: number) => {
    const farads = capacitor.farads * (1 + share);
    return { farads, ...aimFrame({ ...frame, capacitor: { ...capacitor, farads } }, brief) };
  };
  const [least, most] = [needed(wide), needed(-wide)];
  if (!least.reaches || !most.reaches) return null;
  const grid = classGrid(shelf, limit, head, brief.quantity);
  const { ohms, cubesBefore } = grid;
  const from = firstNotBelow(ohms, least.ohms) - 1;
  const to = firstNotBelow(ohms, most.ohms);
  if (from < 0 || to >= ohms.length || ohms[from]! < head.minTimingOhms) return null;
  const span = Math.log(ohms[to]! / ohms[from]!);
  return {
    tolerance: grid.tolerance,
    coefficientsPerKelvin: grid.coefficientsPerKelvin,
    halfGap: widestGap(grid, from, to) / 2,
    // A point anywhere in a gap g is off its nearer end by g/√12 in the root mean square.
    rmsGap: span > 0 ? Math.sqrt((cubesBefore[to]! - cubesBefore[from]!) / span / 12) : 0,
    readings: [least, needed(0), most],
  };
}

/**
 * Places in the timing table of what the grid of a class holds next below and above a resistance,
 * with all that share their ohms.
 */
export function gridAround(
  head: Head,
  ohms: number,
  limit: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): number[] {
  const grid = classGrid(shelf, limit, head, brief.quantity);
  const at = firstNotBelow(grid.ohms, ohms);
  const found: number[] = [];
  const same = (a: number, b: number) => Math.abs(grid.ohms[a]! / grid.ohms[b]! - 1) < 1e-12;
  for (let k = at - 1; k >= 0 && same(k, at - 1); k -= 1) found.push(grid.places[k]!);
  for (let k = at; k < grid.ohms.length && same(k, at); k += 1) found.push(grid.places[k]!);
  return found.filter((place) => shelf.table.ohms[place]! >= head.minTimingOhms);
}
