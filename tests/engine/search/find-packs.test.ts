import { describe, expect, it } from 'vitest';
import { findBestValue } from '../../../server/engine/search/best-value.ts';
import { isSamePack } from '../../../server/engine/search/candidate.ts';
import { findPacks, findSteadiestPack } from '../../../server/engine/search/find-packs.ts';
import { worseEnd } from '../../../server/engine/search/guaranteed-band.ts';
import { prepareShelf } from '../../../server/engine/search/prepared-shelf.ts';
import type { CareLevel, SearchBrief, Shelf } from '../../../server/engine/search/shelf.ts';
import { briefAt, redLed, workshop, workshopWith } from './workshop-shelf.ts';

const shelf = prepareShelf(workshop);
const rates = [0.5, 120, 33_000];
const ranks = ['best-value', 'closest', 'steadiest'] as const;
const cares: CareLevel[] = ['as-stocked', 'bench-tuned', 'trimmer-fitted'];

describe('findPacks', () => {
  describe.each(rates)('when %s Hz is asked at every care level', (hertz) => {
    it.each(cares)('shows the three winners first, each marked, whatever the rank: %s', (care) => {
      const brief = briefAt(hertz, { band: 0.07, care });
      for (const rank of ranks) {
        const { packs } = findPacks(shelf, brief, rank, 8);
        expect(packs[0]!.wins).toContain(rank);
        for (const name of ranks) {
          const winners = packs.filter((pack) => pack.wins.includes(name));
          expect(winners).toHaveLength(1);
          expect(packs.indexOf(winners[0]!)).toBeLessThan(3);
        }
      }
    });

    it('shows no pack twice, and capacitors that differ after the winners', () => {
      const { packs } = findPacks(shelf, briefAt(hertz, { band: 0.07 }), 'best-value', 8);
      packs.forEach((pack, k) =>
        packs.slice(0, k).forEach((other) => expect(isSamePack(other, pack)).toBe(false)),
      );
      const kinds = new Set(packs.map((pack) => pack.frame.capacitor.id));
      expect(kinds.size).toBeGreaterThan(packs.length / 2);
    });

    it('orders what follows the winners by the asked rank', () => {
      const brief = briefAt(hertz, { band: 0.07 });
      const after = (rank: (typeof ranks)[number]) =>
        findPacks(shelf, brief, rank, 12).packs.filter(({ wins }) => wins.length === 0);
      const distances = after('closest').map(({ distance }) => distance);
      expect(distances).toEqual([...distances].sort((a, b) => a - b));
      const ends = after('steadiest').map(({ guaranteed }) => worseEnd(guaranteed, hertz));
      expect(ends).toEqual([...ends].sort((a, b) => a - b));
      const values = after('best-value');
      const holding = values.filter(({ yieldWithinBand }) => yieldWithinBand >= 0.99);
      expect(values.slice(0, holding.length)).toEqual(holding);
      const prices = holding.map(({ priceMinor }) => priceMinor);
      expect(prices).toEqual([...prices].sort((a, b) => a - b));
    });

    it('names the same steadiest pack as the coverage map does', () => {
      const brief = briefAt(hertz, { band: 0.02 });
      const [first] = findPacks(shelf, brief, 'steadiest', 12).packs;
      expect(isSamePack(findSteadiestPack(shelf, brief), first!)).toBe(true);
    });
  });

  describe('when only the steadiest pack holds the band', () => {
    it('is best value too', () => {
      const [steadiest] = findPacks(shelf, briefAt(120), 'steadiest', 1).packs;
      const brief = briefAt(120, { band: worseEnd(steadiest!.guaranteed, 120) + 1e-6 });
      const [best] = findPacks(shelf, brief, 'best-value', 1).packs;
      expect(best!.wins).toContain('best-value');
      expect(best!.yieldWithinBand).toBeGreaterThanOrEqual(0.99);
    });
  });

  describe('when two parts are alike but for their price or place', () => {
    const twin = (priceMinor: number): Shelf => {
      const twins = workshop.capacitors.map((part) => ({ ...part, id: part.id + 100, priceMinor }));
      return { ...workshop, capacitors: [...workshop.capacitors, ...twins] };
    };
    const takes = (stock: Shelf) =>
      findPacks(prepareShelf(stock), briefAt(60), 'closest', 1).packs[0]!.frame.capacitor.id;

    it('takes the cheaper one', () => {
      expect(takes(twin(1))).toBeGreaterThan(100);
      expect(takes(twin(900))).toBeLessThan(100);
    });

    it('takes the one with the lower id when they cost the same', () => {
      const stock = twin(0);
      const capacitors = stock.capacitors.map((part) => ({ ...part, priceMinor: 5 }));
      expect(takes({ ...stock, capacitors })).toBeLessThan(100);
    });
  });

  describe('when a small and a large capacitor are equally tight', () => {
    it('does not refuse the large one for what stray capacitance does to the small one', () => {
      const film = workshop.capacitors.find(({ tolerance }) => tolerance === 0.01)!;
      const small = { ...film, id: 1, farads: 1e-10, priceMinor: 1 };
      const large = { ...film, id: 2, farads: 1e-8, priceMinor: 50 };
      const hertz = 5e3;
      const stock = { ...workshopWith(1), capacitors: [small, large] };
      const brief = briefAt(hertz, { band: 0.02, minCelsius: 20, maxCelsius: 30 });
      const { packs } = findPacks(prepareShelf(stock), brief, 'best-value', 4);
      expect(packs[0]!.wins).toContain('best-value');
      expect(packs[0]!.frame.capacitor.id).toBe(2);
      expect(packs.some(({ frame }) => frame.capacitor.id === 1)).toBe(true);
    });
  });

  describe('when nothing on the shelf can run the brief', () => {
    const nothing = (brief: SearchBrief, stock: Shelf = workshop) =>
      findPacks(prepareShelf(stock), brief, 'closest', 5).packs;

    it('answers with no pack for a supply above every comparator', () => {
      const brief = briefAt(1, { supplyVolts: 30, minSupplyVolts: 28, maxSupplyVolts: 32 });
      expect(findPacks(shelf, brief, 'closest', 5)).toEqual({ packs: [], considered: 0 });
      expect(findSteadiestPack(shelf, brief)).toBeNull();
    });

    it('answers with no pack for an LED where only open-drain outputs are left', () => {
      expect(nothing(briefAt(1, { load: redLed }), workshopWith(2))).toEqual([]);
    });

    it('answers with no pack for an LED that needs more than the supply', () => {
      const load = { ...redLed, forwardVolts: 5.2 };
      expect(nothing(briefAt(1, { load }))).toEqual([]);
    });

    it('answers with no pack for idle sections without a resistor of 1 to 10 kΩ', () => {
      const resistors = workshop.resistors.filter(({ ohms }) => ohms > 1e4);
      expect(nothing(briefAt(60), { ...workshopWith(4), resistors })).toEqual([]);
      expect(nothing(briefAt(60), { ...workshopWith(1), resistors })).not.toEqual([]);
    });

    it('answers with no pack for a duty beyond 5 and 95 %', () => {
      const stock = { ...workshopWith(1), diodes: [] };
      expect(nothing(briefAt(60, { duty: 0.049 }), stock)).toEqual([]);
      expect(nothing(briefAt(60, { duty: 0.951 }), stock)).toEqual([]);
      expect(nothing(briefAt(60, { duty: 0.06 }), stock)).not.toEqual([]);
    });

    it('finds no best value among no frames', () => {
      expect(findBestValue([], briefAt(1), shelf)).toBeNull();
    });
  });

  describe('when an electrolytic would do', () => {
    it('is offered only from a band of 20 %', () => {
      const dielectrics = (band: number) =>
        findPacks(shelf, briefAt(0.02, { band }), 'closest', 20).packs.map(
          (pack) => pack.frame.capacitor.dielectric,
        );
      expect(dielectrics(0.19)).not.toContain('electrolytic');
      expect(dielectrics(0.2)).toContain('electrolytic');
    });
  });
});

describe('prepareShelf', () => {
  it('keeps the timing table while only stock and prices change', () => {
    const poorer = workshop.resistors.map((part) => ({ ...part, available: 1, priceMinor: 9 }));
    const after = prepareShelf({ ...workshop, resistors: poorer }, shelf);
    expect(after.table).toBe(shelf.table);
    expect(after.values.parts[0]![0]!.available).toBe(1);
  });

  it('forms it anew for a new value', () => {
    const more = [...workshop.resistors, { ...workshop.resistors[0]!, id: 9999, ohms: 1234 }];
    const after = prepareShelf({ ...workshop, resistors: more }, shelf);
    expect(after.table.ohms.length).toBeGreaterThan(shelf.table.ohms.length);
  });

  it('goes by the least rated power on the shelf', () => {
    expect(shelf.smallestWatts).toBe(0.25);
    const weak = { ...workshop.resistors[0]!, id: 9999, ratedWatts: 0.063 };
    const after = prepareShelf({ ...workshop, resistors: [...workshop.resistors, weak] }, shelf);
    expect(after.smallestWatts).toBe(0.063);
  });
});
