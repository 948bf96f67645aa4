import { beforeEach, describe, expect, it } from 'vitest';
import { forgetUnpaid, rememberUnpaid, unpaidOrder } from '../../../client/lib/unpaid-order.ts';

const order = { orderRef: 'TQ-1041', paymentUrl: 'https://cards.example/pay/1' };
const at = Date.UTC(2026, 11, 1, 14, 0);
const minutes = 60_000;

describe('an order left unpaid in this tab', () => {
  beforeEach(() => sessionStorage.clear());

  it('is known with its card page and the time its parts are kept until', () => {
    rememberUnpaid(order, at);
    expect(unpaidOrder(at + minutes)).toEqual({ ...order, keptUntil: '2026-12-01T14:35:00.000Z' });
  });

  it('is out of mind once its parts go back on the shelf', () => {
    rememberUnpaid(order, at);
    expect(unpaidOrder(at + 35 * minutes)).toBeUndefined();
  });

  it('is forgotten when it is paid, and only then', () => {
    rememberUnpaid(order, at);
    forgetUnpaid('TQ-1040');
    expect(unpaidOrder(at)?.orderRef).toBe('TQ-1041');
    forgetUnpaid('TQ-1041');
    expect(unpaidOrder(at)).toBeUndefined();
  });

  it('is not taken from what is no web address', () => {
    sessionStorage.setItem(
      'tockwell-kept-unpaid-order',
      JSON.stringify({ ...order, paymentUrl: 'javascript:void(0)', at }),
    );
    expect(unpaidOrder(at)).toBeUndefined();
  });
});
