import { deflateRawSync } from 'node:zlib';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { z } from 'zod';
import { problemSchema } from '../../server/contracts/common.ts';
import { analyseResponseSchema } from '../../server/contracts/circuits.ts';
import { solveResponseSchema } from '../../server/contracts/packs.ts';
import { calls, type Call } from '../../server/http/calls.ts';
import { openTestShop, type TestShop, type Visit } from '../support/test-shop.ts';
import { address, clockBrief, paidOrder, putIn, signIn, solve } from '../support/shopping.ts';

interface Answer {
  status: number;
  type: string;
  text: string;
}

let shop: TestShop;
const visits: Record<string, Visit> = {};
const inPath: Record<string, string> = {};
const goodBodies: Record<string, object> = {};

beforeAll(async () => {
  shop = await openTestShop();
  visits.guest = shop.visit();
  visits.owner = await signIn(shop, 'owner');
  visits.packer = await signIn(shop, 'packer');
  const tuned = { ...clockBrief, careLevel: 'bench-tuned' as const };
  const { ref } = await paidOrder(shop, shop.visit(), tuned);
  const claimed = await visits.packer.post(`/api/bench/orders/${ref}/claim`).expect(200);
  const lineId = claimed.body.lines[0].id;
  await putIn(visits.guest);
  const part = (await visits.owner.get('/api/desk/parts?pageSize=1')).body.items[0];
  const { packs } = await solve(visits.guest, clockBrief);
  inPath['bench ref'] = ref;
  inPath['desk ref'] = ref;
  inPath['desk id'] = part.id;
  inPath['basket id'] = (await visits.guest.get('/api/basket')).body.lines[0].id;
  Object.assign(goodBodies, {
    '/api/circuits/analyse': goodCircuit,
    '/api/packs/solve': { ...clockBrief, duty: 0.5, supply: { volts: 5 }, quantity: 1, limit: 1 },
    '/api/auth/sign-up': { email: 'new@example.example', password: 'too short', name: 'New' },
    '/api/auth/sign-in': { email: 'not an address', password: 'some password of length' },
    '/api/basket/lines': { token: packs[0]!.token, quantity: 1 },
    '/api/basket/lines/{id}': { quantity: 1 },
    '/api/checkout': {
      email: 'a@b.example',
      shippingAddress: address,
      shippingMethod: 'standard',
      acknowledgements: ['flash'],
    },
    '/api/bench/orders/{ref}/picks': { id: '1', quantity: 1 },
    '/api/bench/orders/{ref}/readings': { lineId, unit: 1, farads: 8.2e-7 },
    '/api/bench/orders/{ref}/ship': { carrier: 'Quay Post', tracking: 'QP1' },
    '/api/desk/parts/{id}/price': { unitPrice: { amount: 5, currency: 'EUR' }, reason: 'why not' },
    '/api/desk/parts/{id}/stock': { lotId: '1', onHand: 5, reason: 'counted', note: 'counted' },
    '/api/desk/orders/{ref}/refund': { reason: 'changed mind' },
  });
});
afterAll(() => shop.close());

const goodCircuit = {
  supplyVolts: 5,
  thresholds: { r1Ohms: 1e5, r2Ohms: 1e5, r3Ohms: 1e5 },
  timing: { kind: 'single', ohms: 1e5 },
  capacitor: { farads: 1e-7 },
  comparator: { output: 'push-pull', highOhms: 10 },
  tolerances: { capacitor: 0.05, samples: 10 },
};

function addressOf(call: Call): string {
  const area = call.path.split('/')[2]!;
  return call.path.replace(/\{(\w+)\}/g, (_, name) => inPath[`${area} ${name}`] ?? 'none');
}

function visitFor(call: Call): Visit {
  return visits[call.role === 'owner' ? 'owner' : call.role === 'bench' ? 'packer' : 'guest']!;
}

async function post(call: Call, body: string | Buffer, headers: Record<string, string> = {}) {
  const visit = visitFor(call);
  const begun =
    call.method === 'patch' ? visit.patch(addressOf(call)) : visit.post(addressOf(call));
  const request = begun
    .set({ 'content-type': 'application/json', ...headers })
    .serialize((given: unknown) => given as string)
    .ok(() => true);
  return request.send(body as string);
}

/** Either a legitimate answer by chance, or a refusal in the one form, that gives nothing away. */
function expectDecent(answer: Answer, what: string): void {
  expect(answer.status, `${what} → ${answer.text}`).toBeLessThan(500);
  if (answer.status < 400) return;
  expect(answer.type, what).toBe('application/problem+json');
  const problem = problemSchema.parse(JSON.parse(answer.text));
  expect(problem.status).toBe(answer.status);
  expect(problem.detail, what).not.toMatch(
    /node_modules|\bat \w+ \(|undefined|\[object|select |insert /,
  );
  expect(problem.detail.length, what).toBeGreaterThan(10);
}

const odd = fc.oneof(
  fc.constantFrom<unknown>(
    null,
    true,
    '',
    ' ',
    'NaN',
    'Infinity',
    '1e308',
    1e308,
    -1e308,
    5e-324,
    -0,
    -1,
    0.5,
    2 ** 53,
    [],
    {},
    [[[[[[]]]]]],
    '\u0000',
    '\ud800',
    'ẞ\u202e🕰️',
    "'; drop table orders; --",
    'x'.repeat(5000),
    { $ne: null },
    { toString: 1 },
    [null],
  ),
  fc.jsonValue({ maxDepth: 3 }),
);

const hostileTexts = fc.constantFrom(
  '',
  '{',
  'null',
  '42',
  '"text"',
  '[]',
  '{"__proto__":{"polluted":true}}',
  '{"constructor":{"prototype":{"polluted":true}}}',
  '{"target":{"value":1e999,"unit":"Hz"}}',
  '{"quantity":NaN}',
  '[[[[[[[[[['.repeat(50),
  `${'['.repeat(20_000)}${']'.repeat(20_000)}`,
  `{"a":${'{"a":'.repeat(5000)}1${'}'.repeat(5000)}}`,
  `"${'x'.repeat(150_000)}"`,
  '\ufeff{}',
  '{"a":1}}',
);

const hostileHeaders = fc.constantFrom<Record<string, string>>(
  {},
  {},
  { 'content-type': 'text/plain' },
  { 'content-type': 'application/x-www-form-urlencoded' },
  { 'content-type': 'multipart/form-data; boundary=x' },
  { 'content-type': 'application/json; charset=klingon' },
  { 'content-type': 'nonsense' },
  { 'content-encoding': 'gzip' },
  { 'content-encoding': 'rot13' },
  { 'idempotency-key': 'a-key-for-this-test' },
  { 'idempotency-key': 'short' },
  { 'idempotency-key': 'x'.repeat(300) },
);

/** A good body with one field, at any depth, made wrong, left out or added. */
function spoilt(body: unknown, at: number, junk: unknown): unknown {
  if (typeof body !== 'object' || body === null) return junk;
  const entries = Object.entries(body);
  const place = at % (entries.length + 1);
  if (place === entries.length) return { ...body, ['extra']: junk };
  const [name, inner] = entries[place]!;
  const deeper = typeof inner === 'object' && inner !== null && at % 3 > 0;
  const next = deeper ? spoilt(inner, Math.floor(at / 3), junk) : junk;
  return Array.isArray(body) ? [next] : { ...body, [name]: next };
}

const bodyCalls = calls.filter(
  ({ method, path }) =>
    (method === 'post' || method === 'patch') &&
    path !== '/api/webhooks/stripe' &&
    !path.endsWith('/sign-out'),
);

describe('every call that takes a body', () => {
  it.each(bodyCalls.map((call) => [call.method, call.path, call] as const))(
    '%s %s answers any malformed body with a problem, never with a failure of its own',
    async (_method, path, call) => {
      await fc.assert(
        fc.asyncProperty(odd, fc.nat(5000), async (junk, at) => {
          const body = JSON.stringify(spoilt(goodBodies[path] ?? {}, at, junk)) ?? '';
          expectDecent(await post(call, body), `${path} ${body.slice(0, 300)}`);
        }),
        { numRuns: 120, seed: 1 },
      );
      await fc.assert(
        fc.asyncProperty(
          fc.oneof(
            hostileTexts,
            odd.map((junk) => JSON.stringify(junk) ?? ''),
          ),
          hostileHeaders,
          async (text, headers) => {
            const answer = await post(call, text, headers);
            expectDecent(answer, `${path} ${JSON.stringify(headers)} ${text.slice(0, 200)}`);
          },
        ),
        { numRuns: 80, seed: 2 },
      );
      expect(Object.prototype).not.toHaveProperty('polluted');
    },
  );

  it('answers a body nested without end, under a key or without', async () => {
    const nested = `{"reason":${'['.repeat(40_000)}${']'.repeat(40_000)}}`;
    for (const call of bodyCalls) {
      for (const key of ['', 'a-key-for-nested-bodies']) {
        const headers: Record<string, string> = key === '' ? {} : { 'idempotency-key': key };
        expectDecent(await post(call, nested, headers), call.path);
      }
    }
  });

  it('says what is missing by its name', async () => {
    const call = bodyCalls.find(({ path }) => path === '/api/packs/solve')!;
    const { errors, detail } = JSON.parse((await post(call, '{}')).text);
    expect(errors).toEqual([{ path: 'target', message: 'This is missing.' }]);
    expect(detail).toBe('target: This is missing.');
    const text = await post(call, 'target', { 'content-type': 'text/plain' });
    expect(JSON.parse(text.text).detail).toMatch(/^Send a JSON object/);
  });

  it('says that the body is not JSON with 400, and that it is too large with 413', async () => {
    const call = bodyCalls.find(({ path }) => path === '/api/packs/solve')!;
    expect((await post(call, '{"target":')).status).toBe(400);
    expect((await post(call, `{"a":"${'x'.repeat(200_000)}"}`)).status).toBe(413);
    const broken = deflateRawSync('{"a":1}');
    expect((await post(call, broken, { 'content-encoding': 'gzip' })).status).toBe(400);
  });
});

describe('addresses and queries', () => {
  const strange = [
    '%00',
    '%E0%A4%A',
    '%FF',
    '..%2f..%2fetc',
    "'%20or%201=1--",
    '%F0%9F%95%B0',
    'x'.repeat(3000),
  ];

  it.each(strange)('with %.20s in the path are answered with a problem', async (text) => {
    const paths = [
      ...new Set(calls.filter(({ path }) => path.includes('{')).map(({ path }) => path)),
    ];
    for (const path of paths) {
      const address = path.replace(/\{\w+\}/g, text);
      for (const who of ['guest', 'owner']) {
        const answer = await visits[who]!.get(address).ok(() => true);
        expectDecent(answer, address);
      }
    }
  });

  it.each(['%00', '%FF', '_', '%5C'])(
    'with %.20s in the query are answered decently',
    async (text) => {
      for (const { path, role, query } of calls.filter(({ method }) => method === 'get')) {
        const names = ['token', ...Object.keys((query as z.ZodObject | undefined)?.shape ?? {})];
        if (path.includes('coverage')) continue;
        const visit = role === null ? visits.guest! : visits.owner!;
        for (const name of names) {
          const twice = text === '_' ? `&${name}=2` : '';
          const address = `${path.replace(/\{\w+\}/g, 'none')}?${name}=${text}${twice}`;
          expectDecent(await visit.get(address).ok(() => true), address);
        }
      }
    },
  );

  it.each(['page=0', 'page=-1', 'page=1.5', 'page=1e9', 'pageSize=0', 'pageSize=501', 'page=NaN'])(
    'with %s are refused',
    async (query) => {
      const answer = await visits.guest!.get(`/api/parts?${query}`);
      expect(answer.status).toBe(422);
    },
  );

  it('that lead nowhere are answered with 404 and a problem', async () => {
    for (const address of ['/api', '/api/nothing', '/api/desk/nothing', '/api/packs']) {
      const answer = await visits.owner!.get(address);
      expect(answer.status).toBe(404);
      expect(answer.type).toBe('application/problem+json');
    }
  });
});

describe('numbers at the ends of what is allowed', () => {
  const ends = (...values: number[]) => fc.constantFrom(...values);
  const circuit = fc.record({
    supplyVolts: ends(0.1, 3, 1000),
    celsius: ends(-100, 25, 300),
    referenceCelsius: ends(-100, 25, 300),
    resistorTemperatureCoefficientPerKelvin: ends(-0.004, 0, 0.004),
    thresholds: fc.record({
      r1Ohms: ends(1e-3, 1e5, 1e12),
      r2Ohms: ends(1e-3, 1e5, 1e12),
      r3Ohms: ends(1e-3, 1e5, 1e12),
    }),
    timing: fc.oneof(
      fc.record({ kind: fc.constant('single'), ohms: ends(1e-3, 1e5, 1e12) }),
      fc.record({
        kind: fc.constant('steered'),
        chargeOhms: ends(1e-3, 1e4, 1e12),
        dischargeOhms: ends(1e-3, 1e5, 1e12),
        diode: fc.record({
          saturationAmps: ends(1e-20, 2.5e-9, 1e-2),
          emissionCoefficient: ends(0.5, 1.75, 10),
        }),
      }),
    ),
    capacitor: fc.record({
      farads: ends(1e-15, 1e-7, 100),
      leakageOhms: fc.constantFrom(null, null, 1, 1e18),
      leakageAmps: ends(0, 0, -1, 1e-9, 1),
      biasHalvingVolts: fc.constantFrom(null, null, 1e-3, 5, 1e6),
      temperatureCoefficientPerKelvin: ends(-0.004, 0, 0.004),
    }),
    comparator: fc.record({
      output: fc.constantFrom('push-pull', 'open-drain'),
      highVolts: fc.constantFrom(null, -1000, 1000),
      lowVolts: ends(0, -1000, 1000),
      highOhms: ends(0, 50, 1e9),
      lowOhms: ends(0, 50, 1e9),
      pullUpOhms: ends(1e-3, 1e4, 1e12),
      delayLowHighSeconds: ends(0, 1e-6, 10),
      delayHighLowSeconds: ends(0, 1e-6, 10),
      invertingBiasAmps: ends(0, 0, -1, 1e-9),
      nonInvertingBiasAmps: ends(0, 0, 1, -1e-9),
      offsetVolts: ends(0, 0, -1000, 1e-3),
      hysteresisVolts: ends(0, 0, 1000),
    }),
    tolerances: fc.option(
      fc.record({
        thresholds: ends(0, 0.01, 0.5),
        timing: ends(0, 0.5),
        capacitor: ends(0, 0.5),
        distribution: fc.constantFrom('uniform', 'normal'),
        band: ends(1e-6, 0.05, 10),
        samples: ends(1, 50),
      }),
      { nil: undefined },
    ),
  });
  /** Mostly an ordinary circuit, with some parts of the extreme one. */
  const mixed = fc
    .tuple(
      circuit,
      fc.subarray([
        'supplyVolts',
        'celsius',
        'referenceCelsius',
        'thresholds',
        'timing',
        'capacitor',
        'comparator',
        'tolerances',
        'resistorTemperatureCoefficientPerKelvin',
      ] as const),
    )
    .map(([extreme, taken]) => ({
      ...goodCircuit,
      ...Object.fromEntries(taken.map((name) => [name, extreme[name]])),
    }));

  it('give an analysis in whole or a reason', async () => {
    let solved = 0;
    await fc.assert(
      fc.asyncProperty(mixed, async (body) => {
        const answer = await visits
          .guest!.post('/api/circuits/analyse')
          .send(body)
          .ok(() => true);
        expectDecent(answer, JSON.stringify(body));
        if (answer.status >= 400) return;
        solved += 1;
        analyseResponseSchema.parse(answer.body);
      }),
      { numRuns: 400, seed: 9 },
    );
    expect(solved).toBeGreaterThan(50);
  });

  it('give packs or advice', async () => {
    const brief = fc.record(
      {
        target: fc.record({
          value: ends(1e-9, 0.01, 1, 90, 1e4, 1e9),
          unit: fc.constantFrom('Hz', 'kHz', 'per_minute', 's', 'ms'),
        }),
        duty: ends(0.05, 0.3, 0.5, 0.95),
        supply: fc.oneof(
          fc.record({ volts: ends(0.5, 1.8, 5, 12, 60) }),
          fc.record({ battery: fc.constantFrom('TW-CELL-AA-2', 'TW-CELL-AAA-3', 'NONE') }),
        ),
        load: fc.oneof(
          fc.constant({ kind: 'logic' }),
          fc.record({
            kind: fc.constant('led'),
            colour: fc.constantFrom('red', 'blue'),
            amps: ends(0.0002, 0.002, 0.03),
          }),
        ),
        band: ends(0.0005, 0.05, 0.5),
        ambient: fc.constantFrom(
          { minCelsius: -55, maxCelsius: 125 },
          { minCelsius: 125, maxCelsius: 125 },
          { minCelsius: 20, maxCelsius: 30 },
        ),
        mounting: fc.constantFrom('through-hole', 'surface-mount'),
        careLevel: fc.constantFrom('as-stocked', 'as-stocked', 'bench-tuned'),
        quantity: ends(1, 1, 7, 500),
        rank: fc.constantFrom('best-value', 'closest', 'steadiest'),
        limit: ends(1, 5),
      },
      { requiredKeys: ['target'] },
    );
    await fc.assert(
      fc.asyncProperty(brief, async (body) => {
        const answer = await visits
          .guest!.post('/api/packs/solve')
          .send(body)
          .ok(() => true);
        expectDecent(answer, JSON.stringify(body));
        if (answer.status >= 400) return;
        const { packs, advice } = solveResponseSchema.parse(answer.body);
        if (packs.length === 0) expect(advice.length).toBeGreaterThan(0);
        for (const pack of packs) expect(pack.makeable).toBeGreaterThanOrEqual(body.quantity ?? 1);
      }),
      { numRuns: 100, seed: 10 },
    );
  });
});
