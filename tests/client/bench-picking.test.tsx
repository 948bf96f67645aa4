import { screen, waitFor } from '@testing-library/react';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { BenchRoutes } from '../../client/features/bench/bench-routes.tsx';
import { shopOptions } from '../../client/lib/shop.ts';
import { sampleOrder, samplePick } from './bench-samples.ts';
import { keepOrder, startAnswering } from './bench-server.ts';
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

async function openBench(answer: Parameters<typeof startAnswering>[0], path = '/orders/TQ-1041') {
  const shop = await startAnswering(answer);
  stop = shop.stop;
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  client.setQueryData(shopOptions.queryKey, sampleShop);
  render(
    <QueryClientProvider client={client}>
      <MemoryRouter initialEntries={[path]}>
        <BenchRoutes />
      </MemoryRouter>
    </QueryClientProvider>,
  );
  return shop.calls;
}

const atBin = (bin: string) => screen.findByRole('heading', { level: 1, name: new RegExp(bin) });
const picksIn = (calls: readonly { path: string; body: unknown }[]) =>
  calls.filter((call) => call.path.endsWith('/picks')).map((call) => call.body);

describe('picking an order', () => {
  describe('when the right bin is scanned', () => {
    it('puts the pieces into the tray and shows the next bin', async () => {
      const kept = keepOrder(sampleOrder());
      const calls = await openBench(kept.answer);
      await atBin('A-01');
      await userEvent.type(screen.getByLabelText('Scan A-01 or the part'), 'a01{Enter}');
      await atBin('D-64');
      await waitFor(() => expect(picksIn(calls)).toEqual([{ id: '1', quantity: 2 }]));
    });

    it('catches the scanner though the focus lies on a button', async () => {
      await openBench(keepOrder(sampleOrder()).answer);
      await atBin('A-01');
      screen.getByRole('button', { name: 'Took it, next stop' }).focus();
      await userEvent.keyboard('TW-BT1{Enter}');
      await atBin('D-64');
    });
  });

  describe('when a wrong bin is scanned', () => {
    it('refuses it, says what is expected, and takes nothing', async () => {
      const calls = await openBench(keepOrder(sampleOrder()).answer);
      await atBin('A-01');
      await userEvent.type(screen.getByLabelText('Scan A-01 or the part'), 'J-08{Enter}');
      expect((await screen.findByRole('alert')).textContent).toContain(
        'J-08 is stop 3 of this walk. This stop wants bin A-01 or TW-BT1.',
      );
      expect(picksIn(calls)).toEqual([]);
    });
  });

  describe('when the last stop was a mistake', () => {
    it('takes it back and shows it again', async () => {
      const kept = keepOrder(sampleOrder());
      await openBench(kept.answer);
      await atBin('A-01');
      await userEvent.click(screen.getByRole('button', { name: 'Took it, next stop' }));
      await userEvent.click(await screen.findByRole('button', { name: 'Undo A-01' }));
      await atBin('A-01');
      await waitFor(() => expect(kept.order().picks[0]?.picked).toBe(0));
    });
  });

  describe('when the connection drops', () => {
    it('goes on, keeps the stop, and sends it again by itself', async () => {
      const kept = keepOrder(sampleOrder());
      let drops = 1;
      const calls = await openBench((call) => {
        if (call.path.endsWith('/picks') && drops > 0) {
          drops -= 1;
          return 'hang up';
        }
        return kept.answer(call);
      });
      await atBin('A-01');
      await userEvent.click(screen.getByRole('button', { name: 'Took it, next stop' }));
      await atBin('D-64');
      await screen.findByText('The connection is down');
      await waitFor(() => expect(kept.order().picks[0]?.picked).toBe(2), { timeout: 8000 });
      expect(picksIn(calls)).toHaveLength(2);
    });
  });

  describe('when everything is in the tray', () => {
    it('packs, then ships under one key, and ends at the queue', async () => {
      const order = sampleOrder({ picks: [samplePick({ id: '1', picked: 2 })] });
      const calls = await openBench(keepOrder(order).answer);
      await userEvent.click(await screen.findByRole('button', { name: 'Bagged, pack it' }));
      await userEvent.click(await screen.findByRole('button', { name: 'Ship it' }));
      await screen.findByText('The tracking number is missing.');
      await userEvent.type(screen.getByLabelText('Tracking number'), 'QP 7731');
      await userEvent.click(screen.getByRole('button', { name: 'Ship it' }));
      await screen.findByRole('link', { name: 'Back to the queue' });
      const shipped = calls.filter((call) => call.path.endsWith('/ship'));
      expect(shipped.map((call) => call.body)).toEqual([
        { carrier: 'Quay Post', tracking: 'QP 7731' },
      ]);
      expect(shipped[0]?.key).toMatch(/^[0-9a-f-]{32,36}$/);
    });
  });
});

describe('the queue', () => {
  const item = {
    ref: 'TQ-1041',
    status: 'paid',
    shipBy: '2020-01-01T16:00:00.000Z',
    late: true,
    kits: 2,
    stops: 10,
    sentence: 'A red LED blinks 90 times a minute',
    shippingMethod: 'Letter',
    claimedBy: null,
    mine: false,
  };

  describe('when somebody else was quicker', () => {
    it('says who has the order, above the list, and still after the queue is read again', async () => {
      const taken = 'Maud Tarrow has TQ-1041. Take another from the queue.';
      let claimed = false;
      await openBench(({ path }) => {
        if (!path.endsWith('/claim')) {
          const theirs = { ...item, status: 'picking', claimedBy: 'Maud Tarrow' };
          const items = [claimed ? theirs : item];
          return { status: 200, body: { items, page: 1, pageSize: 25, total: 1 } };
        }
        claimed = true;
        const type = 'https://tockwell.example/problems/already-claimed';
        return { status: 409, body: { type, title: 'Taken', status: 409, detail: taken } };
      }, '/');
      await userEvent.click(await screen.findByRole('button', { name: 'Claim TQ-1041' }));
      await screen.findByText('is picking it');
      expect(screen.getByRole('alert').textContent).toBe(taken);
    });
  });

  it('says in words that an order is late', async () => {
    const body = { items: [item], page: 1, pageSize: 25, total: 1 };
    await openBench(() => ({ status: 200, body }), '/');
    expect((await screen.findByRole('heading', { level: 1 })).textContent).toContain('one is late');
    expect(screen.getByText(/late by/)).toBeTruthy();
  });
});
