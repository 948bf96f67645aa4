import type { z } from 'zod';
import { deskPartsQuerySchema } from '../../../server/contracts/desk.ts';

export type PartsQuery = z.output<typeof deskPartsQuerySchema>;

const { kind, mounting, stock, sort, direction, search } = deskPartsQuerySchema.shape;

/** The parts' filter as the address has it; what cannot be read counts as not given. */
export function readPartsQuery(value: (name: string) => string, page: number): PartsQuery {
  const given = (name: string) => (value(name) === '' ? undefined : value(name));
  return {
    search: search.safeParse(given('search')).data,
    kind: kind.safeParse(given('kind')).data,
    mounting: mounting.safeParse(given('mounting')).data,
    stock: stock.safeParse(given('stock')).data ?? 'all',
    sort: sort.safeParse(given('sort')).data ?? 'sku',
    direction: direction.safeParse(given('direction')).data ?? 'up',
    page,
    pageSize: 50,
  };
}

export type PartsSort = PartsQuery['sort'];
