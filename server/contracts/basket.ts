import { z } from 'zod';
import { moneySchema, quantity, line } from './common.ts';
import { packSchema } from './packs.ts';

export const kitCountSchema = quantity('The quantity', 1, 500, '').int(
  'The quantity must be a whole number.',
);

export const addToBasketSchema = z.object({
  token: line('The pack', 2000),
  quantity: kitCountSchema.default(1),
});
export const changeLineSchema = z.object({ quantity: kitCountSchema });

export const basketSchema = z.object({
  lines: z.array(
    z.object({
      id: z.string(),
      sentence: z.string(),
      pack: packSchema,
      quantity: z.int(),
      unitPrice: moneySchema,
      total: moneySchema,
      /** A sentence when the shelves can no longer make this line; null otherwise. */
      problem: z.string().nullable(),
    }),
  ),
  kits: z.int(),
  total: moneySchema,
  acknowledgements: z.array(z.object({ code: z.string(), text: z.string() })),
});
export type Basket = z.infer<typeof basketSchema>;
