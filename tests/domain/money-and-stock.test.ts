import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { careLevels } from '../../server/contracts/brief.ts';
import { money, taxWithin, withTax } from '../../server/domain/money.ts';
import { kitPrice, shareOut } from '../../server/domain/price.ts';
import { shipBy } from '../../server/domain/ship-by.ts';
import {
  allocate,
  exchangeOf,
  giveBack,
  makeableKits,
  mergeDemands,
  type LotStock,
} from '../../server/domain/stock.ts';

const cents = fc.integer({ min: 0, max: 1_000_000 });
const rate = fc.integer({ min: 0, max: 5000 });

describe('tax', () => {
  it('is rounded half up to the cent, exactly (whole-number arithmetic as the yardstick)', () => {
    fc.assert(
      fc.property(cents, rate, (net, basisPoints) => {
        const exact = (BigInt(net) * BigInt(basisPoints) * 2n + 10_000n) / 20_000n;
        expect(withTax(net, basisPoints)).toBe(net + Number(exact));
      }),
    );
  });

  it('taken out of a gross amount gives the net it was put on', () => {
    fc.assert(
      fc.property(cents, rate, (net, basisPoints) => {
        const gross = withTax(net, basisPoints);
        expect(gross - taxWithin(gross, basisPoints)).toBe(net);
      }),
    );
  });

  it.each([
    [100, 2300, 123],
    [50, 2300, 62],
    [290, 2300, 357],
    [1, 5000, 2],
    [0, 2300, 0],
    [999, 0, 999],
  ])('makes %s cents at %s basis points %s (by hand)', (net, basisPoints, gross) => {
    expect(withTax(net, basisPoints)).toBe(gross);
  });
});

describe('money', () => {
  it('is a whole number of cents with its currency', () => {
    expect(money(1295)).toEqual({ amount: 1295, currency: 'EUR' });
    expect(() => money(0.1 + 0.2)).toThrow(RangeError);
    expect(() => money(NaN)).toThrow(RangeError);
  });
});

describe('kitPrice', () => {
  const careFeesMinor = {
    'as-stocked': 0,
    'lot-checked': 60,
    'bench-tuned': 240,
    'trimmer-fitted': 0,
  };

  it('shows lines that add up to the price, whatever the parts, the care and the tax', () => {
    const lines = fc.array(fc.record({ label: fc.constant('Part'), netMinor: cents }), {
      maxLength: 7,
    });
    const care = fc.constantFrom(...careLevels);
    fc.assert(
      fc.property(lines, cents, rate, care, (partLines, kitFeeMinor, taxBasisPoints, level) => {
        const price = kitPrice(partLines, { kitFeeMinor, careFeesMinor, taxBasisPoints }, level);
        const fee = careFeesMinor[level];
        const own = [...partLines.map((one) => one.netMinor), kitFeeMinor];
        if (fee > 0) own.push(fee);
        const net = own.reduce((sum, each) => sum + each, 0);
        expect(price.netMinor).toBe(net);
        expect(price.grossMinor).toBe(withTax(net, taxBasisPoints));
        expect(price.lines.reduce((sum, line) => sum + line.grossMinor, 0)).toBe(price.grossMinor);
        expect(price.lines).toHaveLength(own.length);
        price.lines.forEach((line, k) => {
          expect(Math.abs(line.grossMinor - own[k]! * (1 + taxBasisPoints / 1e4))).toBeLessThan(
            1.5,
          );
        });
      }),
    );
  });

  it('names what the care costs, and nothing where it costs nothing', () => {
    const labels = (level: (typeof careLevels)[number]) =>
      kitPrice([], { kitFeeMinor: 150, careFeesMinor, taxBasisPoints: 2300 }, level).lines.map(
        ({ label }) => label,
      );
    expect(labels('bench-tuned')).toContain('Tuning on the bench');
    expect(labels('as-stocked')).toHaveLength(1);
  });
});

describe('shareOut', () => {
  it('gives what rounding leaves to the largest remainders, the earlier one first', () => {
    expect(shareOut(100, [1, 1, 1])).toEqual([34, 33, 33]);
    expect(shareOut(10, [0.5, 4.75, 4.75])).toEqual([0, 5, 5]);
    expect(shareOut(7, [0, 0])).toEqual([7, 0]);
    expect(shareOut(0, [3, 4])).toEqual([0, 0]);
  });
});

const lots = fc.array(
  fc.record({ partId: fc.integer({ min: 1, max: 3 }), onHand: fc.nat(9), reserved: fc.nat(9) }),
  { maxLength: 9 },
);
const demands = fc.array(
  fc.record({ partId: fc.integer({ min: 1, max: 4 }), quantity: fc.integer({ min: 1, max: 8 }) }),
  { maxLength: 5 },
);

describe('allocate', () => {
  it('takes all or nothing, never more than is unreserved, from the oldest lot first', () => {
    fc.assert(
      fc.property(lots, demands, (raw, wanted) => {
        const shelf: LotStock[] = raw.map((lot, k) => ({
          ...lot,
          id: k + 1,
          reserved: Math.min(lot.reserved, lot.onHand),
        }));
        const shuffled = [...shelf].reverse();
        const free = (partId: number) =>
          shelf
            .filter((lot) => lot.partId === partId)
            .reduce((sum, lot) => sum + lot.onHand - lot.reserved, 0);
        const total = (partId: number) =>
          wanted.filter((one) => one.partId === partId).reduce((sum, one) => sum + one.quantity, 0);
        const partIds = [...new Set(wanted.map((one) => one.partId))];
        const short = partIds.filter((partId) => total(partId) > free(partId));
        const result = allocate(wanted, shuffled);
        if (result.kind === 'short') {
          expect(result.short.map((one) => one.partId).sort()).toEqual(short.sort());
          for (const one of result.short) {
            expect(one).toEqual({
              partId: one.partId,
              wanted: total(one.partId),
              available: free(one.partId),
            });
          }
          return;
        }
        expect(short).toEqual([]);
        for (const partId of partIds) {
          const shares = result.shares.filter((share) => share.partId === partId);
          expect(shares.reduce((sum, share) => sum + share.quantity, 0)).toBe(total(partId));
          const last = Math.max(...shares.map((share) => share.lotId));
          for (const lot of shelf.filter((one) => one.partId === partId)) {
            const taken = shares.find((share) => share.lotId === lot.id)?.quantity ?? 0;
            expect(taken).toBeLessThanOrEqual(lot.onHand - lot.reserved);
            if (lot.id < last) expect(taken).toBe(lot.onHand - lot.reserved);
          }
        }
      }),
      { numRuns: 500 },
    );
  });
});

describe('makeableKits', () => {
  it('is the most that allocation grants', () => {
    fc.assert(
      fc.property(
        demands,
        fc.array(fc.nat(30), { minLength: 5, maxLength: 5 }),
        (perKit, stock) => {
          const kits = makeableKits(perKit, (partId) => stock[partId]!);
          const shelf = stock.map((onHand, partId) => ({
            id: partId,
            partId,
            onHand,
            reserved: 0,
          }));
          const times = (n: number) =>
            perKit.map(({ partId, quantity }) => ({ partId, quantity: quantity * n }));
          if (perKit.length === 0) {
            expect(kits).toBe(0);
            return;
          }
          if (kits > 0) expect(allocate(times(kits), shelf).kind).toBe('allocated');
          expect(allocate(times(kits + 1), shelf).kind).toBe('short');
        },
      ),
    );
  });
});

describe('mergeDemands', () => {
  it('adds up what is wanted of one part, in the order in which locks are taken', () => {
    const wanted = [
      { partId: 9, quantity: 1 },
      { partId: 2, quantity: 3 },
      { partId: 9, quantity: 4 },
    ];
    expect(mergeDemands(wanted)).toEqual([
      { partId: 2, quantity: 3 },
      { partId: 9, quantity: 5 },
    ]);
  });
});

describe('shipBy', () => {
  it.each([
    ['a Wednesday morning', '2026-12-02T09:00:00Z', '2026-12-02T16:00:00Z'],
    ['a minute before the cut-off', '2026-12-02T13:59:59Z', '2026-12-02T16:00:00Z'],
    ['the cut-off itself', '2026-12-02T14:00:00Z', '2026-12-03T16:00:00Z'],
    ['a Friday afternoon', '2026-12-04T15:00:00Z', '2026-12-07T16:00:00Z'],
    ['a Saturday morning', '2026-12-05T08:00:00Z', '2026-12-07T16:00:00Z'],
    ['a Sunday night', '2026-12-06T23:59:00Z', '2026-12-07T16:00:00Z'],
    ['the last evening of a year', '2026-12-31T20:00:00Z', '2027-01-01T16:00:00Z'],
  ])('for %s is the next time the parcels leave', (_, paid, leaves) => {
    expect(shipBy(new Date(paid)).toISOString()).toBe(new Date(leaves).toISOString());
  });
});

describe('exchangeOf', () => {
  it('gives back and wants only what differs, piece by piece', () => {
    expect(exchangeOf([7, 7], [7, 9])).toEqual({
      back: [7],
      wanted: [{ partId: 9, quantity: 1 }],
    });
    expect(exchangeOf([7], [5, 5])).toEqual({ back: [7], wanted: [{ partId: 5, quantity: 2 }] });
    expect(exchangeOf([3, 4], [4, 3])).toEqual({ back: [], wanted: [] });
  });
});

describe('giveBack', () => {
  const lot = (id: number, quantity: number, picked: number) => ({
    id,
    lotId: 10 * id,
    partId: 7,
    quantity,
    picked,
  });

  it('takes a piece that is not in the tray yet before one that is', () => {
    const { changed, fromTray } = giveBack([7], [lot(1, 2, 1), lot(2, 3, 3)]);
    expect(changed).toEqual([lot(1, 1, 1)]);
    expect(fromTray).toEqual([]);
  });

  it('says from which lot a piece must come out of the tray, the newest first', () => {
    const kept = [lot(1, 1, 1), lot(2, 1, 1)];
    expect(giveBack([7], kept)).toEqual({ changed: [lot(2, 0, 0)], fromTray: [kept[1]] });
    expect(giveBack([7, 7], kept).changed).toEqual([lot(1, 0, 0), lot(2, 0, 0)]);
  });

  it('throws for a piece that the order does not have', () => {
    expect(() => giveBack([7, 7], [lot(1, 1, 0)])).toThrow(/keeps no piece/);
  });
});
