import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { demandOf } from '../../../server/engine/search/demand.ts';
import { formTimingTable, groupByValue } from '../../../server/engine/search/resistor-values.ts';
import type { StockedResistor } from '../../../server/engine/search/shelf.ts';
import {
  cheapestChoice,
  isMakeable,
  listOffers,
  visitChoices,
  type TimingStock,
} from '../../../server/engine/search/timing-choice.ts';

/** Few values, kinds and prices, so that parts of one value and kind abound. */
const shelf = fc
  .array(
    fc.record({
      ohms: fc.constantFrom(1e4, 2.2e4, 4.7e4),
      available: fc.constantFrom(0, 1, 2, 3, 4, 6, 9, 18, 40),
      priceMinor: fc.constantFrom(3, 4, 48),
      tolerance: fc.constantFrom(0.01, 0.05),
      temperatureCoefficientPerKelvin: fc.constantFrom(5e-5, -2e-4),
      ratedWatts: fc.constant(0.25),
    }),
    { minLength: 2, maxLength: 8 },
  )
  .map((parts) => parts.map((part, k): StockedResistor => ({ ...part, id: k + 1 })));

const cases = fc.record({
  parts: shelf,
  taken: fc.array(fc.nat(), { maxLength: 7 }),
  quantity: fc.integer({ min: 1, max: 3 }),
});

interface Choice {
  first: StockedResistor;
  second: StockedResistor | null;
}

const kindOf = (part: StockedResistor | null) =>
  part === null ? '' : `${part.tolerance} ${part.temperatureCoefficientPerKelvin}`;
const priceOf = ({ first, second }: Choice) => first.priceMinor + (second?.priceMinor ?? 0);
const kindsOf = ({ first, second }: Choice) => [kindOf(first), kindOf(second)].sort().join();

/** Every choice of parts for two values (or one) that the stock allows beside what is taken. */
function everyChoice(
  parts: readonly StockedResistor[],
  taken: readonly StockedResistor[],
  quantity: number,
  ohms: readonly [number, number | null],
): Choice[] {
  const isEnough = (pieces: readonly (StockedResistor | null)[]) =>
    pieces.every(
      (part) =>
        part === null ||
        part.available >=
          quantity * [...taken, ...pieces].filter((other) => other?.id === part.id).length,
    );
  const firsts = parts.filter((part) => part.ohms === ohms[0]);
  const seconds = ohms[1] === null ? [null] : parts.filter((part) => part.ohms === ohms[1]);
  return firsts.flatMap((first) =>
    seconds.flatMap((second) => (isEnough([first, second]) ? [{ first, second }] : [])),
  );
}

/** Runs a check for every entry of the table of any shelf, with what plain loops find for it. */
function forEveryEntry(
  check: (stock: TimingStock, k: number, expected: readonly Choice[]) => void,
  seed: number,
): void {
  fc.assert(
    fc.property(cases, ({ parts, taken, quantity }) => {
      const values = groupByValue(parts);
      const table = formTimingTable(values);
      const used = taken.map((k) => parts[k % parts.length]!);
      const offers = listOffers(values, quantity);
      const stock: TimingStock = { table, offers, demand: demandOf(used), quantity };
      for (let k = 0; k < table.ohms.length; k += 1) {
        const secondAt = table.second[k]!;
        const second = secondAt < 0 ? null : values.ohms[secondAt]!;
        const ohms = [values.ohms[table.first[k]!]!, second] as const;
        check(stock, k, everyChoice(parts, used, quantity, ohms));
      }
    }),
    { numRuns: 200, seed },
  );
}

describe('isMakeable', () => {
  it('says whether counting the pieces on the table finds any choice', () => {
    const seen = { yes: 0, no: 0 };
    forEveryEntry((stock, k, expected) => {
      expect(isMakeable(stock, k)).toBe(expected.length > 0);
      seen[expected.length > 0 ? 'yes' : 'no'] += 1;
    }, 2);
    expect(Math.min(seen.yes, seen.no)).toBeGreaterThan(500);
  });
});

describe('cheapestChoice', () => {
  it('costs what the cheapest choice that the shelf holds costs', () => {
    forEveryEntry((stock, k, expected) => {
      const choice = cheapestChoice(stock, k);
      const least = Math.min(...expected.map(priceOf));
      expect(choice === null ? Infinity : priceOf(choice)).toBe(least);
    }, 3);
  });
});

describe('visitChoices', () => {
  it('visits only what the shelf holds, each choice once', () => {
    forEveryEntry((stock, k, expected) => {
      const name = ({ first, second }: Choice) =>
        [first.id, second?.id ?? 0].sort((a, b) => a - b).join();
      const visited: string[] = [];
      visitChoices(stock, k, (first, second) => visited.push(name({ first, second })));
      const held = new Set(expected.map(name));
      expect(new Set(visited).size).toBe(visited.length);
      expect(visited.every((each) => held.has(each))).toBe(true);
    }, 4);
  });

  it('leaves out only what is dearer than another choice of the same tolerances and drifts', () => {
    forEveryEntry((stock, k, expected) => {
      const cheapest = (choices: readonly Choice[]) => {
        const prices = new Map<string, number>();
        for (const choice of choices) {
          const kinds = kindsOf(choice);
          prices.set(kinds, Math.min(prices.get(kinds) ?? Infinity, priceOf(choice)));
        }
        return prices;
      };
      const visited: Choice[] = [];
      visitChoices(stock, k, (first, second) => visited.push({ first, second }));
      expect(cheapest(visited)).toEqual(cheapest(expected));
    }, 5);
  });
});

describe('listOffers', () => {
  it('is worked out once for a quantity and again for another', () => {
    const parts = [1e3, 2.2e3].map((ohms, k): StockedResistor => ({
      id: k + 1,
      available: 2,
      priceMinor: 4,
      ohms,
      tolerance: 0.01,
      temperatureCoefficientPerKelvin: 0,
      ratedWatts: 0.25,
    }));
    const values = groupByValue(parts);
    expect(listOffers(values, 2)).toBe(listOffers(values, 2));
    expect(listOffers(values, 2).flat()).toEqual(parts);
    expect(listOffers(values, 3).flat()).toEqual([]);
  });
});
