import { describe, expect, it } from 'vitest';
import {
  checkoutFormSchema,
  emptyForm,
  toCheckout,
} from '../../../client/features/checkout/model.ts';
import { checkoutSchema } from '../../../server/contracts/orders.ts';

const known = {
  email: 'mira@maker.example',
  name: 'Mira Holm',
  address: {
    name: 'Mira Holm',
    line1: '12 Lantern Row',
    city: 'Merrow Quay',
    postalCode: 'MQ4 7TR',
    country: 'IE',
  },
};

describe('the checkout form', () => {
  it('starts with what is known of the buyer', () => {
    const form = emptyForm(known, ['flash']);
    expect(form.email).toBe('mira@maker.example');
    expect(form.address.line1).toBe('12 Lantern Row');
    expect(form.ticks).toEqual({ flash: false });
  });

  it('asks for every caution to be ticked', () => {
    const parsed = checkoutFormSchema.safeParse(emptyForm(known, ['flash']));
    expect(parsed.success).toBe(false);
    expect(parsed.error?.issues.map((issue) => issue.path.join('.'))).toEqual(['ticks.flash']);
  });

  it('names each missing line of an empty form in a sentence', () => {
    const parsed = checkoutFormSchema.safeParse(emptyForm(undefined, []));
    const messages = parsed.error?.issues.map((issue) => issue.message) ?? [];
    expect(messages).toContain('The name is missing.');
    expect(messages).toContain('The first address line is missing.');
    expect(messages).toContain('The town is missing.');
  });

  it('sends what the contract takes, without empty optional lines', () => {
    const filled = { ...emptyForm(known, ['flash']), ticks: { flash: true } };
    const body = toCheckout(checkoutFormSchema.parse(filled));
    expect(body.acknowledgements).toEqual(['flash']);
    expect(body.shippingAddress).not.toHaveProperty('line2');
    expect(checkoutSchema.safeParse(body).success).toBe(true);
  });
});
