import { nextStatus } from '../domain/order-state.ts';
import type { Deps } from '../ports.ts';
import { addOrderEvent, lockOrder, setStatus } from '../store/orders.ts';
import { moveReservations } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';

/**
 * Cancels an order that was not paid and gives its parts back; false when it was paid or had ended
 * already.
 */
export async function cancelUnpaidOrder(
  deps: Pick<Deps, 'db' | 'clock'>,
  ref: string,
  why: string,
): Promise<boolean> {
  return inTransaction(deps.db, async (trx) => {
    const order = await lockOrder(trx, ref);
    if (order === null) return false;
    const step = nextStatus(order.status, 'expire');
    if (step.kind === 'refused') return false;
    await moveReservations(trx, order.id, 'released');
    await setStatus(trx, order.id, { status: step.to, reservedUntil: null });
    await addOrderEvent(trx, order.id, {
      at: deps.clock.now(),
      who: 'Tockwell',
      what: `${why}; the parts are back on the shelf`,
      from: order.status,
      to: step.to,
    });
    return true;
  });
}
