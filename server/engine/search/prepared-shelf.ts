import {
  formTimingTable,
  groupByValue,
  type ResistorValues,
  type TimingTable,
} from './resistor-values.ts';
import type { Shelf } from './shelf.ts';

/** A shelf made ready for many searches. */
export interface PreparedShelf {
  shelf: Shelf;
  values: ResistorValues;
  table: TimingTable;
  /** The lowest rated power of any resistor; what the rule of least timing resistance goes by. */
  smallestWatts: number;
}

/**
 * Prepares a shelf: sorts parts by id, groups resistors by value and forms the timing table. The
 * table of `earlier` is used again when the values are the same, so that a change of stock or price
 * costs a millisecond and only a new value costs a second on a very large shelf.
 */
export function prepareShelf(shelf: Shelf, earlier: PreparedShelf | null = null): PreparedShelf {
  const values = groupByValue(shelf.resistors);
  const byId = <Part extends { id: number }>(parts: readonly Part[]) =>
    [...parts].sort((a, b) => a.id - b.id);
  return {
    shelf: {
      resistors: byId(shelf.resistors),
      capacitors: byId(shelf.capacitors),
      comparators: byId(shelf.comparators),
      diodes: byId(shelf.diodes),
      trimmers: byId(shelf.trimmers),
    },
    values,
    table: earlier && sameValues(earlier.values, values) ? earlier.table : formTimingTable(values),
    smallestWatts: shelf.resistors.reduce((least, part) => Math.min(least, part.ratedWatts), 0.25),
  };
}

function sameValues(a: ResistorValues, b: ResistorValues): boolean {
  return (
    a.ohms.length === b.ohms.length &&
    a.ohms.every((value, k) => value === b.ohms[k] && a.pairs[k] === b.pairs[k])
  );
}
