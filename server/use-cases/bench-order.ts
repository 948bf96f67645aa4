import { nextStatus, type OrderEvent } from '../domain/order-state.ts';
import type { Deps } from '../ports.ts';
import type { Database } from '../store/connection.ts';
import { addOrderEvent, lockOrder, setStatus, type OrderRow } from '../store/orders.ts';
import type { Actor } from '../store/stock.ts';
import { Refusal } from './refusal.ts';

export interface Packer extends Actor {
  id: string;
}

export type BenchDeps = Pick<Deps, 'db' | 'clock' | 'signer' | 'publicUrl'>;

/** Locks an order of the bench, or refuses when there is none. */
export async function requireOrder(trx: Database, ref: string): Promise<OrderRow> {
  const order = await lockOrder(trx, ref);
  if (order === null) throw new Refusal('not-found', `The bench has no order ${ref}.`);
  return order;
}

/** Locks an order that this packer has claimed, or refuses. */
export async function requireMine(trx: Database, packer: Packer, ref: string): Promise<OrderRow> {
  const order = await requireOrder(trx, ref);
  if (order.claimedBy === null)
    throw new Refusal('wrong-state', `Nobody has claimed ${ref}; claim it first.`);
  if (order.claimedBy !== packer.id) {
    throw new Refusal('already-claimed', `${order.claimedByName} has ${ref}.`);
  }
  return order;
}

/** Moves an order by the state table and writes the line of its ledger. */
export async function moveOrder(
  deps: Pick<Deps, 'clock'>,
  trx: Database,
  order: OrderRow,
  event: OrderEvent,
  packer: Packer,
  what: string,
  change: { claimedBy?: string | null },
): Promise<void> {
  const step = nextStatus(order.status, event);
  if (step.kind === 'refused') throw new Refusal('wrong-state', step.reason);
  await setStatus(trx, order.id, { status: step.to, ...change });
  await addOrderEvent(trx, order.id, {
    at: deps.clock.now(),
    who: packer.name,
    what,
    from: order.status,
    to: step.to,
  });
}
