import type { OrderStatus } from '../contracts/orders.ts';

/** What can happen to an order. */
export type OrderEvent =
  'pay' | 'expire' | 'claim' | 'release' | 'pack' | 'ship' | 'refund' | 'hold' | 'resume';

export type Transition = { kind: 'moved'; to: OrderStatus } | { kind: 'refused'; reason: string };

const words: Record<OrderStatus, string> = {
  awaiting_payment: 'is not paid yet',
  paid: 'is paid and waits for the bench',
  picking: 'is being picked',
  packed: 'is packed',
  shipped: 'has been shipped',
  on_hold: 'is on hold',
  cancelled: 'was cancelled',
  refunded: 'was refunded',
};

const table: Record<OrderEvent, Partial<Record<OrderStatus, OrderStatus>>> = {
  // A cancelled order can still be paid late: the money came, so the parts are sought again.
  pay: { awaiting_payment: 'paid', cancelled: 'paid' },
  expire: { awaiting_payment: 'cancelled' },
  claim: { paid: 'picking' },
  release: { picking: 'paid' },
  pack: { picking: 'packed' },
  ship: { packed: 'shipped' },
  refund: {
    paid: 'refunded',
    picking: 'refunded',
    packed: 'refunded',
    shipped: 'refunded',
    on_hold: 'refunded',
  },
  hold: { awaiting_payment: 'on_hold', cancelled: 'on_hold', paid: 'on_hold' },
  resume: { on_hold: 'paid' },
};

/**
 * Where an order goes when something happens to it, or a sentence that says why not. Pure: nothing
 * is stored and no time is read.
 */
export function nextStatus(status: OrderStatus, event: OrderEvent): Transition {
  const to = table[event][status];
  if (to === undefined) return { kind: 'refused', reason: `The order ${words[status]}.` };
  return { kind: 'moved', to };
}
