import type { BenchOrder } from '../contracts/bench.ts';
import { picksOfOrder } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { moveOrder, requireMine, type BenchDeps, type Packer } from './bench-order.ts';
import { Refusal } from './refusal.ts';
import { viewBenchOrder } from './view-bench-order.ts';

/** Closes the bag: every pick must be in the tray. */
export async function packOrder(deps: BenchDeps, packer: Packer, ref: string): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireMine(trx, packer, ref);
    const missing = (await picksOfOrder(trx, order.id)).find((pick) => pick.picked < pick.quantity);
    if (missing && order.status === 'picking') {
      throw new Refusal(
        'wrong-state',
        `Bin ${missing.bin} still wants ${missing.quantity - missing.picked}; pick them first.`,
      );
    }
    await moveOrder(deps, trx, order, 'pack', packer, 'Packed', {});
  });
  return viewBenchOrder(deps, packer, ref);
}
