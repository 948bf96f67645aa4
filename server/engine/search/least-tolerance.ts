import type { AimedFrame } from './closest.ts';
import { keptWith } from './kept-with.ts';
import type { Offers } from './timing-choice.ts';

/** The least tolerance among each value's offers; ∞ for none. */
const leastTolerances = keptWith((offers: Offers) =>
  Float64Array.from(offers, (parts) =>
    parts.reduce((least, part) => Math.min(least, part.tolerance), Number.POSITIVE_INFINITY),
  ),
);

/** The share of the first part in the relative change of entry `k`; 1 for one alone. */
export function firstShare({ stock: { table, offers } }: AimedFrame, k: number): number {
  if (table.second[k]! < 0) return 1;
  const ohms = table.ohms[k]!;
  const first = offers[table.first[k]!]![0]?.ohms ?? ohms;
  return table.parallel[k] === 1 ? ohms / first : first / ohms;
}

/** The least tolerance that parts for entry `k` can have together; ∞ where the shelf has none. */
export function leastTolerance(frame: AimedFrame, k: number, share: number): number {
  const { table, offers } = frame.stock;
  const tolerances = leastTolerances(offers);
  const first = tolerances[table.first[k]!]!;
  const secondAt = table.second[k]!;
  return secondAt < 0 ? first : share * first + (1 - share) * tolerances[secondAt]!;
}
