import type { Role } from '../../server/contracts/auth.ts';
import { queryString } from '../lib/http.ts';

/** Every page's address: the pattern the router matches, and the function that builds a link to it. */
export const paths = {
  home: { pattern: '/', link: (query = '') => (query === '' ? '/' : `/?${query}`) },
  pack: {
    pattern: '/packs/:token',
    link: (token: string, kits = 1) =>
      `/packs/${encodeURIComponent(token)}${kits > 1 ? queryString({ kits }) : ''}`,
  },
  basket: { pattern: '/basket', link: () => '/basket' },
  checkout: { pattern: '/checkout', link: () => '/checkout' },
  orders: {
    pattern: '/orders',
    link: (page = 1) => `/orders${page > 1 ? queryString({ page }) : ''}`,
  },
  order: {
    pattern: '/orders/:ref',
    link: (ref: string, token: string | null = null) =>
      `/orders/${encodeURIComponent(ref)}${queryString({ token })}`,
  },
  thanks: {
    pattern: '/orders/:ref/thanks',
    link: (ref: string, token: string | null = null) =>
      `/orders/${encodeURIComponent(ref)}/thanks${queryString({ token })}`,
  },
  buildSheet: {
    pattern: '/orders/:ref/lines/:lineId/build-sheet',
    link: (ref: string, lineId: string, token: string | null = null) =>
      `/orders/${encodeURIComponent(ref)}/lines/${encodeURIComponent(lineId)}/build-sheet${queryString({ token })}`,
  },
  signIn: { pattern: '/sign-in', link: (next?: string) => `/sign-in${queryString({ next })}` },
  signUp: { pattern: '/sign-up', link: (next?: string) => `/sign-up${queryString({ next })}` },
  account: { pattern: '/account', link: () => '/account' },
  help: { pattern: '/help', link: (part = '') => (part === '' ? '/help' : `/help#${part}`) },
  terms: { pattern: '/terms', link: () => '/terms' },
  privacy: { pattern: '/privacy', link: () => '/privacy' },
  bench: { pattern: '/bench/*', link: () => '/bench' },
  desk: { pattern: '/desk/*', link: () => '/desk' },
} as const;

function homeOf(role: Role): string {
  if (role === 'owner') return paths.desk.link();
  return role === 'packer' ? paths.bench.link() : paths.home.link();
}

/** Where to go after signing in: only ever a page of this shop; unasked, to where one's work is. */
export function safeNext(next: string | null, role: Role = 'customer'): string {
  return next !== null && /^\/(?![/\\])/.test(next) ? next : homeOf(role);
}
