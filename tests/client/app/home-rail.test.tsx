import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen } from '@testing-library/react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { HomeRail } from '../../../client/app/home-rail.tsx';
import { useSolvedPacks } from '../../../client/features/packs/api/solve-packs.ts';
import type { SolveResponse } from '../../../server/contracts/packs.ts';
import { startAnswering } from '../bench-server.ts';
import { stubMedia } from '../support/render.tsx';
import { samplePack } from '../support/sample-pack.ts';

const answer: SolveResponse = {
  brief: {
    target: { value: 90, unit: 'per_minute' },
    targetHz: 1.5,
    duty: 0.5,
    supply: { volts: 3, minVolts: 2, maxVolts: 3.2, batterySku: null, label: '3 V' },
    load: { kind: 'logic' },
    band: 0.05,
    ambient: { minCelsius: 0, maxCelsius: 40 },
    mounting: 'through-hole',
    careLevel: 'as-stocked',
    quantity: 1,
    sentence: 'A logic clock at 90 a minute',
  },
  packs: [samplePack('one', 0.04, 485)],
  considered: 1200,
  elapsedMs: 3,
  advice: [],
};

let stop: (() => Promise<void>) | undefined;
beforeEach(() => stubMedia(true));
afterEach(async () => {
  cleanup();
  await stop?.();
});

function Harness({ rate, refused = false }: { rate: number; refused?: boolean }) {
  const solved = useSolvedPacks({ target: { value: rate, unit: 'per_minute' } });
  return <HomeRail solved={solved} asking refused={refused} onAdvice={() => undefined} />;
}

async function openRail(said: (rate: number) => SolveResponse | 'hang up') {
  const shop = await startAnswering(({ body }) => {
    const { target } = body as { target: { value: number } };
    const reply = said(target.value);
    return reply === 'hang up' ? reply : { status: 200, body: reply };
  });
  stop = shop.stop;
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const page = (rate: number, refused = false) => (
    <QueryClientProvider client={client}>
      <MemoryRouter>
        <Harness rate={rate} refused={refused} />
      </MemoryRouter>
    </QueryClientProvider>
  );
  const { rerender } = render(page(90));
  return (rate: number, refused?: boolean) => rerender(page(rate, refused));
}

const buyButton = () => screen.findByRole<HTMLButtonElement>('button', { name: /Put in basket/ });

describe('the rail', () => {
  describe('when the connection drops under a new brief', () => {
    it('says whose packs these are, sells none of them, and offers to try again', async () => {
      const ask = await openRail((rate) => (rate === 90 ? answer : 'hang up'));
      expect((await buyButton()).disabled).toBe(false);
      ask(120);
      const alert = await screen.findByRole('alert');
      expect(alert.textContent).toContain('these are the packs for the brief before');
      expect((await buyButton()).disabled).toBe(true);
      expect(screen.getByRole('button', { name: 'Try again' })).toBeTruthy();
    });
  });

  describe('when the brief needs a change', () => {
    it('keeps the packs of the brief before, but sells none of them', async () => {
      const ask = await openRail(() => answer);
      await buyButton();
      ask(90, true);
      expect((await buyButton()).disabled).toBe(true);
      expect(screen.getByText(/made for the brief before/)).toBeTruthy();
    });
  });

  describe('when nothing fits', () => {
    it('counts no combinations above the refusal', async () => {
      await openRail(() => ({ ...answer, packs: [], considered: 0 }));
      await screen.findByText('No pack on the shelves fits this brief.');
      expect(screen.queryByText(/combinations/)).toBeNull();
    });
  });
});
