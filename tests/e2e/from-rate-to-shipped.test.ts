import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openBrowser, type TestBrowser } from '../support/browser.ts';
import { startShop, type RunningShop } from '../support/shop.ts';

/** One kit's way through the house, each role in a browser of its own. The steps build on one another. */

const password = 'merrow-quay-demo';
let shop: RunningShop;
const browsers: TestBrowser[] = [];
let orderRef = '';

async function openPage(viewport = { width: 1280, height: 900 }): Promise<Page> {
  const browser = await openBrowser({ viewport });
  browsers.push(browser);
  return browser.context.newPage();
}

async function signIn(page: Page, email: string): Promise<void> {
  await page.goto(`${shop.url}/sign-in`);
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

beforeAll(async () => {
  shop = await startShop();
});
afterAll(async () => {
  for (const browser of browsers) await browser.close();
  await shop.stop();
});

describe('the maker', () => {
  describe('when they type 90 a minute as a guest', () => {
    let page: Page;
    beforeAll(async () => {
      page = await openPage();
    });

    it('is shown packs from stock and puts the best value in the basket', async () => {
      await page.goto(shop.url);
      await page.getByLabel('Rate', { exact: true }).fill('90');
      await page
        .getByRole('button', { name: /^Put in basket/ })
        .first()
        .click();
      await page.getByText('It is in.').waitFor();
      await page.goto(`${shop.url}/basket`);
      await page
        .getByText(/blinks 90.times a minute/)
        .first()
        .waitFor();
    });

    it('orders, is told of a declined card, pays with a good one, and sees the order paid', async () => {
      await page.goto(`${shop.url}/checkout`);
      await page.getByLabel('E-mail').fill('pim@dorn.example');
      await page.getByLabel('Name', { exact: true }).fill('Pim Dorn');
      await page.getByLabel('Street and number').fill('1 Reed Lane');
      await page.getByLabel('Town').fill('Sandwick');
      await page.getByLabel('Post code').fill('SW1 0AA');
      await page.getByRole('button', { name: 'Order and pay' }).click();
      await page.waitForURL(/\/c\/pay\//);
      expect(await page.getByText(/no money moves/i).count()).toBeGreaterThan(0);
      await payWith(page, '4000 0000 0000 0002');
      await page
        .getByText(/declined/i)
        .first()
        .waitFor();
      await payWith(page, '4242 4242 4242 4242');
      await page.waitForURL(/\/orders\/TQ-\d+\/thanks/);
      orderRef = /TQ-\d+/.exec(page.url())![0];
      await page.getByText(orderRef).first().waitFor();
      await page
        .getByRole('link', { name: /build sheet/i })
        .first()
        .waitFor();
    });

    it('is mailed a confirmation with text and HTML', async () => {
      const mail = await waitForMail('pim@dorn.example', `Your Tockwell order ${orderRef}`);
      expect(mail.text).toContain('Total:');
      expect(mail.html).toContain('Follow the order');
    });

    it('opens a build sheet that says how the parts are marked', async () => {
      await page.getByRole('link', { name: 'Build sheet', exact: true }).first().click();
      await page.waitForURL(/build-sheet/);
      await page.getByRole('heading', { name: 'In this order' }).waitFor();
      expect(await page.getByText(/brown/).count()).toBeGreaterThan(0);
    });
  });
});

async function payWith(page: Page, card: string): Promise<void> {
  await page.getByLabel('Card number').fill(card);
  await page.getByLabel('Expiry').fill('12 / 40');
  await page.getByLabel('Security code').fill('123');
  await page.getByLabel('Name on card').fill('Pim Dorn');
  await page.getByRole('button', { name: /^Pay/ }).click();
}

async function waitForMail(to: string, subject: string) {
  for (let k = 0; k < 100; k += 1) {
    const mail = shop.mail.mails().find((one) => one.to.includes(to) && one.subject === subject);
    if (mail) return mail;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  throw new Error(`No mail "${subject}" to ${to}.`);
}

describe('the packer', () => {
  describe('when they take that order from the queue', () => {
    let page: Page;
    beforeAll(async () => {
      page = await openPage({ width: 1024, height: 768 });
      await signIn(page, 'packer@tockwell.example');
    });

    it('walks the bins; a wrong part is refused with what was expected', async () => {
      await page.goto(`${shop.url}/bench`);
      await page.getByRole('button', { name: `Claim ${orderRef}` }).click();
      await page.getByRole('button', { name: /^Took it/ }).waitFor();
      await page.getByLabel(/^Scan/).fill('Z-99');
      await page.keyboard.press('Enter');
      await page.getByRole('alert').first().waitFor();
      await takeEverything(page);
      await page.getByRole('button', { name: 'Bagged, pack it' }).waitFor();
    });

    it('packs and ships, and the maker is mailed the tracking number', async () => {
      await page.getByRole('button', { name: 'Bagged, pack it' }).click();
      await page.getByLabel('Quay Post').check();
      await page.getByLabel('Tracking number').fill('QP55501');
      await page.getByRole('button', { name: 'Ship it' }).click();
      await page.getByText('QP55501').waitFor();
      const mail = await waitForMail(
        'pim@dorn.example',
        `Your Tockwell order ${orderRef} is on its way`,
      );
      expect(mail.text).toContain('QP55501');
    });
  });
});

/** Presses on until the bag is reached; a walk has at most one stop for each part. */
async function takeEverything(page: Page): Promise<void> {
  const took = page.getByRole('button', { name: /^Took it/ });
  const bag = page.getByRole('button', { name: 'Bagged, pack it' });
  for (let k = 0; k < 20; k += 1) {
    await took.or(bag).waitFor();
    if (await bag.isVisible()) return;
    const bin = await page.locator('h1').first().textContent();
    await took.click();
    await page.waitForFunction(
      (before) => document.querySelector('h1')?.textContent !== before,
      bin,
    );
  }
  throw new Error('The walk did not end.');
}

describe('the owner', () => {
  describe('when they change a price and a count', () => {
    let page: Page;
    let sku = '';
    beforeAll(async () => {
      page = await openPage({ width: 1440, height: 900 });
      await signIn(page, 'owner@tockwell.example');
      sku = (await solve()).packs[0]!.parts.find((part) => part.role === 'C1')!.sku;
    });

    it('finds the part, and the next brief has the new price', async () => {
      const before = (await solve()).packs[0]!;
      await openPart(page, sku);
      await page.getByLabel('New price').fill('9.99');
      await page.getByLabel('Reason').fill('Dearer from the supplier');
      await page.getByRole('button', { name: 'Change the price' }).click();
      await page.getByText(/9\.99/).first().waitFor();
      const opened = await fetch(`${shop.url}/api/packs/${before.token}`);
      const after = (await opened.json()) as { pack: SolvedPack };
      expect(after.pack.price.unit.amount).toBeGreaterThan(before.price.unit.amount + 800);
    });

    it('counts the bin empty, and no brief is offered the part', async () => {
      await openPart(page, sku);
      const buttons = page.getByRole('button', { name: /^Correct the count/ });
      const lots = await buttons.count();
      for (let k = 0; k < lots; k += 1) {
        await buttons.nth(k).click();
        await page.getByLabel('In the bin now').fill('0');
        await page.getByLabel('Note').fill('Drawer found empty');
        await page.getByRole('button', { name: 'Write it into the ledger' }).click();
        await page.getByLabel('In the bin now').waitFor({ state: 'detached' });
      }
      const offered = (await solve()).packs.flatMap((pack) => pack.parts.map((part) => part.sku));
      expect(offered).not.toContain(sku);
    });
  });
});

interface SolvedPack {
  token: string;
  price: { unit: { amount: number } };
  parts: { role: string; sku: string }[];
}

async function solve(): Promise<{ packs: SolvedPack[] }> {
  const answer = await fetch(`${shop.url}/api/packs/solve`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ target: { value: 7.7, unit: 'kHz' }, limit: 20 }),
  });
  return (await answer.json()) as { packs: SolvedPack[] };
}

async function openPart(page: Page, sku: string): Promise<void> {
  await page.goto(`${shop.url}/desk/parts?search=${sku}`);
  await page
    .getByRole('link', { name: new RegExp(sku) })
    .or(page.getByRole('row').filter({ hasText: sku }).getByRole('link'))
    .first()
    .click();
  await page.getByLabel('New price').waitFor();
}
