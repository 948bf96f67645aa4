/** The bench's addresses: patterns under /bench, and the functions that build links to them. */
export const benchPaths = {
  queue: {
    pattern: '/',
    link: (page = 1) => (page > 1 ? `/bench?page=${page}` : '/bench'),
  },
  order: {
    pattern: 'orders/:ref',
    link: (ref: string) => `/bench/orders/${encodeURIComponent(ref)}`,
  },
} as const;
