import jwt from 'jsonwebtoken';
import type { Response } from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { meSchema } from '../../server/contracts/auth.ts';
import { noteSignInFailure } from '../../server/store/people.ts';
import { demoPassword, openTestShop, sessionSecret, type TestShop } from '../support/test-shop.ts';
import { clockBrief, putIn, signIn, solve } from '../support/shopping.ts';

let shop: TestShop;
let people = 0;
beforeAll(async () => {
  shop = await openTestShop();
});
afterAll(() => shop.close());

const password = 'four words in a row';

/** Makes a new account; its browser, its address and the cookies as they were set. */
async function newcomer() {
  const visit = shop.visit();
  const email = `newcomer-${(people += 1)}@eelmouth.example`;
  const answer = await visit
    .post('/api/auth/sign-up')
    .send({ email, password, name: 'Newcomer' })
    .expect(201);
  return { visit, email, me: answer.body, cookies: cookiesOf(answer) };
}

function cookiesOf(answer: Response): Record<string, string> {
  const set = answer.get('Set-Cookie') ?? [];
  return Object.fromEntries(
    set.map((line) => {
      const [pair = ''] = line.split(';');
      const at = pair.indexOf('=');
      return [pair.slice(0, at).replace('tockwell_', ''), pair.slice(at + 1)];
    }),
  );
}

/** Asks who is signed in, with nothing but the given renewal secret. */
const renew = (secret: string) =>
  shop.visit().get('/api/auth/me').set('cookie', `tockwell_renewal=${secret}`);

describe('sign-up', () => {
  it('makes a customer, signs them in and answers with who they are', async () => {
    const { visit, email, me } = await newcomer();
    expect(meSchema.parse(me)).toMatchObject({ email, role: 'customer', name: 'Newcomer' });
    expect((await visit.get('/api/auth/me')).body).toEqual(me);
  });

  it('takes no role from the request', async () => {
    const body = { email: 'sly@eelmouth.example', password, name: 'Sly', role: 'owner' };
    const answer = await shop.visit().post('/api/auth/sign-up').send(body).expect(201);
    expect(answer.body.role).toBe('customer');
  });

  it('keeps one account for an address in any spelling of its letters', async () => {
    const { email } = await newcomer();
    const again = { email: email.toUpperCase(), password, name: 'Again' };
    const answer = await shop.visit().post('/api/auth/sign-up').send(again);
    expect(answer.status).toBe(422);
    expect(answer.body.errors[0].path).toBe('email');
  });

  it.each([
    ['14 characters', 'fourteen chars', 422],
    ['15 characters', 'fifteen chars!!', 201],
    ['one character 15 times', 'aaaaaaaaaaaaaaa', 422],
    ['64 characters with blanks, ß and emoji', `${'groß ⏱️ und '.repeat(5)}wach`, 201],
    ['15 emoji', '⏰🔋💡🔧🪛📦🧲🪫🔌⚙🧰📐📏🔩🕯', 201],
    ['the name of the shop twice over', 'tockwelltockwell', 422],
  ])('answers a password of %s with %s', async (_, chosen, status) => {
    const body = { email: `p${(people += 1)}@eelmouth.example`, password: chosen, name: 'Chooser' };
    const answer = await shop.visit().post('/api/auth/sign-up').send(body);
    expect(answer.status).toBe(status);
    if (status === 422) expect(answer.body.errors[0].path).toBe('password');
  });

  it('lets every character of a long password count', async () => {
    const long = `${'a long sentence, '.repeat(6)}`;
    const email = `p${(people += 1)}@eelmouth.example`;
    const body = { email, password: `${long}1`, name: 'Long' };
    await shop.visit().post('/api/auth/sign-up').send(body).expect(201);
    const wrong = { email, password: `${long}2` };
    expect((await shop.visit().post('/api/auth/sign-in').send(wrong)).status).toBe(401);
    const right = { email, password: `${long}1` };
    expect((await shop.visit().post('/api/auth/sign-in').send(right)).status).toBe(200);
  });
});

describe('sign-in', () => {
  it('sets cookies that scripts cannot read and other sites do not get', async () => {
    const visit = shop.visit();
    const body = { email: 'maker@tockwell.example', password: demoPassword };
    const answer = await visit.post('/api/auth/sign-in').send(body).expect(200);
    const set = answer.get('Set-Cookie');
    expect(set).toHaveLength(2);
    for (const line of set ?? []) expect(line).toMatch(/HttpOnly.*SameSite=Lax/);
    expect(JSON.stringify(answer.body)).not.toMatch(/password|hash/i);
  });

  it('answers a wrong password and an unknown address in the same words', async () => {
    const { email } = await newcomer();
    const tries = [email, 'nobody@eelmouth.example'].map((who) =>
      shop.visit().post('/api/auth/sign-in').send({ email: who, password: 'not the password' }),
    );
    const [known, unknown] = await Promise.all(tries);
    expect(known!.status).toBe(401);
    expect(unknown!.status).toBe(401);
    expect(known!.text).toBe(unknown!.text);
  });

  it('makes an account wait after thirty failures, whoever tries, and lets it in later', async () => {
    const { email } = await newcomer();
    const at = shop.clock.now();
    for (let k = 0; k < 29; k += 1) {
      await noteSignInFailure(shop.db, { email, address: `10.0.0.${k}`, at });
    }
    const wrong = { email, password: 'not the password' };
    expect((await shop.visit().post('/api/auth/sign-in').send(wrong)).status).toBe(401);
    const right = { email, password };
    const refused = await shop.visit().post('/api/auth/sign-in').send(right);
    expect(refused.status).toBe(429);
    expect(refused.type).toBe('application/problem+json');
    shop.clock.pass(16);
    expect((await shop.visit().post('/api/auth/sign-in').send(right)).status).toBe(200);
  });

  it('takes the guest’s basket over, and adds to what the account had', async () => {
    const { email, visit } = await newcomer();
    const { packs } = await solve(visit, { ...clockBrief, quantity: 5 });
    const [pack] = packs;
    await visit.post('/api/basket/lines').send({ token: pack!.token }).expect(201);
    const guest = shop.visit();
    await guest.post('/api/basket/lines').send({ token: pack!.token, quantity: 2 }).expect(201);
    await putIn(guest, { target: { value: 2, unit: 's' }, load: { kind: 'logic' } });
    await guest.post('/api/auth/sign-in').send({ email, password }).expect(200);
    const { lines, kits } = (await guest.get('/api/basket')).body;
    expect(lines.map((line: { quantity: number }) => line.quantity)).toEqual([3, 1]);
    expect(kits).toBe(4);
    await guest.post('/api/auth/sign-out').expect(204);
    expect((await guest.get('/api/basket')).body.lines).toEqual([]);
  });
});

describe('a session', () => {
  it('ends at once when it is signed out, wherever its token is', async () => {
    const { visit, cookies } = await newcomer();
    await visit.post('/api/auth/sign-out').expect(204);
    const stolen = shop
      .visit()
      .get('/api/auth/me')
      .set('cookie', `tockwell_session=${cookies.session}`);
    expect((await stolen).status).toBe(401);
    expect((await renew(cookies.renewal!)).status).toBe(401);
  });

  it('ends at once when its account is closed', async () => {
    const { visit, email } = await newcomer();
    await visit.get('/api/auth/me').expect(200);
    await shop.db('users').where({ email }).update({ deactivated_at: new Date() });
    expect((await visit.get('/api/auth/me')).status).toBe(401);
  });

  it('changes its role with the account’s, without a new sign-in', async () => {
    const { visit, email } = await newcomer();
    expect((await visit.get('/api/bench/queue')).status).toBe(403);
    await shop.db('users').where({ email }).update({ role: 'packer' });
    expect((await visit.get('/api/bench/queue')).status).toBe(200);
  });

  it.each([
    ['signed with another secret', (sid: string) => jwt.sign({ sid }, 'another-secret-entirely')],
    ['unsigned', (sid: string) => jwt.sign({ sid }, '', { algorithm: 'none' })],
    ['run out', (sid: string) => jwt.sign({ sid }, sessionSecret, { expiresIn: -1 })],
    [
      'of another algorithm',
      (sid: string) => jwt.sign({ sid }, sessionSecret, { algorithm: 'HS512' }),
    ],
    ['broken', () => 'not.a.token'],
  ])('is not opened by a token that is %s', async (_, forge) => {
    const { cookies } = await newcomer();
    const { sid } = jwt.decode(cookies.session!) as { sid: string };
    const request = shop.visit().get('/api/auth/me');
    const answer = await request.set('cookie', `tockwell_session=${forge(sid)}`);
    expect(answer.status).toBe(401);
  });

  it('is renewed by its secret, which changes each time', async () => {
    const { cookies, me } = await newcomer();
    const renewed = await renew(cookies.renewal!);
    expect(renewed.body).toEqual(me);
    const next = cookiesOf(renewed);
    expect(next.session).toBeTruthy();
    expect(next.renewal).not.toBe(cookies.renewal);
    expect((await renew(next.renewal!)).status).toBe(200);
  });

  it('still takes the secret before within a minute, for requests sent together', async () => {
    const { cookies } = await newcomer();
    await renew(cookies.renewal!);
    const together = await renew(cookies.renewal!);
    expect(together.status).toBe(200);
    expect(cookiesOf(together).renewal).toBeUndefined();
  });

  it('is ended for everybody when an old secret turns up after a minute', async () => {
    const { cookies } = await newcomer();
    const next = cookiesOf(await renew(cookies.renewal!));
    shop.clock.pass(1.1);
    expect((await renew(cookies.renewal!)).status).toBe(401);
    expect((await renew(next.renewal!)).status).toBe(401);
    const request = shop.visit().get('/api/auth/me');
    expect((await request.set('cookie', `tockwell_session=${next.session}`)).status).toBe(401);
  });

  it('ends after a day for staff and after thirty for customers', async () => {
    const { cookies } = await newcomer();
    const visit = shop.visit();
    const body = { email: 'owner@tockwell.example', password: demoPassword };
    const owner = cookiesOf(await visit.post('/api/auth/sign-in').send(body));
    shop.clock.pass(24 * 60 + 1);
    expect((await renew(owner.renewal!)).status).toBe(401);
    const later = await renew(cookies.renewal!);
    expect(later.status).toBe(200);
    shop.clock.pass(30 * 24 * 60);
    expect((await renew(cookiesOf(later).renewal!)).status).toBe(401);
  });
});

describe('a page of somebody signed in', () => {
  it('is kept by no cache', async () => {
    const maker = await signIn(shop, 'maker');
    expect((await maker.get('/api/auth/me')).headers['cache-control']).toBe('no-store');
  });
});
