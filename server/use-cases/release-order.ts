import type { BenchOrder } from '../contracts/bench.ts';
import { clearPicked } from '../store/stock.ts';
import { dropReadings } from '../store/tunings.ts';
import { inTransaction } from '../store/transaction.ts';
import { moveOrder, requireMine, type BenchDeps, type Packer } from './bench-order.ts';
import { viewBenchOrder } from './view-bench-order.ts';

/** Hands a claimed order back to the queue; what was picked and measured counts as put back. */
export async function releaseOrder(
  deps: BenchDeps,
  packer: Packer,
  ref: string,
): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireMine(trx, packer, ref);
    await clearPicked(trx, order.id);
    await dropReadings(trx, order.id);
    await moveOrder(deps, trx, order, 'release', packer, 'Handed back to the queue', {
      claimedBy: null,
    });
  });
  return viewBenchOrder(deps, packer, ref);
}
