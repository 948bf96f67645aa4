import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { accessibilityFaults } from '../support/accessibility.ts';
import { openBrowser, type TestBrowser } from '../support/browser.ts';
import { startShop, type RunningShop } from '../support/shop.ts';

/** Every page, with the demonstration shop's real content, in both themes: what axe can tell of WCAG 2.2 AA. */

let shop: RunningShop;
let browser: TestBrowser;
let page: Page;
let addresses: Record<'guest' | 'maker' | 'packer' | 'owner', string[]>;

beforeAll(async () => {
  shop = await startShop();
  browser = await openBrowser();
  page = await browser.context.newPage();
  addresses = await everyPage();
});
afterAll(async () => {
  await browser.close();
  await shop.stop();
});

interface OrderPage {
  lines: { id: string }[];
}

async function everyPage() {
  await signIn('maker');
  const pack = await solvedPack();
  await call('POST', '/api/basket/lines', { token: pack, quantity: 1 });
  const order = (await call('GET', '/api/orders/TQ-1041')) as OrderPage;
  await signIn('owner');
  const parts = (await call('GET', '/api/desk/parts?pageSize=1')) as { items: { id: string }[] };
  return {
    guest: [
      '/',
      `/packs/${pack}`,
      '/basket',
      '/sign-in',
      '/sign-up',
      '/help',
      '/terms',
      '/privacy',
      '/nowhere',
    ],
    maker: [
      '/basket',
      '/checkout',
      '/orders',
      '/orders/TQ-1041',
      '/orders/TQ-1041/thanks',
      `/orders/TQ-1041/lines/${order.lines[0]!.id}/build-sheet`,
      '/account',
    ],
    packer: ['/bench', '/bench/orders/TQ-1047', '/bench/orders/TQ-1048', '/bench/orders/TQ-1041'],
    owner: [
      '/desk',
      '/desk/parts',
      `/desk/parts/${parts.items[0]!.id}`,
      '/desk/orders',
      '/desk/orders/TQ-1044',
      '/desk/audit',
    ],
  };
}

/** Calls the shop from inside the page, with its cookies. */
async function call(method: string, path: string, body?: unknown): Promise<unknown> {
  if (!page.url().startsWith(shop.url)) await page.goto(shop.url);
  return page.evaluate(
    async (request) => {
      const answer = await fetch(request.path, {
        method: request.method,
        headers: request.body === undefined ? {} : { 'content-type': 'application/json' },
        body: request.body === undefined ? null : JSON.stringify(request.body),
      });
      return answer.status === 204 ? null : ((await answer.json()) as unknown);
    },
    { method, path, body },
  );
}

async function signIn(who: string): Promise<void> {
  await call('POST', '/api/auth/sign-in', {
    email: `${who}@tockwell.example`,
    password: 'merrow-quay-demo',
  });
}

async function solvedPack(): Promise<string> {
  const target = { value: 240, unit: 'per_minute' };
  const solved = (await call('POST', '/api/packs/solve', { target })) as {
    packs: { token: string }[];
  };
  return solved.packs[0]!.token;
}

async function faultsAt(path: string, scheme: 'light' | 'dark'): Promise<string[]> {
  await page.emulateMedia({ colorScheme: scheme, reducedMotion: 'reduce' });
  await page.goto(shop.url + path);
  await page.locator('h1').first().waitFor();
  await page.waitForLoadState('networkidle');
  return (await accessibilityFaults(page)).map((fault) => `${scheme} ${path} ${fault}`);
}

describe('the pages', () => {
  describe.each(['light', 'dark'] as const)('when the theme is %s', (scheme) => {
    it.each(['guest', 'maker', 'packer', 'owner'] as const)(
      'have no fault that axe can tell for the %s',
      async (who) => {
        if (who === 'guest') await call('POST', '/api/auth/sign-out');
        else await signIn(who);
        const faults: string[] = [];
        for (const path of addresses[who]) faults.push(...(await faultsAt(path, scheme)));
        expect(faults).toEqual([]);
      },
    );
  });
});

describe('the home page', () => {
  describe('when the window is a phone of 320 pixels', () => {
    it('never scrolls sideways', async () => {
      await call('POST', '/api/auth/sign-out');
      await page.setViewportSize({ width: 320, height: 700 });
      await page.goto(shop.url);
      await page
        .getByRole('button', { name: /^Put in basket/ })
        .first()
        .waitFor();
      const wide = await page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      );
      expect(wide).toBeLessThanOrEqual(0);
    });
  });
});
