import type { BenchOrder } from '../contracts/bench.ts';
import { unmeasured } from '../domain/tuning.ts';
import { linesOfOrders } from '../store/orders.ts';
import { picksOfOrder } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { tuningsOfOrder } from '../store/tunings.ts';
import type { Database } from '../store/connection.ts';
import { moveOrder, requireMine, type BenchDeps, type Packer } from './bench-order.ts';
import { Refusal } from './refusal.ts';
import { viewBenchOrder } from './view-bench-order.ts';

/** Closes the bag: every kit to be tuned must be, and every pick must be in the tray. */
export async function packOrder(deps: BenchDeps, packer: Packer, ref: string): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireMine(trx, packer, ref);
    if (order.status === 'picking') await requireReadings(trx, order.id);
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

async function requireReadings(trx: Database, orderId: number): Promise<void> {
  const lines = await linesOfOrders(trx, [orderId]);
  const [missing] = unmeasured(lines, await tuningsOfOrder(trx, orderId));
  if (!missing) return;
  const { line, unit } = missing;
  throw new Refusal(
    'wrong-state',
    `Kit ${unit} of ${line.quantity} in line ${line.lineNo} is not tuned yet; measure its C1 first.`,
  );
}
