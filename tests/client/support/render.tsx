import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render } from '@testing-library/react';
import type { ReactNode } from 'react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach } from 'vitest';
import { shopOptions } from '../../../client/lib/shop.ts';
import type { Shop } from '../../../server/contracts/shop.ts';

afterEach(cleanup);

export const sampleShop: Shop = {
  name: 'Tockwell',
  address: ['The Old Clock Shop', 'Merrow Quay'],
  email: 'bench@tockwell.example',
  currency: 'EUR',
  demo: true,
  mailPageUrl: null,
  batteries: [
    { sku: 'TW-AAA3', label: '3 × AAA', words: 'three AAA cells', nominalVolts: 4.5 },
    { sku: 'TW-AA2', label: '2 × AA', words: 'two AA cells', nominalVolts: 3 },
  ],
  ledColours: ['red', 'green', 'blue'],
  carriers: ['Quay Post'],
};

/** Renders inside the providers a page has, with the shop already known. */
export function renderInShop(ui: ReactNode) {
  const client = new QueryClient();
  client.setQueryData(shopOptions.queryKey, sampleShop);
  return render(
    <QueryClientProvider client={client}>
      <MemoryRouter>{ui}</MemoryRouter>
    </QueryClientProvider>,
  );
}

/** jsdom has no media queries; this answers all of them alike. */
export function stubMedia(matches: boolean): void {
  window.matchMedia = (media) => ({
    matches,
    media,
    onchange: null,
    addEventListener: () => undefined,
    removeEventListener: () => undefined,
    addListener: () => undefined,
    removeListener: () => undefined,
    dispatchEvent: () => false,
  });
}
