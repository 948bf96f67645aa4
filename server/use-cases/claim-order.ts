import type { BenchOrder } from '../contracts/bench.ts';
import { inTransaction } from '../store/transaction.ts';
import { moveOrder, requireOrder, type BenchDeps, type Packer } from './bench-order.ts';
import { Refusal } from './refusal.ts';
import { viewBenchOrder } from './view-bench-order.ts';

/** Takes an order off the queue for one packer. Of two who try at once, one gets it. */
export async function claimOrder(
  deps: BenchDeps,
  packer: Packer,
  ref: string,
): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireOrder(trx, ref);
    if (order.status === 'picking' && order.claimedBy === packer.id) return;
    if (order.claimedBy !== null && order.status === 'picking') {
      throw new Refusal(
        'already-claimed',
        `${order.claimedByName} has ${ref}. Take another from the queue.`,
      );
    }
    await moveOrder(deps, trx, order, 'claim', packer, 'Claimed for picking', {
      claimedBy: packer.id,
    });
  });
  return viewBenchOrder(deps, packer, ref);
}
