import type { BenchOrder } from '../contracts/bench.ts';
import { shippedMail } from '../domain/order-mail.ts';
import { queueMail } from '../store/mail-outbox.ts';
import { linesOfOrders } from '../store/orders.ts';
import { addShipment } from '../store/shipments.ts';
import { shopSettings } from '../store/settings.ts';
import { moveReservations, picksOfOrder, postToLedger } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { moveOrder, requireMine, type BenchDeps, type Packer } from './bench-order.ts';
import { viewBenchOrder } from './view-bench-order.ts';

/** Sends the parcel: parts leave the ledger, the maker is mailed, all in one transaction. */
export async function shipOrder(
  deps: BenchDeps,
  packer: Packer,
  ref: string,
  shipment: { carrier: string; tracking: string },
): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireMine(trx, packer, ref);
    const picks = await picksOfOrder(trx, order.id);
    const at = deps.clock.now();
    await moveOrder(
      deps,
      trx,
      order,
      'ship',
      packer,
      `Shipped with ${shipment.carrier}, ${shipment.tracking}`,
      {},
    );
    await moveReservations(trx, order.id, 'consumed');
    await postToLedger(
      trx,
      [...picks]
        .sort((a, b) => a.lotId - b.lotId)
        .map((pick) => ({
          lotId: pick.lotId,
          delta: -pick.quantity,
          reason: 'shipped' as const,
          actor: packer,
          at,
          orderId: order.id,
        })),
    );
    await addShipment(trx, order.id, { ...shipment, shippedAt: at, shippedBy: packer.id });
    const link = `${deps.publicUrl}/orders/${ref}?token=${deps.signer.orderToken(ref)}`;
    const lines = await linesOfOrders(trx, [order.id]);
    await queueMail(trx, {
      messageKey: `shipped-${ref}`,
      orderId: order.id,
      recipient: order.email,
      ...shippedMail({ shop: await shopSettings(trx), order, lines, ...shipment, link }),
    });
  });
  return viewBenchOrder(deps, packer, ref);
}
