import type { Order, OrderStatus } from '../../../server/contracts/orders.ts';

export const statusWords: Record<OrderStatus, string> = {
  awaiting_payment: 'waiting for payment',
  paid: 'paid',
  picking: 'being picked',
  packed: 'packed',
  shipped: 'shipped',
  on_hold: 'on hold',
  cancelled: 'cancelled',
  refunded: 'refunded',
};

const walk = ['awaiting_payment', 'paid', 'picking', 'packed', 'shipped'] as const;

/** A status code from the ledger in words; anything else as it stands. */
export function wordsForStatus(value: string | null): string | null {
  if (value === null) return null;
  return Object.hasOwn(statusWords, value) ? statusWords[value as OrderStatus] : value;
}

export interface Step {
  status: OrderStatus;
  words: string;
  state: 'done' | 'now' | 'ahead';
}

const stepWords: Record<(typeof walk)[number], string> = {
  awaiting_payment: 'Ordered',
  paid: 'Paid',
  picking: 'Picking',
  packed: 'Packed',
  shipped: 'Shipped',
};

/** The walk of an order through the shop; null when it left that walk. */
export function stepsOf(status: OrderStatus): Step[] | null {
  const at = walk.findIndex((each) => each === status);
  if (at < 0) return null;
  return walk.map((each, index) => ({
    status: each,
    words: stepWords[each],
    state: index < at || status === 'shipped' ? 'done' : index === at ? 'now' : 'ahead',
  }));
}

/** The page's opening sentence, in two parts: what is said lightly and what heavily. */
export function openingFor(order: Pick<Order, 'status' | 'shipment'>): {
  light: string;
  heavy: string;
} {
  switch (order.status) {
    case 'awaiting_payment':
      return { light: 'Your parts are set aside; the order is', heavy: 'waiting for payment' };
    case 'paid':
      return { light: 'Paid. It waits in', heavy: 'the packers’ queue' };
    case 'picking':
      return { light: 'A packer has your order and is', heavy: 'picking your parts' };
    case 'packed':
      return { light: 'Your kits are bagged and', heavy: 'packed' };
    case 'shipped':
      return {
        light: 'Your kits are on their way with',
        heavy: order.shipment?.carrier ?? 'the carrier',
      };
    case 'on_hold':
      return { light: 'The order is', heavy: 'on hold' };
    case 'cancelled':
      return { light: 'The order was', heavy: 'cancelled' };
    case 'refunded':
      return { light: 'The order was', heavy: 'refunded' };
  }
}
