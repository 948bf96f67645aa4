import { holdsMore, type ResistorDemand } from './demand.ts';
import { keptByName } from './kept-with.ts';
import type { ResistorValues, TimingTable } from './resistor-values.ts';
import type { StockedResistor } from './shelf.ts';

/** One way to make a timing resistance from stock: one resistor, or two joined. */
export interface SingleTimingParts {
  kind: 'single';
  ohms: number;
  first: StockedResistor;
  second: StockedResistor | null;
  join: 'series' | 'parallel' | null;
}

/**
 * The parts of each value worth looking at for a quantity, by price, then id: in stock that often, and
 * of each tolerance and temperature coefficient only the cheapest, since a dearer one like it is
 * never better, unless the cheaper one could run short beside the rest of the pack.
 */
export type Offers = readonly (readonly StockedResistor[])[];

/** A pack takes at most this many pieces of one resistor: R1–R3, two for idle sections, four more. */
const mostOfOne = 9;

/** Lists the offers of every value; see `Offers`. Kept with the values. */
export const listOffers = keptByName((values: ResistorValues, quantity: number): Offers =>
  values.parts.map((parts) => {
    if (parts.length === 1) return parts[0]!.available >= quantity ? parts : [];
    const settled = new Set<string>();
    return parts.filter((part) => {
      if (part.available < quantity) return false;
      const kind = `${part.tolerance} ${part.temperatureCoefficientPerKelvin}`;
      if (settled.has(kind)) return false;
      if (part.available >= mostOfOne * quantity) settled.add(kind);
      return true;
    });
  }),
);

/** What the shelf lends to one head: timing table, offers, what the head itself takes, how often. */
export interface TimingStock {
  table: TimingTable;
  offers: Offers;
  demand: ResistorDemand;
  quantity: number;
}

/**
 * Calls `visit` with every choice of parts for entry `k` of the table that the shelf holds, cheapest
 * first parts first. `second` is null for one alone.
 */
export function visitChoices(
  { table, offers, demand, quantity }: TimingStock,
  k: number,
  visit: (first: StockedResistor, second: StockedResistor | null) => void,
): void {
  const firstOffers = offers[table.first[k]!]!;
  const secondAt = table.second[k]!;
  if (secondAt < 0) {
    for (const first of firstOffers) if (holdsMore(first, 1, demand, quantity)) visit(first, null);
    return;
  }
  const secondOffers = offers[secondAt]!;
  if (secondOffers.length === 0) return;
  const same = secondOffers === firstOffers;
  for (let i = 0; i < firstOffers.length; i += 1) {
    const first = firstOffers[i]!;
    if (!holdsMore(first, 1, demand, quantity)) continue;
    for (let j = same ? i : 0; j < secondOffers.length; j += 1) {
      const second = secondOffers[j]!;
      if (holdsMore(second, second.id === first.id ? 2 : 1, demand, quantity)) visit(first, second);
    }
  }
}

/** The cheapest choice for entry `k`, ties by the ids of its parts; null when the shelf has none. */
export function cheapestChoice(stock: TimingStock, k: number): SingleTimingParts | null {
  let best: { first: StockedResistor; second: StockedResistor | null } | null = null;
  let bestPrice = Number.POSITIVE_INFINITY;
  visitChoices(stock, k, (first, second) => {
    const price = first.priceMinor + (second?.priceMinor ?? 0);
    if (price > bestPrice) return;
    if (best !== null && price === bestPrice && !isBefore(first, second, best)) return;
    best = { first, second };
    bestPrice = price;
  });
  return best === null ? null : chosenParts(stock.table, k, best);
}

function isBefore(
  first: StockedResistor,
  second: StockedResistor | null,
  best: { first: StockedResistor; second: StockedResistor | null },
): boolean {
  return (
    first.id < best.first.id ||
    (first.id === best.first.id && (second?.id ?? 0) < (best.second?.id ?? 0))
  );
}

/** Puts parts for entry `k` together. */
export function chosenParts(
  table: TimingTable,
  k: number,
  { first, second }: { first: StockedResistor; second: StockedResistor | null },
): SingleTimingParts {
  const parallel = table.parallel[k] === 1;
  return {
    kind: 'single',
    ohms: table.ohms[k]!,
    first,
    second,
    join: second === null ? null : parallel ? 'parallel' : 'series',
  };
}

/** Which values the shelf holds so deep that no pack of this quantity can run short of them. */
const deepValues = keptByName((offers: Offers, quantity: number) => {
  const isDeep = (part: StockedResistor) => part.available >= mostOfOne * quantity;
  return Uint8Array.from(offers, (parts) => (parts.some(isDeep) ? 1 : 0));
});

/** Whether the shelf holds any choice for entry `k`. Quicker than finding the cheapest. */
export function isMakeable(stock: TimingStock, k: number): boolean {
  const { table, offers, demand, quantity } = stock;
  const deep = deepValues(offers, quantity);
  const firstAt = table.first[k]!;
  const secondAt = table.second[k]!;
  if (deep[firstAt] === 1 && (secondAt < 0 || deep[secondAt] === 1)) return true;
  const firstOffers = offers[firstAt]!;
  if (firstOffers.length === 0) return false;
  if (secondAt >= 0 && secondAt !== firstAt) {
    // Two values share no part, so each needs only one of its own.
    return (
      firstOffers.some((part) => holdsMore(part, 1, demand, quantity)) &&
      offers[secondAt]!.some((part) => holdsMore(part, 1, demand, quantity))
    );
  }
  let found = false;
  visitChoices(stock, k, () => (found = true));
  return found;
}

/** Places of all entries of the table that the shelf holds some choice for, ascending. */
export function makeableEntries({ table, offers, demand, quantity }: TimingStock): number[] {
  const once = Uint8Array.from(offers, (parts) =>
    parts.some((part) => holdsMore(part, 1, demand, quantity)) ? 1 : 0,
  );
  const twice = Uint8Array.from(offers, (parts) => {
    const single = parts.filter((part) => holdsMore(part, 1, demand, quantity));
    return single.length > 1 || single.some((part) => holdsMore(part, 2, demand, quantity)) ? 1 : 0;
  });
  const found: number[] = [];
  for (let k = 0; k < table.ohms.length; k += 1) {
    const first = table.first[k]!;
    const second = table.second[k]!;
    if (second < 0 ? once[first] : second === first ? twice[first] : once[first]! & once[second]!) {
      found.push(k);
    }
  }
  return found;
}
