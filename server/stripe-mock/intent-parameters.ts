import { z } from 'zod';
import { currency, expand, flag, integer, metadata } from './parameters.ts';

const onlyAutomatic = {
  error: 'this stand-in takes the money at once; leave it out, or send automatic',
};
const onlyCards = { error: 'this stand-in takes cards only' };
const description = z.string().max(1000).optional();

export const intentParameters = z.strictObject({
  amount: integer,
  currency,
  metadata: metadata.optional(),
  description,
  payment_method: z.string().optional(),
  payment_method_types: z.array(z.literal('card', onlyCards)).min(1).optional(),
  automatic_payment_methods: z
    .strictObject({ enabled: flag, allow_redirects: z.enum(['always', 'never']).optional() })
    .optional(),
  capture_method: z.literal('automatic', onlyAutomatic).optional(),
  confirm: flag.optional(),
  expand,
});
export type IntentParameters = z.infer<typeof intentParameters>;

export const confirmParameters = z.strictObject({
  payment_method: z.string().optional(),
  expand,
});

export const updateParameters = z.strictObject({
  metadata: z.union([z.literal(''), metadata]).optional(),
  description,
  expand,
});
export type UpdateParameters = z.infer<typeof updateParameters>;

export const cancelParameters = z.strictObject({
  cancellation_reason: z
    .enum(['abandoned', 'duplicate', 'fraudulent', 'requested_by_customer'])
    .optional(),
  expand,
});
export type CancelParameters = z.infer<typeof cancelParameters>;
