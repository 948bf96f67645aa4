import type { StockedResistor } from './shelf.ts';

/**
 * What a pack already takes of a few resistors before R4 is chosen: the three thresholds, a pull-up,
 * an LED resistor, the pair of idle sections. At most six entries, so a plain list is searched faster
 * than a map.
 */
export interface ResistorDemand {
  ids: number[];
  counts: number[];
}

/** Counts the pieces of each resistor in the list; null entries are skipped. */
export function demandOf(parts: readonly (StockedResistor | null)[]): ResistorDemand {
  const demand: ResistorDemand = { ids: [], counts: [] };
  for (const part of parts) {
    if (part === null) continue;
    const at = demand.ids.indexOf(part.id);
    if (at < 0) {
      demand.ids.push(part.id);
      demand.counts.push(1);
    } else demand.counts[at]! += 1;
  }
  return demand;
}

/** The same demand with one more piece of a part. */
export function withOneMore(
  { ids, counts }: ResistorDemand,
  part: StockedResistor,
): ResistorDemand {
  const at = ids.indexOf(part.id);
  return at < 0
    ? { ids: [...ids, part.id], counts: [...counts, 1] }
    : { ids, counts: counts.map((count, k) => (k === at ? count + 1 : count)) };
}

function taken(demand: ResistorDemand, id: number): number {
  const at = demand.ids.indexOf(id);
  return at < 0 ? 0 : demand.counts[at]!;
}

/** True when the shelf holds `count` more of a part beside what is taken, `quantity` times. */
export function holdsMore(
  part: StockedResistor,
  count: number,
  demand: ResistorDemand,
  quantity: number,
): boolean {
  return part.available >= quantity * (count + taken(demand, part.id));
}

/** True when the shelf holds the pack's fixed resistors alone, `quantity` times. */
export function demandMakeable(
  parts: readonly (StockedResistor | null)[],
  quantity: number,
): boolean {
  const demand = demandOf(parts);
  return parts.every(
    (part) => part === null || part.available >= quantity * taken(demand, part.id),
  );
}
