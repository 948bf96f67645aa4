import type { OrderStatus } from '../../../server/contracts/orders.ts';

/** An order's state in the owner's words. */
export const orderWords: Record<OrderStatus, string> = {
  awaiting_payment: 'waits for payment',
  paid: 'paid',
  picking: 'being picked',
  packed: 'packed',
  shipped: 'shipped',
  on_hold: 'on hold',
  cancelled: 'cancelled',
  refunded: 'refunded',
};

export const kitsWords = (kits: number) => (kits === 1 ? 'one kit' : `${kits} kits`);
