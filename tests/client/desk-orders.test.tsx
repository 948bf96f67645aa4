import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DeskRoutes } from '../../client/features/desk/desk-routes.tsx';
import { deskOrderSchema, type DeskOrder } from '../../server/contracts/desk.ts';
import { startAnswering } from './bench-server.ts';
import { openDialogs } from './support/dialog.ts';
import './support/render.tsx';

beforeEach(openDialogs);

let stop: (() => Promise<void>) | undefined;
afterEach(async () => {
  await stop?.();
  stop = undefined;
});

const euros = (amount: number) => ({ amount, currency: 'EUR' });

function sampleDeskOrder(changes: Partial<DeskOrder> = {}): DeskOrder {
  return deskOrderSchema.parse({
    ref: 'TQ-1043',
    status: 'paid',
    email: 'jory@proto.example',
    placedAt: '2026-12-01T13:31:00.000Z',
    reservedUntil: null,
    shipBy: '2026-12-01T16:00:00.000Z',
    shippingAddress: { name: 'Jory Venn', line1: 'Unit 7', city: 'Marlock', country: 'FR' },
    shippingMethod: { code: 'standard', name: 'Letter' },
    lines: [],
    goods: euros(8000),
    shipping: euros(364),
    tax: euros(1394),
    total: euros(8364),
    refunded: euros(0),
    paymentUrl: null,
    shipment: null,
    events: [],
    payments: [],
    refundable: euros(8364),
    stockNote: 'A refund puts the parts back on the shelf.',
    ...changes,
  });
}

async function openOrder() {
  let order = sampleDeskOrder();
  const shop = await startAnswering(({ method }) => {
    if (method === 'POST') {
      order = sampleDeskOrder({ status: 'refunded', refundable: euros(0), refunded: euros(8364) });
    }
    return { status: 200, body: order };
  });
  stop = shop.stop;
  render(
    <QueryClientProvider client={new QueryClient()}>
      <MemoryRouter initialEntries={['/orders/TQ-1043']}>
        <DeskRoutes />
      </MemoryRouter>
    </QueryClientProvider>,
  );
  await userEvent.click(await screen.findByRole('button', { name: /^Refund/ }));
  const confirm = await screen.findByRole('dialog');
  return { calls: shop.calls, confirm };
}

const refundsIn = (calls: readonly { path: string }[]) =>
  calls.filter((call) => call.path.endsWith('/refund'));

describe('refunding an order', () => {
  it('names the amount, and sends nothing without a reason', async () => {
    const { calls, confirm } = await openOrder();
    expect(confirm.textContent).toMatch(/Refund €.83\.64 for TQ-1043\?/);
    await userEvent.click(screen.getByRole('button', { name: /^Refund €/ }));
    await screen.findByText('The reason needs at least 3 characters.');
    expect(refundsIn(calls)).toEqual([]);
  });

  it('sends the reason once, under a key, and shows the order as refunded', async () => {
    const { calls } = await openOrder();
    await userEvent.type(screen.getByLabelText('Reason'), 'Asked for by the maker');
    await userEvent.click(screen.getByRole('button', { name: /^Refund €/ }));
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
    expect(screen.getByRole('heading', { level: 1 }).textContent).toContain('refunded');
    expect(refundsIn(calls)).toEqual([
      {
        method: 'POST',
        path: '/api/desk/orders/TQ-1043/refund',
        body: { reason: 'Asked for by the maker' },
        key: expect.stringMatching(/^[0-9a-f-]{32,36}$/) as string,
      },
    ]);
  });
});
