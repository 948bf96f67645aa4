import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { problemSchema } from '../../server/contracts/common.ts';
import { calls, type Call } from '../../server/http/calls.ts';
import { openTestShop, type TestShop, type Visit } from '../support/test-shop.ts';
import { paidOrder, putIn, signIn } from '../support/shopping.ts';

const callers = ['guest', 'maker', 'packer', 'owner'] as const;
type Caller = (typeof callers)[number];

/** What the interface says of each role, written out once more beside the list of calls. */
function expectedOf(call: Call, caller: Caller): 401 | 403 | 'let through' {
  const staff = caller === 'packer' || caller === 'owner';
  if (call.role === null) return 'let through';
  if (caller === 'guest') return 401;
  if (call.role === 'bench' && !staff) return 403;
  if (call.role === 'owner' && caller !== 'owner') return 403;
  return 'let through';
}

const absent: Record<string, string> = {
  ref: 'TQ-0001',
  id: '00000000-0000-4000-8000-000000000000',
  token: 'none.none',
};
const addressOf = (call: Call) => call.path.replace(/\{(\w+)\}/g, (_, name) => absent[name]!);

let shop: TestShop;
const visits = {} as Record<Caller, Visit>;
beforeAll(async () => {
  shop = await openTestShop();
  visits.guest = shop.visit();
  for (const who of ['maker', 'packer', 'owner'] as const) visits[who] = await signIn(shop, who);
});
afterAll(() => shop.close());

describe('the list of calls', () => {
  it('names every area of the interface with the role that it needs', () => {
    for (const call of calls) {
      if (call.path.startsWith('/api/desk')) expect(call.role).toBe('owner');
      else if (call.path.startsWith('/api/bench')) expect(call.role).toBe('bench');
      else expect([null, 'signed-in']).toContain(call.role);
    }
    expect(calls.length).toBeGreaterThan(35);
  });
});

describe('each call', () => {
  // Signing out comes last, or the callers after it would be guests.
  const inTurn = [...calls].sort((a, b) => Number(isSignOut(a)) - Number(isSignOut(b)));
  const cases = inTurn.flatMap((call) => callers.map((caller) => ({ call, caller })));

  it.each(
    cases.map(
      ({ call, caller }) =>
        [call.method, call.path, caller, expectedOf(call, caller), call] as const,
    ),
  )('%s %s by %s: %s', async (method, _path, caller, expected, call) => {
    const answer = await visits[caller][method](addressOf(call));
    if (expected === 'let through') expect([401, 403]).not.toContain(answer.status);
    else {
      expect(answer.status).toBe(expected);
      expect(answer.type).toBe('application/problem+json');
      expect(problemSchema.parse(JSON.parse(answer.text)).status).toBe(expected);
    }
    expect(answer.status).toBeLessThan(500);
  });
});

function isSignOut(call: Call): boolean {
  return call.path.endsWith('/sign-out');
}

describe('somebody else’s things', () => {
  describe('when an order is another buyer’s', () => {
    it('are not there for a guest, a maker, a packer or the owner on the buyers’ side', async () => {
      const { ref } = await paidOrder(shop);
      for (const caller of callers) {
        const visit = caller === 'guest' ? shop.visit() : await signIn(shop, caller);
        const order = await visit.get(`/api/orders/${ref}`);
        expect(order.status).toBe(404);
        const wrongToken = await visit.get(`/api/orders/${ref}?token=${'x'.repeat(32)}`);
        expect(wrongToken.status).toBe(404);
      }
      const token = shop.deps.signer.orderToken(ref);
      const order = await shop.visit().get(`/api/orders/${ref}?token=${token}`).expect(200);
      const line = order.body.lines[0].id;
      const sheet = `/api/orders/${ref}/lines/${line}/build-sheet`;
      expect((await shop.visit().get(sheet)).status).toBe(404);
      expect((await shop.visit().get(`${sheet}.pdf`)).status).toBe(404);
      expect((await shop.visit().get(`${sheet}?token=${token}`)).status).toBe(200);
    });

    it('are not opened by the token of another order', async () => {
      const [one, other] = [await paidOrder(shop), await paidOrder(shop)];
      const token = shop.deps.signer.orderToken(one.ref);
      expect((await shop.visit().get(`/api/orders/${other.ref}?token=${token}`)).status).toBe(404);
    });
  });

  describe('when a basket line is another buyer’s', () => {
    it('can neither be changed nor taken out', async () => {
      const [mine, theirs] = [shop.visit(), shop.visit()];
      await putIn(mine);
      await putIn(theirs);
      const { id } = (await theirs.get('/api/basket')).body.lines[0];
      expect((await mine.patch(`/api/basket/lines/${id}`).send({ quantity: 3 })).status).toBe(404);
      expect((await mine.delete(`/api/basket/lines/${id}`)).status).toBe(404);
      expect((await shop.visit().delete(`/api/basket/lines/${id}`)).status).toBe(404);
      expect((await theirs.get('/api/basket')).body.lines[0].quantity).toBe(1);
    });
  });
});

describe('a state-changing call', () => {
  const send = (headers: Record<string, string>) =>
    visits.owner.post('/api/auth/sign-up').set(headers).send({});

  describe('when a browser made it from another site', () => {
    it.each([
      [{ 'sec-fetch-site': 'cross-site' }],
      [{ 'sec-fetch-site': 'same-site' }],
      [{ origin: 'https://elsewhere.example' }],
      [{ origin: 'null' }],
      [{ origin: 'http://127.0.0.1:1' }],
    ])('is refused: %o', async (headers: Record<string, string>) => {
      const answer = await send(headers);
      expect(answer.status).toBe(403);
      expect(answer.type).toBe('application/problem+json');
    });
  });

  describe('when it comes from the shop’s own pages or a program', () => {
    it.each(['same-origin', 'none'])('is let through with Sec-Fetch-Site: %s', async (site) => {
      expect((await send({ 'sec-fetch-site': site })).status).toBe(422);
    });

    it('is let through with the shop’s own origin, or none at all', async () => {
      expect((await send({ origin: shop.url })).status).toBe(422);
      expect((await send({})).status).toBe(422);
    });
  });

  describe('when it only reads', () => {
    it('may come from anywhere', async () => {
      await shop.visit().get('/api/shop').set('origin', 'https://elsewhere.example').expect(200);
    });
  });
});
