import type { BenchOrder } from '../contracts/bench.ts';
import { picksOfOrder, setPicked } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { requireMine, type BenchDeps, type Packer } from './bench-order.ts';
import { Refusal } from './refusal.ts';
import { viewBenchOrder } from './view-bench-order.ts';

/** Says how many pieces of one pick are in the tray. Saying it twice changes nothing. */
export async function tickPick(
  deps: BenchDeps,
  packer: Packer,
  ref: string,
  pick: { id: string; quantity: number },
): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireMine(trx, packer, ref);
    if (order.status !== 'picking') throw new Refusal('wrong-state', `${ref} is packed already.`);
    const own = (await picksOfOrder(trx, order.id)).find((one) => String(one.id) === pick.id);
    if (!own) throw new Refusal('not-found', `${ref} has no such pick.`);
    if (pick.quantity > own.quantity) {
      throw new Refusal(
        'invalid',
        `This stop needs ${own.quantity}; put ${pick.quantity - own.quantity} back.`,
        [{ path: 'quantity', message: `At most ${own.quantity} at this stop.` }],
      );
    }
    await setPicked(trx, order.id, own.id, pick.quantity);
  });
  return viewBenchOrder(deps, packer, ref);
}
