import { queryString } from '../../lib/http.ts';

/** The desk's addresses: patterns under /desk, and the functions that build links to them. */
export const deskPaths = {
  today: { pattern: '/', link: () => '/desk' },
  parts: {
    pattern: 'parts',
    link: (filter: Record<string, string> = {}) => `/desk/parts${queryString(filter)}`,
  },
  part: { pattern: 'parts/:id', link: (id: string) => `/desk/parts/${encodeURIComponent(id)}` },
  orders: {
    pattern: 'orders',
    link: (filter: Record<string, string> = {}) => `/desk/orders${queryString(filter)}`,
  },
  order: {
    pattern: 'orders/:ref',
    link: (ref: string) => `/desk/orders/${encodeURIComponent(ref)}`,
  },
  audit: { pattern: 'audit', link: () => '/desk/audit' },
} as const;
