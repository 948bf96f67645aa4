import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  auditPageSchema,
  coverageSchema,
  deskOrdersPageSchema,
  deskPartSchema,
  deskPartsPageSchema,
  deskTodaySchema,
  partHistorySchema,
  type DeskPart,
} from '../../server/contracts/desk.ts';
import { partsPageSchema } from '../../server/contracts/parts.ts';
import { shopSchema } from '../../server/contracts/shop.ts';
import { calls } from '../../server/http/calls.ts';
import { openTestShop, type TestShop, type Visit } from '../support/test-shop.ts';
import { paidOrder, placeOrder, signIn, stockDisagreements } from '../support/shopping.ts';

let shop: TestShop;
let owner: Visit;
const folder = mkdtempSync(path.join(tmpdir(), 'tockwell-client-'));
beforeAll(async () => {
  mkdirSync(path.join(folder, 'assets'));
  writeFileSync(path.join(folder, 'index.html'), '<!doctype html><title>Tockwell</title>');
  writeFileSync(path.join(folder, 'assets', 'app.js'), 'export {};');
  shop = await openTestShop({ clientDir: folder });
  owner = await signIn(shop, 'owner');
});
afterAll(async () => {
  await shop.close();
  rmSync(folder, { recursive: true, force: true });
});

async function parts(query: string): Promise<DeskPart[]> {
  const answer = await owner.get(`/api/desk/parts?${query}`).expect(200);
  return deskPartsPageSchema.parse(answer.body).items;
}

describe('the parts of the desk', () => {
  it('are found by what somebody types, with plain blanks for the narrow ones', async () => {
    const found = await parts(`search=${encodeURIComponent('887 kΩ')}`);
    expect(found.length).toBeGreaterThan(0);
    for (const { part } of found) expect(part.name).toContain('887\u202fkΩ');
    const [first] = found;
    const bySku = await parts(`search=${first!.part.sku.toLowerCase()}`);
    expect(bySku.map(({ id }) => id)).toContain(first!.id);
    const byBin = await parts(`search=${first!.lots[0]!.bin}`);
    expect(byBin.map(({ id }) => id)).toContain(first!.id);
    expect(await parts('search=%25%25%25')).toEqual([]);
    expect(await parts('search=nothing-like-it')).toEqual([]);
  });

  it.each(['sku', 'name', 'value', 'price', 'onHand', 'available'])(
    'are sorted by %s both ways',
    async (sort) => {
      const key = (item: DeskPart) =>
        sort === 'price'
          ? item.part.unitPrice.amount
          : sort === 'onHand'
            ? item.onHand
            : sort === 'available'
              ? item.part.available
              : sort === 'value'
                ? (item.part as { farads: number }).farads
                : sort === 'sku'
                  ? item.part.sku
                  : item.part.name;
      const up = (await parts(`kind=capacitor&sort=${sort}&direction=up&pageSize=500`)).map(key);
      const down = (await parts(`kind=capacitor&sort=${sort}&direction=down&pageSize=500`)).map(
        key,
      );
      expect([...down].reverse().join()).toBe(up.join());
      if (typeof up[0] === 'number')
        expect([...up].sort((a, b) => Number(a) - Number(b))).toEqual(up);
    },
  );

  it('are filtered by kind, mounting and stock', async () => {
    for (const { part } of await parts('kind=led&mounting=surface-mount')) {
      expect(part).toMatchObject({ kind: 'led', mounting: 'surface-mount' });
    }
    expect((await parts('stock=out&pageSize=500')).every(({ part }) => part.available === 0)).toBe(
      true,
    );
    const low = await parts('stock=low&pageSize=500');
    expect(low.length).toBeGreaterThan(0);
    expect(low.every(({ part }) => part.available > 0 && part.available < 10)).toBe(true);
    expect((await parts('stock=in&pageSize=500')).every(({ part }) => part.available > 0)).toBe(
      true,
    );
  });

  it('come in pages that leave nothing out and repeat nothing', async () => {
    const { total } = (await owner.get('/api/desk/parts?pageSize=1')).body;
    const ids: string[] = [];
    for (let page = 1; page <= Math.ceil(total / 200); page += 1) {
      ids.push(...(await parts(`page=${page}&pageSize=200&sort=price`)).map(({ id }) => id));
    }
    expect(ids.length).toBe(total);
    expect(new Set(ids).size).toBe(total);
    expect(await parts('page=9999')).toEqual([]);
  });
});

describe('the owner’s corrections', () => {
  const change = (id: string, lotId: string, onHand: number, note = 'counted again') =>
    owner.post(`/api/desk/parts/${id}/stock`).send({ lotId, onHand, reason: 'counted', note });

  it('post the difference to the ledger and the audit log', async () => {
    const [part] = await parts('kind=led&stock=in');
    const [lot] = part!.lots;
    const answer = await change(part!.id, lot!.id, lot!.onHand + 7).expect(200);
    expect(deskPartSchema.parse(answer.body).onHand).toBe(part!.onHand + 7);
    const history = partHistorySchema.parse(
      (await owner.get(`/api/desk/parts/${part!.id}/history`)).body,
    );
    expect(history.ledger[0]).toMatchObject({
      who: 'Maud Tarrow',
      from: lot!.onHand,
      to: lot!.onHand + 7,
    });
    expect(history.audit[0]!.what).toMatch(/correct stock \(counted\): counted again/);
    const audit = auditPageSchema.parse(
      (await owner.get(`/api/desk/audit?search=${part!.part.sku}`)).body,
    );
    expect(audit.items[0]).toMatchObject({ who: 'Maud Tarrow', subject: `part ${part!.part.sku}` });
    expect(await stockDisagreements(shop)).toEqual([]);
  });

  it('are made once under a key', async () => {
    const [part] = await parts('kind=board&stock=in');
    const [lot] = part!.lots;
    const send = () =>
      change(part!.id, lot!.id, lot!.onHand + 1).set('idempotency-key', 'count-once');
    await send().expect(200);
    await send().expect(200);
    const { ledger } = (await owner.get(`/api/desk/parts/${part!.id}/history`)).body;
    expect(ledger.filter((entry: { what: string }) => /^Counted/.test(entry.what))).toHaveLength(1);
  });

  it('cannot take away what is promised, nor touch another part’s lot', async () => {
    const { pack } = await placeOrder(shop.visit());
    const sku = pack.parts.find((one) => one.role === 'C1')!.sku;
    const part = (await parts(`search=${sku}`)).find((one) => one.part.sku === sku)!;
    const lot = part.lots.find((one) => one.reserved > 0)!;
    const refused = await change(part.id, lot.id, lot.reserved - 1);
    expect(refused.status).toBe(409);
    expect(refused.body.detail).toMatch(/promised to orders/);
    const [other] = await parts('kind=led');
    expect((await change(other!.id, lot.id, 5)).status).toBe(404);
    expect((await change(part.id, '1e3', 5)).status).toBe(404);
  });

  it('of prices are whole cents, with a reason that stays', async () => {
    const [part] = await parts('kind=diode');
    const send = (amount: unknown, currency = 'EUR', reason = 'supplier') =>
      owner
        .patch(`/api/desk/parts/${part!.id}/price`)
        .send({ unitPrice: { amount, currency }, reason });
    for (const amount of [-1, 1.5, '12', 1e12]) expect((await send(amount)).status).toBe(422);
    expect((await send(12, 'USD')).status).toBe(422);
    expect((await send(12, 'EUR', '')).status).toBe(422);
    const answer = deskPartSchema.parse((await send(37).expect(200)).body);
    expect(answer.part.unitPrice).toEqual({ amount: 37, currency: 'EUR' });
    const { audit } = (await owner.get(`/api/desk/parts/${part!.id}/history`)).body;
    expect(audit[0]).toMatchObject({ what: 'change price: supplier', to: '€\u00a00.37' });
  });
});

describe('the orders of the desk', () => {
  it('are found by reference, name with a blank, place and state', async () => {
    const { ref } = await paidOrder(shop);
    const find = async (query: string) =>
      deskOrdersPageSchema
        .parse((await owner.get(`/api/desk/orders?${query}`).expect(200)).body)
        .items.map((order) => order.ref);
    expect(await find(`search=${ref}`)).toEqual([ref]);
    expect(await find('search=tove%20marlin')).toContain(ref);
    expect(await find('search=eelmouth')).toContain(ref);
    expect(await find('search=100%25')).toEqual([]);
    expect(await find('status=paid')).toContain(ref);
    expect(await find('status=shipped')).not.toContain(ref);
    expect((await owner.get('/api/desk/orders?status=lost')).status).toBe(422);
  });

  it('are summed up for the day', async () => {
    const before = deskTodaySchema.parse((await owner.get('/api/desk/today')).body);
    const { pack } = await paidOrder(shop);
    const after = deskTodaySchema.parse((await owner.get('/api/desk/today')).body);
    expect(after.waiting).toBe(before.waiting + 1);
    expect(after.soldToday.amount).toBeGreaterThan(
      before.soldToday.amount + pack.price.unit.amount,
    );
    for (const decision of after.decisions) expect(decision.path).toMatch(/^\/(desk|bench)/);
  });
});

describe('the coverage', () => {
  it('says over seven decades how steadily the shelves hold a rate', async () => {
    const coverage = coverageSchema.parse((await owner.get('/api/desk/coverage').expect(200)).body);
    expect(coverage.points[0]!.frequencyHz).toBeCloseTo(0.01, 6);
    expect(coverage.points.at(-1)!.frequencyHz).toBeCloseTo(1e5, 2);
    const held = coverage.points.filter(
      ({ halfBand }) => halfBand !== null && halfBand <= coverage.band,
    );
    expect(coverage.covered).toBeCloseTo(held.length / coverage.points.length, 12);
    expect(held.length).toBeGreaterThan(10);
  });
});

describe('the public side', () => {
  it('lists parts by kind, with what only the house sees left out', async () => {
    for (const kind of [
      'resistor',
      'capacitor',
      'comparator',
      'led',
      'diode',
      'board',
      'battery',
      'holder',
      'trimmer',
    ]) {
      const answer = await shop.visit().get(`/api/parts?kind=${kind}`).expect(200);
      const page = partsPageSchema.parse(answer.body);
      expect(page.items.every((part) => part.kind === kind)).toBe(true);
      expect(JSON.stringify(answer.body)).not.toMatch(/cost/i);
    }
    expect((await shop.visit().get('/api/parts?kind=magnet')).status).toBe(422);
  });

  it('says what the forms need to know', async () => {
    const answer = shopSchema.parse((await shop.visit().get('/api/shop')).body);
    expect(answer.batteries.length).toBeGreaterThan(0);
    expect(answer.ledColours).toContain('red');
  });

  it('says that it lives and is ready', async () => {
    expect((await shop.visit().get('/api/health')).body).toEqual({ status: 'ok' });
    expect((await shop.visit().get('/api/ready')).status).toBe(200);
  });

  it('serves its description with every call, its role and its contracts', async () => {
    const { body } = await shop.visit().get('/api/openapi.json').expect(200);
    expect(body.openapi).toBe('3.0.3');
    for (const call of calls) {
      const described = body.paths[call.path][call.method];
      expect(described.summary).toBe(call.summary);
      expect(Boolean(described.requestBody)).toBe(Boolean(call.body));
      expect(described['x-role'] ?? null).toBe(call.role);
      const answer = described.responses[String(call.status ?? 200)];
      if (call.answer) expect(answer.content['application/json'].schema.type).toBe('object');
    }
    const listed = Object.values(body.paths as Record<string, object>).flatMap(Object.keys);
    expect(listed).toHaveLength(calls.length);
  });

  it('serves the pages for every address of theirs, and 404 for a file that is not there', async () => {
    for (const address of ['/', '/packs/abc', '/desk/orders']) {
      const page = await shop.visit().get(address).expect(200);
      expect(page.text).toContain('Tockwell');
      expect(page.headers['cache-control']).toBe('no-cache');
      expect(page.headers['content-security-policy']).toMatch(/default-src 'self'/);
    }
    const file = await shop.visit().get('/assets/app.js').expect(200);
    expect(file.headers['cache-control']).toMatch(/immutable/);
    expect((await shop.visit().get('/assets/gone.js')).status).toBe(404);
  });
});
