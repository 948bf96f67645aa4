import type { SolveRequestInput } from '../../server/contracts/brief.ts';
import type { Pack, SolveResponse } from '../../server/contracts/packs.ts';
import { demoPassword, type TestShop, type Visit } from './test-shop.ts';

export const clockBrief: SolveRequestInput = {
  target: { value: 1, unit: 'kHz' },
  load: { kind: 'logic' },
};
/** Above 3 Hz, so the flash caution must be acknowledged. */
export const flashBrief: SolveRequestInput = { target: { value: 10, unit: 'Hz' } };

export const address = {
  name: 'Tove Marlin',
  line1: '5 Sandbar Lane',
  city: 'Eelmouth',
  postalCode: 'EM1 4TT',
  country: 'IE',
};

export function checkoutBody(change: Record<string, unknown> = {}) {
  return {
    email: 'tove@marlin.example',
    shippingAddress: address,
    shippingMethod: 'standard',
    acknowledgements: [],
    ...change,
  };
}

export async function signIn(shop: TestShop, who: string): Promise<Visit> {
  const visit = shop.visit();
  const email = `${who}@tockwell.example`;
  await visit.post('/api/auth/sign-in').send({ email, password: demoPassword }).expect(200);
  return visit;
}

export async function solve(visit: Visit, brief: SolveRequestInput): Promise<SolveResponse> {
  return (await visit.post('/api/packs/solve').send(brief).expect(200)).body;
}

/** Solves a brief and puts its first pack into the basket. */
export async function putIn(
  visit: Visit,
  brief: SolveRequestInput = clockBrief,
  quantity = 1,
): Promise<Pack> {
  const { packs } = await solve(visit, { ...brief, quantity });
  const [pack] = packs;
  if (!pack) throw new Error('No pack was found.');
  await visit.post('/api/basket/lines').send({ token: pack.token, quantity }).expect(201);
  return pack;
}

export interface Placed {
  ref: string;
  paymentUrl: string;
  pack: Pack;
}

/** Fills a basket and checks it out. */
export async function placeOrder(
  visit: Visit,
  brief: SolveRequestInput = clockBrief,
  quantity = 1,
): Promise<Placed> {
  const pack = await putIn(visit, brief, quantity);
  const acknowledgements = pack.cautions
    .filter((one) => one.mustAcknowledge)
    .map((one) => one.code);
  const answer = await visit
    .post('/api/checkout')
    .send(checkoutBody({ acknowledgements }))
    .expect(201);
  return { ref: answer.body.orderRef, paymentUrl: answer.body.paymentUrl, pack };
}

/** Fills in the stand-in's card page, as a browser without scripts does. */
export function payByCard(paymentUrl: string, number = '4242 4242 4242 4242'): Promise<Response> {
  const body = new URLSearchParams({ number, expiry: '12/40', code: '123', name: 'Tove Marlin' });
  return fetch(paymentUrl, { method: 'POST', body, redirect: 'manual' });
}

/** An order that is paid and waits for the bench. */
export async function paidOrder(
  shop: TestShop,
  visit: Visit = shop.visit(),
  brief: SolveRequestInput = clockBrief,
  quantity = 1,
): Promise<Placed> {
  const placed = await placeOrder(visit, brief, quantity);
  await payByCard(placed.paymentUrl);
  await shop.work();
  return placed;
}

export async function statusOf(shop: TestShop, ref: string): Promise<string> {
  return (await shop.db('orders').where({ ref }).first('status')).status;
}

/** Takes everything of an order off the bins. */
export async function pickAll(bench: Visit, ref: string): Promise<void> {
  const { body } = await bench.get(`/api/bench/orders/${ref}`).expect(200);
  for (const { id, quantity } of body.picks) {
    await bench.post(`/api/bench/orders/${ref}/picks`).send({ id, quantity }).expect(200);
  }
}

/** What the ledger, the reservations and the lots say, for checking that they agree. */
export async function stockDisagreements(shop: TestShop): Promise<unknown[]> {
  const { rows } = await shop.db.raw(`
    select lots.id, on_hand, reserved,
      (select coalesce(sum(delta), 0) from stock_ledger where lot_id = lots.id) as ledger,
      (select coalesce(sum(quantity), 0) from reservations
        where lot_id = lots.id and state in ('held', 'allocated')) as promised
    from lots`);
  return rows.filter(
    (row: Record<string, number>) => row.on_hand !== row.ledger || row.reserved !== row.promised,
  );
}

/** Pieces promised to an order and still on the shelf. */
export async function promisedTo(shop: TestShop, ref: string): Promise<number> {
  const [row] = await shop
    .db('reservations')
    .join('orders', 'orders.id', 'reservations.order_id')
    .where('orders.ref', ref)
    .whereIn('reservations.state', ['held', 'allocated'])
    .sum({ pieces: 'quantity' });
  return Number(row?.pieces ?? 0);
}
