import { AxeBuilder } from '@axe-core/playwright';
import nodemailer from 'nodemailer';
import type { BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createMailStandIn } from '../../server/mail-stand-in/mail-stand-in.ts';
import { openBrowser, type TestBrowser } from '../support/browser.ts';
import { checkout, openMockShop, type MockShop } from '../stripe-mock/mock-shop.ts';

/** Accessibility rules of WCAG 2.2 A and AA that axe can tell. */
async function faultsOf(page: Page): Promise<string[]> {
  const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
  const { violations } = await new AxeBuilder({ page }).withTags(tags).analyze();
  return violations.map((violation) => `${violation.id}: ${violation.nodes[0]?.html}`);
}

const mail = createMailStandIn();
let shop: MockShop;
let browser: TestBrowser;
let context: BrowserContext;
beforeAll(async () => {
  shop = await openMockShop();
  browser = await openBrowser();
  context = browser.context;
});
afterAll(async () => {
  await browser.close();
  await shop.close();
});

async function openCardPage(): Promise<{ page: Page; sessionId: string }> {
  const success = `${shop.address}/health?session={CHECKOUT_SESSION_ID}`;
  const { id, url } = await shop.stripe.checkout.sessions.create(
    checkout({ success_url: success, cancel_url: `${shop.address}/health` }),
  );
  const page = await context.newPage();
  await page.goto(url ?? '');
  return { page, sessionId: id };
}

async function fillIn(page: Page, number: string): Promise<void> {
  await page.getByLabel('Card number', { exact: true }).fill(number);
  await page.getByLabel('Expiry', { exact: true }).fill('09/39');
  await page.getByLabel('Security code', { exact: true }).fill('123');
  await page.getByLabel('Name on card', { exact: true }).fill('Ada Maker');
  await page.getByRole('button', { name: /^Pay/ }).click();
}

describe('the card page in a browser', () => {
  describe('when a declined card is followed by a good one', () => {
    it('says no, then yes, and ends at the shop', async () => {
      const { page, sessionId } = await openCardPage();
      await fillIn(page, '4000 0000 0000 0002');
      await expect.poll(() => page.getByRole('alert').textContent()).toContain('was declined');
      await fillIn(page, '4242 4242 4242 4242');
      await page.waitForURL(`${shop.address}/health?session=${sessionId}`);
    });
  });

  describe('when a field is wrong', () => {
    it('puts the cursor there and describes the fault', async () => {
      const { page } = await openCardPage();
      await fillIn(page, '4242 4242 4242 4241');
      const number = page.getByLabel('Card number', { exact: true });
      await expect.poll(() => number.getAttribute('aria-invalid')).toBe('true');
      expect(await number.evaluate((field) => field === document.activeElement)).toBe(true);
      expect(await faultsOf(page)).toEqual([]);
    });
  });

  describe.each(['light', 'dark'] as const)('when the system is %s', (colorScheme) => {
    it('has no accessibility fault, wide or on a phone', async () => {
      const { page } = await openCardPage();
      await page.emulateMedia({ colorScheme });
      expect(await faultsOf(page)).toEqual([]);
      await page.setViewportSize({ width: 320, height: 640 });
      expect(await faultsOf(page)).toEqual([]);
      const overflow = () => document.documentElement.scrollWidth - window.innerWidth;
      expect(await page.evaluate(overflow)).toBeLessThanOrEqual(0);
    });
  });
});

describe('the caught mail in a browser', () => {
  let addresses: { smtpUrl: string; pageUrl: string };
  beforeAll(async () => {
    addresses = await mail.listen();
    const transport = nodemailer.createTransport(addresses.smtpUrl);
    const html = '<h1>Thank you</h1><script>document.title = "ran"</script>';
    const sent = { from: 'shop@tockwell.example', to: 'ada@maker.example', text: 'Thank you' };
    await transport.sendMail({ ...sent, subject: 'Order TW-1001', html });
    transport.close();
  });
  afterAll(() => mail.close());

  describe('when a mail is opened', () => {
    it('shows its page without running its scripts', async () => {
      const page = await context.newPage();
      await page.goto(addresses.pageUrl);
      expect(await faultsOf(page)).toEqual([]);
      await page.getByRole('link', { name: 'Order TW-1001' }).click();
      const letter = page.frameLocator('iframe');
      await letter.getByRole('heading', { name: 'Thank you' }).waitFor();
      expect(await page.title()).toBe('Order TW-1001 – caught mail');
      expect(await faultsOf(page)).toEqual([]);
    });
  });
});
