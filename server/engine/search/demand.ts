import type { Composites } from './composites.ts';
import type { StockedResistor } from './shelf.ts';

/**
 * What a pack already takes of a few resistors before R4 is chosen: the three thresholds, a pull-up,
 * an LED resistor. At most five entries, so a plain list is searched faster than a map.
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

function taken(demand: ResistorDemand, id: number): number {
  const at = demand.ids.indexOf(id);
  return at < 0 ? 0 : demand.counts[at]!;
}

/** True when the shelf holds composite `index` as well as the rest of the pack, `quantity` times. */
export function compositeMakeable(
  composites: Composites,
  index: number,
  demand: ResistorDemand,
  quantity: number,
): boolean {
  const first = composites.resistors[composites.first[index]!]!;
  const secondAt = composites.second[index]!;
  if (secondAt < 0) return first.available >= quantity * (1 + taken(demand, first.id));
  const second = composites.resistors[secondAt]!;
  if (second.id === first.id) return first.available >= quantity * (2 + taken(demand, first.id));
  return (
    first.available >= quantity * (1 + taken(demand, first.id)) &&
    second.available >= quantity * (1 + taken(demand, second.id))
  );
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
