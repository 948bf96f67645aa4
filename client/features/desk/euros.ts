import { z } from 'zod';
import { changePriceSchema } from '../../../server/contracts/desk.ts';

const form = /^(\d{1,9})(?:[.,](\d{1,2}))?$/;

/** Euros and cents as typed, in whole cents; null for anything else. No floating point takes part. */
export function centsFrom(typed: string): number | null {
  const plain = typed.replaceAll(/[\s€\u00a0\u202f]/g, '');
  const match = form.exec(plain);
  if (match === null) return null;
  const [, euros = '0', cents = ''] = match;
  return Number(euros) * 100 + Number(cents.padEnd(2, '0'));
}

/** Whole cents as they stand in the form: 24 is "0.24". */
export function eurosText(cents: number): string {
  const digits = String(cents).padStart(3, '0');
  return `${digits.slice(0, -2)}.${digits.slice(-2)}`;
}

const amountSchema = changePriceSchema.shape.unitPrice.shape.amount;

/** The price form: euros typed as text, a reason; what comes out is what the server takes. */
export const priceFormSchema = z
  .object({
    euros: z.string().transform((typed, context) => {
      const cents = centsFrom(typed);
      const checked = amountSchema.safeParse(cents);
      if (cents !== null && checked.success) return checked.data;
      const message =
        cents === null
          ? 'Give the price in euros and cents, like 0.24.'
          : (checked.error?.issues[0]?.message ?? 'This price cannot be set.');
      context.addIssue({ code: 'custom', message });
      return z.NEVER;
    }),
    reason: changePriceSchema.shape.reason,
  })
  .transform(({ euros, reason }) => ({
    unitPrice: { amount: euros, currency: 'EUR' as const },
    reason,
  }));
