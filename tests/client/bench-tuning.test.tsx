import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { BenchRoutes } from '../../client/features/bench/bench-routes.tsx';
import { shopOptions } from '../../client/lib/shop.ts';
import { sampleTuned, sampleTunedOrder, samplePick } from './bench-samples.ts';
import { startAnswering, type Call } from './bench-server.ts';
import { sampleShop } from './support/render.tsx';

let stop: (() => Promise<void>) | undefined;
afterEach(async () => {
  await stop?.();
  stop = undefined;
});
beforeEach(() => {
  Element.prototype.scrollTo = () => undefined;
  window.scrollTo = () => undefined;
});

const picks = [
  samplePick({ id: '1', sku: 'TW-CP-820N', kind: 'capacitor', roles: ['C1'], picked: 2 }),
  samplePick({ id: '2', quantity: 2 }),
];

/** A shop with an order of two kits: any reading gets the sample's R4, "3n" is refused. */
async function openMeter() {
  let order = sampleTunedOrder([null, null], { picks });
  const answer = ({ path, body }: Call) => {
    if (path.endsWith('/picks')) {
      const { id, quantity } = body as { id: string; quantity: number };
      const ticked = order.picks.map((each) =>
        each.id === id ? { ...each, picked: quantity } : each,
      );
      order = { ...order, picks: ticked };
    }
    if (!path.endsWith('/readings')) return { status: 200, body: order };
    const { lineId, unit, reading } = body as { lineId: string; unit: number; reading: string };
    if (reading === '3n') {
      const type = 'https://tockwell.example/problems/implausible-reading';
      const detail = 'C1 should be 820 nF; this one reads 3 nF. Take another one.';
      return { status: 422, body: { type, title: 'Not this part', status: 422, detail } };
    }
    const tuned = sampleTuned({ unit, reading });
    const before = order.lines[0]!.tuning!.units;
    const kits = before.map((kit) => (kit.unit === unit ? tuned : kit));
    const known = kits.map((kit) => (kit.farads === null ? null : kit));
    order = sampleTunedOrder(known, { picks: order.picks });
    return { status: 200, body: { ...tuned, lineId, putBack: [], order } };
  };
  const shop = await startAnswering(answer);
  stop = shop.stop;
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  client.setQueryData(shopOptions.queryKey, sampleShop);
  render(
    <QueryClientProvider client={client}>
      <MemoryRouter initialEntries={['/orders/TQ-1041']}>
        <BenchRoutes />
      </MemoryRouter>
    </QueryClientProvider>,
  );
  await screen.findByLabelText('Reading of C1, kit 1 of 2');
  return { calls: shop.calls, order: () => order };
}

const enter = (text: string) => userEvent.keyboard(`${text}{Enter}`);

describe('tuning the kits of an order', () => {
  describe('when the capacitors are in the tray', () => {
    it('takes a reading wherever the focus is, and shows bin, R4 and what was promised', async () => {
      const { calls } = await openMeter();
      await userEvent.click(document.body);
      await enter('818.2n');
      await screen.findByRole('heading', { level: 1, name: /Kit 1 reads 818.2n/ });
      expect(screen.getByText('D-64', { selector: 'p' })).toBeTruthy();
      expect(screen.getByText(/R4 453/, { selector: 'p' })).toBeTruthy();
      expect(screen.getByText('The promise was')).toBeTruthy();
      const [sent] = calls.filter(({ path }) => path.endsWith('/readings'));
      expect(sent?.body).toMatchObject({ unit: 1, reading: '818.2n' });
      expect(sent?.key).toMatch(/^[0-9a-f-]{32,36}$/);
    });

    it('goes from kit to kit, puts each R4 into the tray, and ends at the bag with what belongs together', async () => {
      const { order } = await openMeter();
      await enter('818.2n');
      await userEvent.click(await screen.findByRole('button', { name: 'Took it, next kit' }));
      await screen.findByLabelText('Reading of C1, kit 2 of 2');
      await enter('831n');
      const last = { name: 'Took it, that was the last' };
      await userEvent.click(await screen.findByRole('button', last));
      const kits = await screen.findByRole('list', { name: 'What belongs together' });
      expect(
        within(kits)
          .getAllByRole('listitem')
          .map(({ textContent }) => textContent),
      ).toEqual([
        expect.stringMatching(/^Kit 1: C1 818.2n, R4 453/),
        expect.stringMatching(/^Kit 2: C1 831n, R4 453/),
      ]);
      await waitFor(() => expect(order().picks[1]?.picked).toBe(2));
    });
  });

  describe('when the reading cannot be this capacitor’s', () => {
    it('says so beside the field and waits for another', async () => {
      await openMeter();
      await enter('3n');
      expect((await screen.findByRole('alert')).textContent).toContain('Take another one.');
      await userEvent.clear(screen.getByLabelText('Reading of C1, kit 1 of 2'));
      await enter('818.2n');
      await screen.findByRole('button', { name: 'Took it, next kit' });
    });
  });

  describe('when a tuned kit gets another capacitor', () => {
    it('is measured again', async () => {
      const { calls } = await openMeter();
      await enter('818.2n');
      await userEvent.click(await screen.findByRole('button', { name: 'Took it, next kit' }));
      await userEvent.click(screen.getByRole('button', { name: 'Measure kit 1 again' }));
      await screen.findByLabelText('Reading of C1, kit 1 of 2');
      await enter('840n');
      await screen.findByRole('heading', { level: 1, name: /Kit 1 reads 840n/ });
      const sent = calls.filter(({ path }) => path.endsWith('/readings')).map(({ body }) => body);
      expect(sent).toMatchObject([
        { unit: 1, reading: '818.2n' },
        { unit: 1, reading: '840n' },
      ]);
    });
  });
});
