import { eSeriesMantissas } from '../e-series.ts';
import { limits } from './rules.ts';
import type { StockedResistor } from './shelf.ts';

/** The shelf's resistors by value. Arrays run along `ohms`. */
export interface ResistorValues {
  /** Distinct values in ohms, ascending. */
  ohms: Float64Array;
  /** All parts of a value, by price, then id. */
  parts: readonly (readonly StockedResistor[])[];
  /** Whether the value may be one of a pair. */
  pairs: Uint8Array;
}

const sameValue = 1e-12;

/** Groups resistors by value; values within 1e-12 of each other count as one. */
export function groupByValue(resistors: readonly StockedResistor[]): ResistorValues {
  const sorted = [...resistors].sort(
    (a, b) => a.ohms - b.ohms || a.priceMinor - b.priceMinor || a.id - b.id,
  );
  const groups: StockedResistor[][] = [];
  for (const part of sorted) {
    const last = groups.at(-1);
    if (last && part.ohms / last[0]!.ohms - 1 < sameValue) last.push(part);
    else groups.push([part]);
  }
  for (const group of groups) group.sort((a, b) => a.priceMinor - b.priceMinor || a.id - b.id);
  const many = groups.length > limits.maxPairedValues;
  const ohms = Float64Array.from(groups, (group) => group[0]!.ohms);
  return {
    ohms,
    parts: groups,
    pairs: Uint8Array.from(ohms, (value) => (many && !isPreferred(value) ? 0 : 1)),
  };
}

const preferred = new Set(
  [...eSeriesMantissas('E24').map((mantissa) => mantissa * 10), ...eSeriesMantissas('E192')].map(
    (mantissa) => Math.round(mantissa),
  ),
);

/** True for a value of E24 or E192 (IEC 60063) in any decade. */
function isPreferred(ohms: number): boolean {
  const figures = Number(ohms.toPrecision(3));
  if (Math.abs(figures / ohms - 1) > 1e-9) return false;
  return preferred.has(Number(figures.toExponential(2).replace(/[.]|e.*$/g, '')));
}

/**
 * Every timing resistance that the values can form: one alone, or two in series or in parallel.
 * Sorted by ohms, then by how they are formed; arrays of one length. `first` and `second` are
 * places in `ResistorValues`, `second` is −1 for one alone, `parallel` 1 for a parallel pair.
 */
export interface TimingTable {
  ohms: Float64Array;
  first: Int16Array;
  second: Int16Array;
  parallel: Uint8Array;
}

/**
 * Forms the table between the limits of timing resistance. Stock and tolerance are not looked at,
 * so it stays good while quantities, prices and kinds of one value change. n values give at most
 * n + n(n+1) entries of 13 bytes: 1.5 MB for 340 values, 21 MB for 1260.
 */
export function formTimingTable(values: ResistorValues): TimingTable {
  const keys = sortedKeys(values);
  const codes = new Uint32Array(keys.buffer);
  const n = values.ohms.length;
  const codeMask = codeMaskOf(n);
  const table: TimingTable = {
    ohms: new Float64Array(keys.length),
    first: new Int16Array(keys.length),
    second: new Int16Array(keys.length),
    parallel: new Uint8Array(keys.length),
  };
  for (let k = 0; k < keys.length; k += 1) {
    const code = codes[2 * k]! & codeMask;
    const parallel = code & 1;
    const first = Math.floor((code >> 1) / (n + 1));
    const place = (code >> 1) - first * (n + 1);
    const second = place === n ? -1 : place;
    const alone = values.ohms[first]!;
    const ohms = second < 0 ? alone : joinedOhms(alone, values.ohms[second]!, parallel === 1);
    let at = k;
    // The keys are sorted by their upper bits only; what those don't tell apart is put in order here.
    for (; at > 0 && table.ohms[at - 1]! > ohms; at -= 1) copyEntry(table, at - 1, at);
    table.ohms[at] = ohms;
    table.first[at] = first;
    table.second[at] = second;
    table.parallel[at] = parallel;
  }
  return table;
}

/**
 * Lowest bits that number every way of n values. For 2000 values they leave 2e-9 of a double's
 * precision, for the 32767 that the table's arrays can name 5e-7.
 */
function codeMaskOf(n: number): number {
  return 2 ** Math.ceil(Math.log2(2 * n * (n + 1) + 1)) - 1;
}

/**
 * The value of every way with the way's number in its lowest bits, sorted. Numbers sort natively
 * some ten times faster than indices by a comparison. Relies on little-endian doubles, as every
 * platform that runs Node has.
 */
function sortedKeys({ ohms, pairs }: ResistorValues): Float64Array {
  const n = ohms.length;
  const codeMask = codeMaskOf(n);
  const paired = pairs.reduce((sum, each) => sum + each, 0);
  const keys = new Float64Array(n + paired * (paired + 1));
  const words = new Uint32Array(keys.buffer);
  let count = 0;
  const add = (value: number, code: number) => {
    if (value < limits.minTimingOhms || value > limits.maxTimingOhms) return;
    keys[count] = value;
    words[2 * count] = ((words[2 * count]! & ~codeMask) | code) >>> 0;
    count += 1;
  };
  for (let i = 0; i < n; i += 1) {
    const row = i * (n + 1);
    add(ohms[i]!, 2 * (row + n));
    if (pairs[i] === 0) continue;
    for (let j = i; j < n; j += 1) {
      if (pairs[j] === 0) continue;
      add(joinedOhms(ohms[i]!, ohms[j]!, false), 2 * (row + j));
      add(joinedOhms(ohms[i]!, ohms[j]!, true), 2 * (row + j) + 1);
    }
  }
  return keys.slice(0, count).sort();
}

/** Resistance of two resistors side by side (`parallel`) or one after the other, in the unit given. */
export function joinedOhms(first: number, second: number, parallel: boolean): number {
  return parallel ? (first * second) / (first + second) : first + second;
}

function copyEntry(table: TimingTable, from: number, to: number): void {
  table.ohms[to] = table.ohms[from]!;
  table.first[to] = table.first[from]!;
  table.second[to] = table.second[from]!;
  table.parallel[to] = table.parallel[from]!;
}

/** Place of the first entry not below `wanted` in an ascending array; its length when all are below. */
export function firstNotBelow(ascending: Float64Array, wanted: number): number {
  let low = 0;
  let high = ascending.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ascending[middle]! < wanted) low = middle + 1;
    else high = middle;
  }
  return low;
}
