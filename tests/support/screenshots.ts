import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Page } from 'playwright-core';
import sharp from 'sharp';
import { openBrowser } from './browser.ts';

/** Makes the README's pictures anew from the demonstration shop. */

const base = process.env.BASE_URL;
if (!base) throw new Error('BASE_URL is not set; run `npm run screenshots`.');
const folder = fileURLToPath(new URL('../../assets/screenshots', import.meta.url));
mkdirSync(folder, { recursive: true });

const browser = await openBrowser({
  viewport: { width: 1440, height: 900 },
  reducedMotion: 'reduce',
});
const page = await browser.context.newPage();

async function call(address: string, body?: unknown): Promise<unknown> {
  return page.evaluate(
    async (request) => {
      const answer = await fetch(request.address, {
        method: request.body === undefined ? 'GET' : 'POST',
        headers: { 'content-type': 'application/json' },
        body: request.body === undefined ? null : JSON.stringify(request.body),
      });
      return (await answer.json()) as unknown;
    },
    { address, body },
  );
}

async function signIn(who: string): Promise<void> {
  await call('/api/auth/sign-in', {
    email: `${who}@tockwell.example`,
    password: 'merrow-quay-demo',
  });
}

async function shoot(name: string, address: string, on: Page = page): Promise<void> {
  await on.goto(base + address);
  await on.waitForLoadState('networkidle');
  await on.waitForTimeout(1200);
  const picture = await on.screenshot();
  // A palette keeps the pictures small; the pages have few colours.
  await sharp(picture)
    .png({ palette: true, quality: 92 })
    .toFile(path.join(folder, `${name}.png`));
  console.log(`assets/screenshots/${name}.png`);
}

await shoot('home', '/');
const solved = (await call('/api/packs/solve', {
  target: { value: 90, unit: 'per_minute' },
  supply: { battery: 'TW-CELL-AA-2' },
})) as { packs: { token: string }[] };
await shoot('pack', `/packs/${solved.packs[0]!.token}`);
await signIn('maker');
await shoot('order', '/orders/TQ-1041');
const order = (await call('/api/orders/TQ-1041')) as { lines: { id: string }[] };
await shoot('build-sheet', `/orders/TQ-1041/lines/${order.lines[0]!.id}/build-sheet`);
await signIn('packer');
await call('/api/bench/orders/TQ-1047/claim', {});
await page.emulateMedia({ colorScheme: 'dark', reducedMotion: 'reduce' });
await shoot('bench', '/bench/orders/TQ-1047');
await page.emulateMedia({ colorScheme: 'light', reducedMotion: 'reduce' });
await signIn('owner');
await shoot('desk', '/desk');
await browser.close();
