import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  benchOrderSchema,
  readingResponseSchema,
  type BenchOrder,
  type ReadingResponse,
} from '../../server/contracts/bench.ts';
import type { SolveRequestInput } from '../../server/contracts/brief.ts';
import type { Pack } from '../../server/contracts/packs.ts';
import type { Circuit } from '../../server/engine/circuit.ts';
import { analyseCycle } from '../../server/engine/cycle.ts';
import { tunedClassOf } from '../../server/engine/search/tuned-grid.ts';
import { liesInside, tunedKits } from '../../server/engine/search/tuned-kit.ts';
import { shopSettings } from '../../server/store/settings.ts';
import { packFor } from '../support/packs-in-hand.ts';
import { openTestShop, type TestShop, type Visit } from '../support/test-shop.ts';
import {
  clockBrief,
  paidOrder,
  pickAll,
  promisedTo,
  signIn,
  statusOf,
  stockDisagreements,
} from '../support/shopping.ts';

let shop: TestShop;
let packer: Visit;
let second: Visit;
beforeAll(async () => {
  shop = await openTestShop();
  packer = await signIn(shop, 'packer');
  second = await signIn(shop, 'second-packer');
});
afterAll(() => shop.close());

const tunedBrief: SolveRequestInput = { ...clockBrief, careLevel: 'bench-tuned' };
const at = (ref: string, verb: string) => `/api/bench/orders/${ref}/${verb}`;

interface Claimed {
  ref: string;
  lineId: string;
  pack: Pack;
  /** What is printed on C1. */
  farads: number;
  circuit: Circuit;
}

async function claimedOrder(quantity = 1, brief = tunedBrief): Promise<Claimed> {
  const { ref, pack } = await paidOrder(shop, shop.visit(), brief, quantity);
  await packer.post(at(ref, 'claim')).expect(200);
  const [line] = (await view(ref)).lines;
  const { circuit } = await shop
    .db('packs')
    .where({ identifier: `${ref}-1` })
    .first('circuit');
  const farads = pack.parts.find(({ role }) => role === 'C1')!.farads!;
  return { ref, lineId: line!.id, pack, farads, circuit };
}

async function view(ref: string): Promise<BenchOrder> {
  return benchOrderSchema.parse((await packer.get(`/api/bench/orders/${ref}`).expect(200)).body);
}

function send(order: Claimed, body: object, who = packer) {
  return who.post(at(order.ref, 'readings')).send({ lineId: order.lineId, unit: 1, ...body });
}

async function read(order: Claimed, farads: number, unit = 1): Promise<ReadingResponse> {
  return readingResponseSchema.parse((await send(order, { farads, unit }).expect(200)).body);
}

interface Held {
  sku: string;
  quantity: number;
  picked: number;
}

/** Resistors kept for an order, by stock number. */
async function resistorsOf(ref: string): Promise<Map<string, number>> {
  const rows: Held[] = (await view(ref)).picks.filter(({ kind }) => kind === 'resistor');
  const sums = new Map<string, number>();
  for (const { sku, quantity } of rows) sums.set(sku, (sums.get(sku) ?? 0) + quantity);
  return sums;
}

function plus(sums: Map<string, number>, skus: readonly string[], sign: 1 | -1) {
  const changed = new Map(sums);
  for (const sku of skus) changed.set(sku, (changed.get(sku) ?? 0) + sign);
  return new Map([...changed].filter(([, pieces]) => pieces > 0).sort());
}

const timingOf = (pack: Pack) => pack.parts.filter(({ role }) => role.startsWith('R4'));
const skusOf = (parts: readonly { sku: string }[]) => parts.map(({ sku }) => sku);

/** The sold circuit with another capacitor and R4, analysed; leakage goes with the capacitance. */
function rateWith({ circuit, pack }: Claimed, farads: number, ohms: number): number {
  const sold = circuit.capacitor.leakageOhms;
  const printed = pack.parts.find(({ role }) => role === 'C1')!.farads!;
  const cycle = analyseCycle({
    ...circuit,
    timing: { kind: 'single', ohms },
    capacitor: {
      ...circuit.capacitor,
      farads,
      leakageOhms: sold === null ? null : (sold * printed) / farads,
    },
  });
  return cycle.kind === 'oscillates' ? cycle.frequencyHz : NaN;
}

/** Every resistance of one or two of the class's stocked resistors, near to one that will be about right. */
async function stockedOhms(order: Claimed, about: number): Promise<number[]> {
  const worst = Math.max(...timingOf(order.pack).map(({ tolerance }) => tolerance!));
  const limit = [0.001, 0.01, 1].find((each) => worst <= each * 1.0001)!;
  const { rows } = await shop.db.raw(
    `select distinct ohms from parts join lots on lots.part_id = parts.id
     where kind = 'resistor' and mounting = 'through-hole' and active
       and tolerance <= ? and on_hand - reserved >= 2`,
    [limit * 1.0001],
  );
  const ones: number[] = rows.map(({ ohms }: { ohms: number }) => Number(ohms));
  const pairs = ones.flatMap((a) => ones.flatMap((b) => [a + b, (a * b) / (a + b)]));
  return [...ones, ...pairs].filter((ohms) => Math.abs(ohms / about - 1) < 0.02);
}

describe('tuneKit', () => {
  describe('when the capacitor of a kit is measured', () => {
    it.each([-0.03, 0.004, 0.041])(
      'takes the R4 that nothing on the shelf comes nearer than, for a capacitor %f off',
      async (share) => {
        const order = await claimedOrder();
        const farads = order.farads * (1 + share);
        const answer = await read(order, farads);
        const ohms = answer.take.map((part) => part.ohms!);
        const taken =
          answer.join === 'parallel'
            ? 1 / ohms.reduce((sum, each) => sum + 1 / each, 0)
            : ohms.reduce((sum, each) => sum + each, 0);
        const miss = (each: number) => Math.abs(Math.log(rateWith(order, farads, each) / 1000));
        const others = await stockedOhms(order, taken);
        expect(others.length).toBeGreaterThan(20);
        expect(miss(taken)).toBeLessThanOrEqual(Math.min(...others.map(miss)) + 1e-9);
        expect(answer.promise.frequencyHz).toBeCloseTo(rateWith(order, farads, taken), 6);
      },
    );

    it('promises a band of its own that is narrower than the sold one and inside it', async () => {
      const order = await claimedOrder();
      const { promise } = await read(order, order.farads * 1.02);
      const sold = order.pack.promise.band;
      expect(promise.band.minHz).toBeGreaterThanOrEqual(sold.minHz);
      expect(promise.band.maxHz).toBeLessThanOrEqual(sold.maxHz);
      expect(promise.band.maxHz - promise.band.minHz).toBeLessThan(sold.maxHz - sold.minHz);
      expect(promise.band.minHz).toBeLessThan(promise.frequencyHz);
      expect(promise.band.maxHz).toBeGreaterThan(promise.frequencyHz);
    });

    it('keeps that R4 for the order in place of the sold one, with its bin on the walk', async () => {
      const order = await claimedOrder(2);
      const before = await resistorsOf(order.ref);
      const answer = await read(order, order.farads * 0.97, 2);
      const wanted = plus(plus(before, skusOf(timingOf(order.pack)), -1), skusOf(answer.take), 1);
      expect(new Map([...(await resistorsOf(order.ref))].sort())).toEqual(wanted);
      expect(answer.putBack).toEqual([]);
      for (const part of answer.take) {
        const stop = answer.order.picks.find(({ sku }) => sku === part.sku);
        expect(part.bins).toContain(stop?.bin);
        expect(stop?.roles).toContain(part.role);
      }
      expect(await stockDisagreements(shop)).toEqual([]);
      const units = answer.order.lines[0]!.tuning!.units;
      expect(units.map(({ farads }) => farads)).toEqual([null, order.farads * 0.97]);
    });

    it('says what was in the tray already and goes back', async () => {
      const order = await claimedOrder();
      await pickAll(packer, order.ref);
      const answer = await read(order, order.farads * 0.97);
      const sold = skusOf(timingOf(order.pack));
      const isTaken = (sku: string) => answer.take.some((part) => part.sku === sku);
      expect(skusOf(answer.putBack)).toEqual(sold.filter((sku) => !isTaken(sku)));
      expect(answer.putBack[0]!.bins[0]).toMatch(/^[A-Z]-\d\d$/);
      expect(await stockDisagreements(shop)).toEqual([]);
    });

    it('takes what the meter shows as text for the same reading', async () => {
      const order = await claimedOrder();
      const nano = (order.farads * 1.01 * 1e9).toPrecision(4);
      const answer = readingResponseSchema.parse(
        (await send(order, { reading: `${nano}n` }).expect(200)).body,
      );
      expect(answer.farads).toBeCloseTo(Number(nano) * 1e-9, 15);
      const micro = `${Number(nano) / 1000} uF`;
      expect((await send(order, { reading: micro }).expect(200)).body.farads).toBe(answer.farads);
    });
  });

  describe('when a kit is measured again', () => {
    it('changes nothing for the same reading', async () => {
      const order = await claimedOrder();
      const first = await read(order, order.farads * 0.97);
      const row = await shop.db('tunings').where({ order_line_id: order.lineId });
      expect(await read(order, order.farads * 0.97)).toEqual(first);
      expect(await shop.db('tunings').where({ order_line_id: order.lineId })).toEqual(row);
    });

    it('takes another reading in place of the first, and exchanges R4 again', async () => {
      const order = await claimedOrder();
      const before = await resistorsOf(order.ref);
      const first = await read(order, order.farads * 0.97);
      const next = await read(order, order.farads * 1.03);
      expect(skusOf(next.take)).not.toEqual(skusOf(first.take));
      const bare = plus(before, skusOf(timingOf(order.pack)), -1);
      expect(new Map([...(await resistorsOf(order.ref))].sort())).toEqual(
        plus(bare, skusOf(next.take), 1),
      );
      expect(next.order.lines[0]!.tuning!.units).toHaveLength(1);
      expect(await stockDisagreements(shop)).toEqual([]);
    });

    it('stands by one of two readings that arrive at once', async () => {
      const order = await claimedOrder();
      const pieces = (await promisedTo(shop, order.ref)) - timingOf(order.pack).length;
      const answers = await Promise.all(
        [0.97, 1.02].map((share) => send(order, { farads: order.farads * share })),
      );
      expect(answers.map(({ status }) => status)).toEqual([200, 200]);
      const unit = (await view(order.ref)).lines[0]!.tuning!.units[0]!;
      if (unit.farads === null) throw new Error('The reading is missing.');
      expect(await promisedTo(shop, order.ref)).toBe(pieces + unit.take.length);
      expect(await stockDisagreements(shop)).toEqual([]);
    });
  });

  describe('when the reading cannot be this capacitor’s', () => {
    it('refuses it and says what a sound one reads', async () => {
      const order = await claimedOrder();
      for (const share of [0.7, 1.3, 1000]) {
        const { status, body } = await send(order, { farads: order.farads * share });
        expect(status).toBe(422);
        expect(body.type).toMatch(/implausible-reading$/);
        expect(body.detail).toMatch(
          /which reads [\d.]+\u202f?.F to [\d.]+\u202f?.F; this one reads/,
        );
        expect(body.detail).toMatch(/take another one/);
      }
      expect((await view(order.ref)).lines[0]!.tuning!.units[0]!.farads).toBeNull();
    });

    it('takes one at the very end of the printed tolerance as the meter may show it', async () => {
      const order = await claimedOrder();
      const { tolerance } = order.pack.parts.find(({ role }) => role === 'C1')!;
      await read(order, order.farads * (1 + tolerance!) * 1.002);
      const beyond = order.farads * (1 + tolerance!) * 1.003;
      expect((await send(order, { farads: beyond })).status).toBe(422);
    });

    let order: Claimed;
    beforeAll(async () => {
      order = await claimedOrder();
    });
    it.each([
      { reading: '820' },
      { reading: 'nonsense' },
      { reading: '0n' },
      {},
      { farads: 1e-7, reading: '100n' },
      { farads: 0 },
      { farads: -1e-7 },
      { farads: 1e308 },
      { farads: 1e-7, unit: 0 },
      { farads: 1e-7, unit: 2 },
      { farads: 1e-7, unit: 1.5 },
    ])('refuses %o with a sentence', async (body) => {
      const answer = await send(order, body);
      expect(answer.status).toBe(422);
      expect(answer.body.detail.length).toBeGreaterThan(15);
    });
  });

  describe('when it is not this packer’s to tune', () => {
    it('refuses an order that is unclaimed, another’s, packed, or not sold bench-tuned', async () => {
      const { ref } = await paidOrder(shop, shop.visit(), tunedBrief);
      const lineId = (await view(ref)).lines[0]!.id;
      const body = { lineId, unit: 1, farads: 1e-7 };
      expect((await packer.post(at(ref, 'readings')).send(body)).status).toBe(409);
      const order = await claimedOrder();
      expect((await send(order, { farads: order.farads }, second)).status).toBe(409);
      expect((await send({ ...order, lineId }, { farads: order.farads })).status).toBe(404);
      const plain = await claimedOrder(1, clockBrief);
      const refused = await send(plain, { farads: plain.farads });
      expect(refused.status).toBe(409);
      expect(refused.body.detail).toMatch(/not sold bench-tuned/);
      expect((await view(plain.ref)).lines[0]!.tuning).toBeNull();
    });
  });
});

describe('the sold promise', () => {
  describe('when a capacitor may be anything that its print and the meter allow', () => {
    it.each<SolveRequestInput>([
      { target: { value: 10, unit: 'kHz' }, load: { kind: 'logic' }, rank: 'closest' },
      { target: { value: 3, unit: 'kHz' }, load: { kind: 'logic' }, duty: 0.7 },
      { target: { value: 1, unit: 'kHz' }, load: { kind: 'logic' }, supply: { volts: 12 } },
      { target: { value: 90, unit: 'per_minute' } },
    ])('is kept by some R4 for each: %o', async (brief) => {
      const catalogue = await shop.deps.stockView.current();
      const settings = await shopSettings(shop.db);
      const book = { catalogue, settings };
      const { pack, search, shelf } = packFor(book, { ...brief, careLevel: 'bench-tuned' });
      if (pack.timing.kind !== 'single') throw new Error('A tuned pack has one timing resistance.');
      const { farads, tolerance } = pack.frame.capacitor;
      const wide = (1 + tolerance) * (1 + search.meterUncertainty) - 1;
      for (let k = -20; k <= 20; k += 1) {
        const reading = farads * (1 + (k / 20) * wide);
        const kits = tunedKits(pack.frame, reading, tunedClassOf(pack.timing), search, shelf);
        const isKept = kits.some(({ guaranteed }) => liesInside(guaranteed, pack.guaranteed));
        expect(isKept, `${reading} F`).toBe(true);
      }
    });
  });

  it('cannot be held against a reading that is none', async () => {
    const book = {
      catalogue: await shop.deps.stockView.current(),
      settings: await shopSettings(shop.db),
    };
    const { pack, search, shelf } = packFor(book, tunedBrief);
    for (const farads of [0, -1e-7, NaN, Infinity]) {
      expect(() => tunedKits(pack.frame, farads, 0.01, search, shelf)).toThrow(RangeError);
    }
  });
});

describe('packing a bench-tuned line', () => {
  it('is refused until every kit is tuned and its R4 is in the tray', async () => {
    const order = await claimedOrder(2);
    await pickAll(packer, order.ref);
    await read(order, order.farads * 0.98);
    const early = await packer.post(at(order.ref, 'pack'));
    expect(early.status).toBe(409);
    expect(early.body.detail).toBe('Kit 2 of 2 in line 1 is not tuned yet; measure its C1 first.');
    await read(order, order.farads * 1.01, 2);
    const { picks } = await view(order.ref);
    expect(picks.some(({ picked, quantity }) => picked < quantity)).toBe(true);
    expect((await packer.post(at(order.ref, 'pack'))).body.detail).toMatch(/still wants/);
    await pickAll(packer, order.ref);
    await packer.post(at(order.ref, 'pack')).expect(200);
    expect((await send(order, { farads: order.farads })).status).toBe(409);
    const kept = await promisedTo(shop, order.ref);
    const parcel = { carrier: 'Quay Post', tracking: 'QP1' };
    await packer.post(at(order.ref, 'ship')).send(parcel).expect(200);
    const moved = await shop
      .db('stock_ledger')
      .join('orders', 'orders.id', 'stock_ledger.order_id')
      .where('orders.ref', order.ref)
      .sum({ pieces: 'delta' });
    expect(Number(moved[0]!.pieces)).toBe(-kept);
    expect(await statusOf(shop, order.ref)).toBe('shipped');
    expect(await stockDisagreements(shop)).toEqual([]);
  });
});

describe('handing a tuned order back', () => {
  it('lets its readings count no more, and the next packer measures anew', async () => {
    const order = await claimedOrder();
    const first = await read(order, order.farads * 0.97);
    await packer.post(at(order.ref, 'release')).expect(200);
    expect((await view(order.ref)).lines[0]!.tuning!.units[0]!.farads).toBeNull();
    await second.post(at(order.ref, 'claim')).expect(200);
    await pickAll(second, order.ref);
    expect((await second.post(at(order.ref, 'pack'))).status).toBe(409);
    const again = await send(order, { farads: order.farads * 0.97 }, second).expect(200);
    expect(skusOf(again.body.take)).toEqual(skusOf(first.take));
    await second.post(at(order.ref, 'pack')).expect(200);
    expect(await stockDisagreements(shop)).toEqual([]);
  });
});

describe('when the shelves have run out of other resistors', () => {
  it('takes the kit’s own R4 where it fits, and refuses a capacitor that would break the promise', async () => {
    const order = await claimedOrder();
    await shop.db.raw(
      `insert into stock_ledger (lot_id, delta, balance, reason, actor_name)
       select lots.id, reserved - on_hand, 0, 'lost', 'Ivo Brandreth'
       from lots join parts on parts.id = lots.part_id
       where kind = 'resistor' and on_hand > reserved order by lots.id`,
    );
    const pieces = await promisedTo(shop, order.ref);
    const refused = await send(order, { farads: order.farads * 1.04 });
    expect(refused.status).toBe(409);
    expect(refused.body.type).toMatch(/promise-not-kept$/);
    expect(refused.body.detail).toMatch(/was promised\. Put this capacitor back|holds no R4/);
    expect(await promisedTo(shop, order.ref)).toBe(pieces);
    const kept = await read(order, order.farads * (order.pack.promise.frequencyHz / 1000));
    expect(skusOf(kept.take)).toEqual(skusOf(timingOf(order.pack)));
    expect(await stockDisagreements(shop)).toEqual([]);
  });
});
