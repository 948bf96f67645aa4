import { z } from 'zod';
import { forgetKept, keep, readKept } from '../../lib/kept-session.ts';
import type { CheckoutForm } from './model.ts';

const name = 'checkout';
const text = z.string().max(300);

/** What may stand half typed in the form; acknowledgements are given anew each time. */
const typedSchema = z.object({
  email: text,
  address: z.object({
    name: text,
    line1: text,
    line2: text,
    city: text,
    region: text,
    postalCode: text,
    country: text,
  }),
  shippingMethod: text,
});

type Typed = z.infer<typeof typedSchema>;

/** What was typed before the page was loaded again. */
export function readTyped(): Typed | undefined {
  return readKept(name, typedSchema);
}

export function keepTyped({ email, address, shippingMethod }: CheckoutForm): void {
  keep(name, { email, address: { line2: '', region: '', ...address }, shippingMethod });
}

export function forgetTyped(): void {
  forgetKept(name);
}
