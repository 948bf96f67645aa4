import { z } from 'zod';
import { forgetKept, keep, readKept } from './kept-session.ts';

const name = 'unpaid-order';
/** As long as the shop sets the parts aside for an order that is not paid. */
const keptMilliseconds = 35 * 60_000;

const unpaidOrderSchema = z.object({
  orderRef: z.string().min(1),
  paymentUrl: z.string().regex(/^https?:\/\//),
  at: z.number(),
});

interface UnpaidOrder {
  orderRef: string;
  paymentUrl: string;
  /** ISO time until which the parts are set aside. */
  keptUntil: string;
}

/** Remembers an order on its way to the card page, so that the Back button does not lose it. */
export function rememberUnpaid(
  order: { orderRef: string; paymentUrl: string },
  now = Date.now(),
): void {
  const { orderRef, paymentUrl } = order;
  const absolute = new URL(paymentUrl, window.location.href).href;
  keep(name, { orderRef, paymentUrl: absolute, at: now });
}

/** The order this tab left unpaid, while its parts are still set aside. */
export function unpaidOrder(now = Date.now()): UnpaidOrder | undefined {
  const kept = readKept(name, unpaidOrderSchema);
  if (kept === undefined || now < kept.at || now >= kept.at + keptMilliseconds) return undefined;
  const keptUntil = new Date(kept.at + keptMilliseconds).toISOString();
  return { orderRef: kept.orderRef, paymentUrl: kept.paymentUrl, keptUntil };
}

/** Forgets this order, once it is paid or gone; another one stays. */
export function forgetUnpaid(orderRef: string): void {
  if (readKept(name, unpaidOrderSchema)?.orderRef === orderRef) forgetKept(name);
}
