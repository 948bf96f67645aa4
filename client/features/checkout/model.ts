import { z } from 'zod';
import { emailSchema } from '../../../server/contracts/common.ts';
import { addressSchema } from '../../../server/contracts/orders.ts';
import type { Address, CheckoutInput } from '../../../server/contracts/orders.ts';

export interface Acknowledgement {
  code: string;
  text: string;
}

/** The form's own shape: acknowledgements as one tick each. */
export const checkoutFormSchema = z.object({
  email: emailSchema,
  address: addressSchema,
  shippingMethod: z.string().min(1, 'Choose how it is sent.'),
  ticks: z.record(
    z.string(),
    z.boolean().refine((ticked) => ticked, 'Please read this and tick it.'),
  ),
});
export type CheckoutForm = z.input<typeof checkoutFormSchema>;
export type CheckedForm = z.output<typeof checkoutFormSchema>;

export interface KnownBuyer {
  email: string;
  address: Address | undefined;
  name: string;
}

const noAddress = {
  name: '',
  line1: '',
  line2: '',
  city: '',
  region: '',
  postalCode: '',
  country: 'IE',
};

export function emptyForm(known: KnownBuyer | undefined, codes: readonly string[]): CheckoutForm {
  return {
    email: known?.email ?? '',
    address: { ...noAddress, name: known?.name ?? '', ...known?.address },
    shippingMethod: 'standard',
    ticks: Object.fromEntries(codes.map((code) => [code, false])),
  };
}

/** What the shop is sent: empty optional lines are left out. */
export function toCheckout(form: CheckedForm): CheckoutInput {
  const { line2, region, ...address } = form.address;
  return {
    email: form.email,
    shippingAddress: {
      ...address,
      ...(line2 === undefined || line2 === '' ? {} : { line2 }),
      ...(region === undefined || region === '' ? {} : { region }),
    },
    shippingMethod: form.shippingMethod,
    acknowledgements: Object.keys(form.ticks).filter((code) => form.ticks[code] === true),
  };
}
