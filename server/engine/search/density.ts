/**
 * A probability density on an even grid: `mass[k]` lies between `start + k·step` and
 * `start + (k+1)·step`. The masses add up to 1.
 */
export interface Density {
  start: number;
  step: number;
  mass: Float64Array;
}

/** How one independent cause moves a sum: by e(u) with u uniform in −1…1, or by weighted points. */
export type Effect = UniformEffect | PointEffect;

/** e(u) is the parabola through the three values, at u = −1, 0 and 1. */
export interface UniformEffect {
  kind: 'uniform';
  low: number;
  middle: number;
  high: number;
}

export interface PointEffect {
  kind: 'points';
  values: readonly number[];
  weights: readonly number[];
}

const bins = 1024;
/** Parabolas that turn inside −1…1 are cut into this many pieces of equal probability. */
const pieces = 24;

/** Least and greatest value of an effect. */
export function rangeOf(effect: Effect): readonly [number, number] {
  const values =
    effect.kind === 'points' ? effect.values : [effect.low, effect.middle, effect.high];
  return [Math.min(...values), Math.max(...values)];
}

/**
 * Density of the sum of independent effects, by one pass over the grid for each. Accurate to about
 * 1e-4 in probability where the widest effect covers a hundred steps or more; effects narrower than
 * a quarter step only shift it. Neglects that a parabola turning close outside −1…1 has a peaked
 * density.
 */
export function densityOfSum(all: readonly Effect[]): Density {
  const effects = gatherSmall(all);
  let from = 0;
  let to = 0;
  for (const effect of effects) {
    const [low, high] = rangeOf(effect);
    // A box moves the grid along with its middle; points stay where they are.
    const half = (high - low) / 2;
    from += isBox(effect) ? -half : Math.min(0, low);
    to += isBox(effect) ? half : Math.max(0, high);
  }
  const width = Math.max(to - from, 1e-9);
  const step = (width * 1.02) / bins;
  const zero = Math.ceil(-from / step) + Math.ceil(0.005 * bins);
  const density: Density = { start: -zero * step, step, mass: new Float64Array(bins) };
  density.mass[zero] = 0.5;
  density.mass[zero - 1] = 0.5;
  return effects.reduce(addEffect, density);
}

/** True for a parabola that does not turn in or near its range. */
function isBox(effect: Effect): boolean {
  if (effect.kind === 'points') return false;
  const { low, middle, high } = effect;
  return Math.abs(high - low) / 2 >= 4 * Math.abs((high + low) / 2 - middle);
}

/** Effects narrower than this share of the widest count as small. */
const smallShare = 0.04;
const normalPoints = [-2.857, -1.154, -0.0, 1.154, 2.857] as const;
const normalWeights = [0.011257, 0.222076, 0.533333, 0.222076, 0.011257] as const;

/**
 * Puts the small effects together as one nearly normal one of the same mean and variance, by the
 * five points of Gauss and Hermite: of many narrow causes no more than that can be seen.
 */
function gatherSmall(effects: readonly Effect[]): Effect[] {
  const widths = effects.map((effect) => {
    const [low, high] = rangeOf(effect);
    return high - low;
  });
  const widest = Math.max(...widths, 0);
  const isSmall = (k: number) => widths[k]! < smallShare * widest;
  const moments = effects.filter((_, k) => isSmall(k)).map(momentsOf);
  if (moments.length === 0) return [...effects];
  const mean = moments.reduce((sum, each) => sum + each.mean, 0);
  const deviation = Math.sqrt(moments.reduce((sum, each) => sum + each.variance, 0));
  const gathered: Effect = {
    kind: 'points',
    values: normalPoints.map((point) => mean + point * deviation),
    weights: normalWeights,
  };
  return [...effects.filter((_, k) => !isSmall(k)), gathered];
}

/** Mean and variance of one effect. */
export function momentsOf(effect: Effect): { mean: number; variance: number } {
  if (effect.kind === 'points') {
    const mean = effect.values.reduce((sum, value, k) => sum + value * effect.weights[k]!, 0);
    const square = effect.values.reduce((sum, v, k) => sum + v * v * effect.weights[k]!, 0);
    return { mean, variance: square - mean * mean };
  }
  const { low, middle, high } = effect;
  const slope = (high - low) / 2;
  const bend = (high + low) / 2 - middle;
  return { mean: middle + bend / 3, variance: slope ** 2 / 3 + (4 * bend ** 2) / 45 };
}

/** Density of the sum of a grid density and one more independent effect. */
export function addEffect(density: Density, effect: Effect): Density {
  if (effect.kind === 'points') return addPoints(density, effect.values, effect.weights);
  const { low, middle, high } = effect;
  const slope = (high - low) / 2;
  const bend = (high + low) / 2 - middle;
  if (Math.abs(slope) + Math.abs(bend) < density.step / 8) {
    return { ...density, start: density.start + middle + bend / 3 };
  }
  if (!isBox(effect)) {
    const values = Array.from({ length: pieces }, (_, k) => {
      const u = (2 * k + 1) / pieces - 1;
      return middle + slope * u + bend * u * u;
    });
    return addPoints(
      density,
      values,
      values.map(() => 1 / pieces),
    );
  }
  const [from, to] = low < high ? [low, high] : [high, low];
  return addBox(density, from, to, (-2 * bend) / slope ** 2);
}

/**
 * Adds an effect whose density is proportional to exp(tilt·e) between two values, by running sums:
 * multiplied by exp(−tilt·z) the convolution is one with a plain box.
 */
function addBox(density: Density, from: number, to: number, tilt: number): Density {
  const { step, mass } = density;
  const n = mass.length;
  const rate = Math.abs(tilt * (to - from)) < 1e-3 ? 0 : tilt;
  const growth = Math.exp(-rate * step);
  // Bin k takes what lies between k + first and k + last of the old grid; beyond it the sums are flat.
  const middle = Math.round((from + to) / 2 / step);
  const first = middle - to / step + 0.5;
  const last = middle - from / step + 0.5;
  const pad = Math.ceil(Math.max(0, -first, last)) + 2;
  const sums = new Float64Array(n + 2 * pad + 1);
  let weight = 1;
  for (let k = 0; k < n; k += 1) {
    sums[pad + k + 1] = sums[pad + k]! + mass[k]! * weight;
    weight *= growth;
  }
  sums.fill(sums[pad + n]!, pad + n + 1);
  const [firstWhole, lastWhole] = [Math.floor(first), Math.floor(last)];
  const [firstPart, lastPart] = [first - firstWhole, last - lastWhole];
  const next = new Float64Array(n);
  let total = 0;
  weight = 1;
  for (let k = 0; k < n; k += 1) {
    const i = pad + k + firstWhole;
    const j = pad + k + lastWhole;
    const low = sums[i]! + firstPart * (sums[i + 1]! - sums[i]!);
    const high = sums[j]! + lastPart * (sums[j + 1]! - sums[j]!);
    const value = (high - low) / weight;
    next[k] = value;
    total += value;
    weight *= growth;
  }
  for (let k = 0; k < n; k += 1) next[k]! /= total;
  return { start: density.start + middle * step, step, mass: next };
}

function addPoints(
  density: Density,
  values: readonly number[],
  weights: readonly number[],
): Density {
  const { step, mass } = density;
  const n = mass.length;
  const next = new Float64Array(n);
  values.forEach((value, i) => {
    const shift = value / step;
    const whole = Math.floor(shift);
    const part = shift - whole;
    const weight = weights[i]!;
    for (let k = Math.max(0, -whole); k < n && k + whole < n; k += 1) {
      const moved = mass[k]! * weight;
      next[k + whole]! += moved * (1 - part);
      if (k + whole + 1 < n) next[k + whole + 1]! += moved * part;
    }
  });
  return { ...density, mass: next };
}

/**
 * Integrals of a density for quick repeated questions: `once` is the distribution function,
 * `twice` its integral, `thrice` the integral of that, at the grid's points.
 */
export interface Integrals {
  start: number;
  step: number;
  once: Float64Array;
  twice: Float64Array;
  thrice: Float64Array;
}

/** Integrates a density three times; arrays have one entry more than the density has bins. */
export function integrals({ start, step, mass }: Density): Integrals {
  const n = mass.length;
  const once = new Float64Array(n + 1);
  const twice = new Float64Array(n + 1);
  const thrice = new Float64Array(n + 1);
  for (let k = 0; k < n; k += 1) {
    once[k + 1] = once[k]! + mass[k]!;
    twice[k + 1] = twice[k]! + step * (once[k]! + mass[k]! / 2);
    thrice[k + 1] = thrice[k]! + step * twice[k]! + (step ** 2 * (once[k]! + mass[k]! / 3)) / 2;
  }
  return { start, step, once, twice, thrice };
}

/**
 * Distribution function at `value` of the density plus up to two more uniform causes of ±`a` and
 * ±`b` (0 or more), by differences of the integrals.
 */
export function distributionWith(of: Integrals, value: number, a: number, b: number): number {
  const [wide, narrow] = a > b ? [a, b] : [b, a];
  if (wide < of.step / 4) return at(of, of.once, value);
  if (narrow < of.step / 4) {
    return (at(of, of.twice, value + wide) - at(of, of.twice, value - wide)) / (2 * wide);
  }
  return (
    (at(of, of.thrice, value + wide + narrow) -
      at(of, of.thrice, value + wide - narrow) -
      at(of, of.thrice, value - wide + narrow) +
      at(of, of.thrice, value - wide - narrow)) /
    (4 * wide * narrow)
  );
}

/**
 * One of the integrals between grid points, where the density is level, so that they are polynomials,
 * and beyond the grid by its closed continuation. Straight lines between the points would not do:
 * `distributionWith` takes small differences of large values.
 */
function at({ start, step, once, twice, thrice }: Integrals, table: Float64Array, value: number) {
  const last = table.length - 1;
  const place = (value - start) / step;
  if (place <= 0) return 0;
  const whole = Math.min(last, Math.floor(place));
  const rest = (place - whole) * step;
  const level = whole < last ? (once[whole + 1]! - once[whole]!) / step : 0;
  if (table === once) return once[whole]! + rest * level;
  if (table === twice) return twice[whole]! + rest * (once[whole]! + (rest * level) / 2);
  return thrice[whole]! + rest * (twice[whole]! + (rest / 2) * (once[whole]! + (rest * level) / 3));
}

/**
 * Distribution function at `value` of a density plus −`power`·ln(1 + t·u), u uniform in −1…1: what a
 * part of tolerance t does that the rate goes with the −`power` of. Where `distributionWith` takes
 * ln(1 + t·u) as uniform, this counts its density, which rises as 1 + x, to first order: the rest is
 * t³/6.
 */
export function distributionWithPart(
  of: Integrals,
  value: number,
  t: number,
  power: number,
): number {
  const [low, high] = [Math.log1p(-t), Math.log1p(t)];
  const upTo = (x: number) => {
    const z = power * x;
    const twice = at(of, of.twice, value + z);
    return twice / power + (z * twice - at(of, of.thrice, value + z)) / power ** 2;
  };
  return (upTo(high) - upTo(low)) / (high - low + (high ** 2 - low ** 2) / 2);
}
