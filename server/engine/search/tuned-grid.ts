import { aimFrame, type Frame } from './aim.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { firstNotBelow } from './resistor-values.ts';
import { limits } from './rules.ts';
import type { SearchBrief, StockedResistor } from './shelf.ts';
import { isMakeable, listOffers, type Offers, type SingleTimingParts } from './timing-choice.ts';

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

interface ClassStock {
  offers: Offers;
  tolerance: number;
  coefficientsPerKelvin: readonly number[];
}

const knownStock = new WeakMap<PreparedShelf, Map<string, ClassStock>>();

/** The resistors of a class that the shelf holds `quantity` times. */
export function classStock(shelf: PreparedShelf, limit: number, quantity: number): ClassStock {
  const known = knownStock.get(shelf) ?? new Map<string, ClassStock>();
  knownStock.set(shelf, known);
  const key = `${limit} ${quantity}`;
  let stock = known.get(key);
  if (!stock) {
    const suits = (part: StockedResistor) => part.tolerance <= limit * (1 + 1e-9);
    const offers = listOffers(shelf.values, quantity).map((parts) => parts.filter(suits));
    const all = offers.flat();
    const coefficients = all.map((part) => part.temperatureCoefficientPerKelvin);
    const least = coefficients.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
    const most = coefficients.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
    stock = {
      offers,
      tolerance: all.reduce((worst, part) => Math.max(worst, part.tolerance), 0),
      coefficientsPerKelvin: all.length === 0 ? [] : [...new Set([least, most])],
    };
    known.set(key, stock);
  }
  return stock;
}

/**
 * The grid of a class for a frame: every resistance the shelf holds between what the capacitor would
 * need at either end of its tolerance and of the meter's uncertainty. Null when the shelf does not
 * reach over the whole of that range.
 */
export function tunedGrid(
  frame: Frame,
  limit: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): TunedGrid | null {
  const stock = classStock(shelf, limit, brief.quantity);
  const { table } = shelf;
  const own = {
    table,
    offers: stock.offers,
    demand: frame.head.demand,
    quantity: brief.quantity,
  };
  const wide = (1 + frame.capacitor.tolerance) * (1 + brief.meterUncertainty) - 1;
  const needed = (share: number) =>
    aimFrame(
      {
        ...frame,
        capacitor: { ...frame.capacitor, farads: frame.capacitor.farads * (1 + share) },
      },
      brief,
    );
  const [least, most] = [needed(wide), needed(-wide)];
  if (!least.reaches || !most.reaches || least.ohms < frame.head.minTimingOhms) return null;
  const start = firstNotBelow(table.ohms, least.ohms);
  let before = start - 1;
  while (before >= 0 && !isMakeable(own, before)) before -= 1;
  if (before < 0 || table.ohms[before]! < frame.head.minTimingOhms) return null;
  let widest = 0;
  let cubes = 0;
  let last = table.ohms[before]!;
  for (let k = start; last < most.ohms; k += 1) {
    if (k >= table.ohms.length) return null;
    if (!isMakeable(own, k)) continue;
    const gap = Math.log(table.ohms[k]! / last);
    widest = Math.max(widest, gap);
    cubes += gap ** 3;
    last = table.ohms[k]!;
  }
  const span = Math.log(last / table.ohms[before]!);
  return {
    tolerance: stock.tolerance,
    coefficientsPerKelvin: stock.coefficientsPerKelvin,
    halfGap: widest / 2,
    // A point anywhere in a gap g is off its nearer end by g/√12 in the root mean square.
    rmsGap: span > 0 ? Math.sqrt(cubes / span / 12) : 0,
  };
}
