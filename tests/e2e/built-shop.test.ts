import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startShop, type RunningShop } from '../support/shop.ts';

let shop: RunningShop;
beforeAll(async () => {
  shop = await startShop();
});
afterAll(() => shop.stop());

describe('the built shop', () => {
  describe('when it has started', () => {
    it('is alive and ready', async () => {
      const health = await fetch(`${shop.url}/api/health`);
      expect([health.status, await health.json()]).toEqual([200, { status: 'ok' }]);
      expect((await fetch(`${shop.url}/api/ready`)).status).toBe(200);
    });

    it('serves the client at any of its pages, and its files by name', async () => {
      for (const place of ['/', '/basket', '/no/such/page']) {
        const answer = await fetch(shop.url + place, { headers: { accept: 'text/html' } });
        expect(answer.headers.get('content-type')).toContain('text/html');
        expect(await answer.text()).toContain('<div id="root">');
      }
      expect((await fetch(`${shop.url}/theme.js`)).headers.get('content-type')).toContain(
        'javascript',
      );
    });

    it('has the demonstration shelves', async () => {
      const answer = await fetch(`${shop.url}/api/parts?kind=capacitor`);
      const { total } = (await answer.json()) as { total: number };
      expect(total).toBeGreaterThan(10);
    });
  });
});
