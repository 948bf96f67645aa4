import { limits } from './rules.ts';
import type { StockedResistor } from './shelf.ts';

/**
 * Every timing resistance the catalogue can form: one resistor, or two in series or in parallel.
 * Sorted by ohms; parallel arrays of one length. `second` is −1 for a single resistor, `parallel` 1
 * for a parallel pair. Indices point into `resistors`.
 */
export interface Composites {
  resistors: readonly StockedResistor[];
  ohms: Float64Array;
  first: Int32Array;
  second: Int32Array;
  parallel: Uint8Array;
}

/** All composites, and the same with fewer parts or tighter ones: what the ranks look through. */
export interface TimingTables {
  all: Composites;
  singles: Composites;
  /** Of parts of 1 % or better. */
  good: Composites;
  /** Of parts of 0.1 % or better. */
  precise: Composites;
}

/** Forms the tables that `findPacks` looks through; see `formComposites`. */
export function formTimingTables(resistors: readonly StockedResistor[]): TimingTables {
  const all = formComposites(resistors);
  const within = (tolerance: number) => (index: number) => {
    const second = all.second[index]!;
    const other = second < 0 ? 0 : resistors[second]!.tolerance;
    return Math.max(resistors[all.first[index]!]!.tolerance, other) <= tolerance * (1 + 1e-9);
  };
  return {
    all,
    singles: pickComposites(all, (index) => all.second[index]! < 0),
    good: pickComposites(all, within(limits.thresholdTolerance)),
    precise: pickComposites(all, within(limits.preciseTolerance)),
  };
}

/** The same tables over the same resistors with other quantities in stock. */
export function restock(tables: TimingTables, resistors: readonly StockedResistor[]): TimingTables {
  return {
    all: { ...tables.all, resistors },
    singles: { ...tables.singles, resistors },
    good: { ...tables.good, resistors },
    precise: { ...tables.precise, resistors },
  };
}

function pickComposites(from: Composites, wanted: (index: number) => boolean): Composites {
  const kept: number[] = [];
  for (let k = 0; k < from.ohms.length; k += 1) if (wanted(k)) kept.push(k);
  return {
    resistors: from.resistors,
    ohms: Float64Array.from(kept, (k) => from.ohms[k]!),
    first: Int32Array.from(kept, (k) => from.first[k]!),
    second: Int32Array.from(kept, (k) => from.second[k]!),
    parallel: Uint8Array.from(kept, (k) => from.parallel[k]!),
  };
}

/**
 * Forms and sorts all composites between the limits of timing resistance. Stock is not looked at, so
 * the table stays good while quantities change: n resistors give at most n + n(n+1) entries, 13
 * bytes each plus 12 for sorting, 4 MB for 400 resistors.
 */
export function formComposites(resistors: readonly StockedResistor[]): Composites {
  const n = resistors.length;
  const capacity = n + n * (n + 1);
  const ohms = new Float64Array(capacity);
  const packed = new Int32Array(capacity * 2);
  let count = 0;
  const add = (value: number, first: number, second: number, parallel: number) => {
    if (value < limits.minTimingOhms || value > limits.maxTimingOhms) return;
    ohms[count] = value;
    packed[2 * count] = first;
    packed[2 * count + 1] = second * 2 + parallel;
    count += 1;
  };
  for (let i = 0; i < n; i += 1) {
    const a = resistors[i]!.ohms;
    add(a, i, -1, 0);
    for (let j = i; j < n; j += 1) {
      const b = resistors[j]!.ohms;
      add(a + b, i, j, 0);
      add((a * b) / (a + b), i, j, 1);
    }
  }
  return sortComposites(resistors, ohms.subarray(0, count), packed);
}

function sortComposites(
  resistors: readonly StockedResistor[],
  ohms: Float64Array,
  packed: Int32Array,
): Composites {
  const order = Uint32Array.from({ length: ohms.length }, (_, k) => k);
  order.sort((a, b) => ohms[a]! - ohms[b]! || a - b);
  const sorted: Composites = {
    resistors,
    ohms: new Float64Array(ohms.length),
    first: new Int32Array(ohms.length),
    second: new Int32Array(ohms.length),
    parallel: new Uint8Array(ohms.length),
  };
  order.forEach((from, to) => {
    const tail = packed[2 * from + 1]!;
    sorted.ohms[to] = ohms[from]!;
    sorted.first[to] = packed[2 * from]!;
    sorted.second[to] = tail < 0 ? -1 : tail >> 1;
    sorted.parallel[to] = tail < 0 ? 0 : tail & 1;
  });
  return sorted;
}

/** Index of the first composite not below `wantedOhms`; the length when all are below. */
export function firstNotBelow(composites: Composites, wantedOhms: number): number {
  let low = 0;
  let high = composites.ohms.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (composites.ohms[middle]! < wantedOhms) low = middle + 1;
    else high = middle;
  }
  return low;
}
