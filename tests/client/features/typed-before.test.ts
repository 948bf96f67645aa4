import { beforeEach, describe, expect, it } from 'vitest';
import { emptyForm } from '../../../client/features/checkout/model.ts';
import {
  forgetTyped,
  keepTyped,
  readTyped,
} from '../../../client/features/checkout/typed-before.ts';

describe('what was typed at the checkout', () => {
  beforeEach(() => sessionStorage.clear());

  it('is there after a reload, without the ticks', () => {
    const form = emptyForm(undefined, ['flash']);
    keepTyped({ ...form, email: 'mira@maker', ticks: { flash: true } });
    expect(readTyped()?.email).toBe('mira@maker');
    expect(readTyped()).not.toHaveProperty('ticks');
  });

  it('is gone after the order', () => {
    keepTyped(emptyForm(undefined, []));
    forgetTyped();
    expect(readTyped()).toBeUndefined();
  });
});
