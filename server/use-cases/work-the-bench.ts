import type { BenchOrder, QueueItem } from '../contracts/bench.ts';
import type { Page } from '../contracts/common.ts';
import { addressLines, shippedMail } from '../domain/order-mail.ts';
import { nextStatus, type OrderEvent } from '../domain/order-state.ts';
import { inBillOrder, labelOf, markingOf } from '../domain/pack-parts.ts';
import type { Deps } from '../ports.ts';
import type { Database } from '../store/connection.ts';
import { queueMail } from '../store/mail-outbox.ts';
import {
  addOrderEvent,
  addShipment,
  findOrder,
  findShipment,
  linesOfOrders,
  listOrders,
  lockOrder,
  partsOfOrder,
  setStatus,
  type OrderRow,
} from '../store/orders.ts';
import { findParts } from '../store/parts.ts';
import { shopSettings } from '../store/settings.ts';
import {
  clearPicked,
  moveReservations,
  picksOfOrder,
  postToLedger,
  setPicked,
  stopsOfOrders,
  type Actor,
} from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { Refusal } from './refusal.ts';
import { sentenceOfLines } from './view-order.ts';

export interface Packer extends Actor {
  id: string;
}

/** The orders that wait for the bench, the most urgent first. */
export async function listQueue(
  deps: Pick<Deps, 'db' | 'clock'>,
  packer: Packer,
  page: { page: number; pageSize: number },
): Promise<Page<QueueItem>> {
  const { orders, total } = await listOrders(deps.db, {
    statuses: ['paid', 'picking', 'packed'],
    order: 'ship-by',
    ...page,
  });
  const ids = orders.map((order) => order.id);
  const [lines, stops] = await Promise.all([linesOfOrders(deps.db, ids), stopsOfOrders(deps.db, ids)]);
  const now = deps.clock.now();
  const items = orders.map((order) => {
    const own = lines.filter((line) => line.orderId === order.id);
    const shipBy = order.shipBy ?? order.placedAt;
    return {
      ref: order.ref,
      status: order.status,
      shipBy: shipBy.toISOString(),
      late: shipBy < now,
      kits: own.reduce((sum, line) => sum + line.quantity, 0),
      stops: stops.get(order.id) ?? 0,
      sentence: sentenceOfLines(own),
      shippingMethod: order.shippingName,
      claimedBy: order.claimedByName,
      mine: order.claimedBy === packer.id,
    };
  });
  return { items, ...page, total };
}

/** One order as the bench sees it: the walk in bin order, the lines, the label. */
export async function viewBenchOrder(
  deps: Pick<Deps, 'db'>,
  packer: Packer,
  ref: string,
): Promise<BenchOrder> {
  const order = await findOrder(deps.db, ref);
  const known = ['paid', 'picking', 'packed', 'shipped'];
  if (order === null || !known.includes(order.status)) {
    throw new Refusal('not-found', `The bench has no order ${ref}.`);
  }
  const [picks, lines, needs, shipment] = await Promise.all([
    picksOfOrder(deps.db, order.id),
    linesOfOrders(deps.db, [order.id]),
    partsOfOrder(deps.db, order.id),
    findShipment(deps.db, order.id),
  ]);
  const parts = new Map(
    (await findParts(deps.db, picks.map((pick) => pick.partId))).map((part) => [part.id, part]),
  );
  return {
    ref: order.ref,
    status: order.status,
    shipBy: (order.shipBy ?? order.placedAt).toISOString(),
    claimedBy: order.claimedByName,
    mine: order.claimedBy === packer.id,
    shippingMethod: order.shippingName,
    address: addressLines(order.shipTo),
    lines: lines.map((line) => ({
      id: line.id,
      sentence: line.sentence,
      quantity: line.quantity,
      parts: inBillOrder(line.parts),
      cautions: line.cautions.map((caution) => caution.text),
    })),
    picks: picks.map((pick) => {
      const part = parts.get(pick.partId)!;
      return {
        id: String(pick.id),
        bin: pick.bin,
        sku: part.facts.sku,
        lot: pick.lot,
        label: labelOf(part),
        marking: markingOf(part),
        kind: part.kind,
        roles: [...new Set(needs.filter((need) => need.partId === part.id).map((need) => need.role))],
        quantity: pick.quantity,
        picked: pick.picked,
      };
    }),
    shipment: shipment && { carrier: shipment.carrier, tracking: shipment.tracking },
  };
}

type BenchDeps = Pick<Deps, 'db' | 'clock' | 'signer' | 'publicUrl'>;

/** Takes an order off the queue for one packer. Of two who try at once, one gets it. */
export async function claimOrder(deps: BenchDeps, packer: Packer, ref: string): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireOrder(trx, ref);
    if (order.status === 'picking' && order.claimedBy === packer.id) return;
    if (order.claimedBy !== null && order.status === 'picking') {
      throw new Refusal('already-claimed', `${order.claimedByName} has ${ref}. Take another from the queue.`);
    }
    await move(deps, trx, order, 'claim', packer, 'Claimed for picking', { claimedBy: packer.id });
  });
  return viewBenchOrder(deps, packer, ref);
}

/** Hands a claimed order back to the queue; what was picked counts as put back. */
export async function releaseOrder(deps: BenchDeps, packer: Packer, ref: string): Promise<BenchOrder> {
  await inTransaction(deps.db, async (trx) => {
    const order = await requireMine(trx, packer, ref);
    await clearPicked(trx, order.id);
    await move(deps, trx, order, 'release', packer, 'Handed back to the queue', { claimedBy: null });
  });
  return viewBenchOrder(deps, packer, ref);
}

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
      throw new Refusal('invalid', `This stop needs ${own.quantity}; put ${pick.quantity - own.quantity} back.`, [
        { path: 'quantity', message: `At most ${own.quantity} at this stop.` },
      ]);
    }
    await setPicked(trx, order.id, own.id, pick.quantity);
  });
  return viewBenchOrder(deps, packer, ref);
}

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
    await move(deps, trx, order, 'pack', packer, 'Packed', {});
  });
  return viewBenchOrder(deps, packer, ref);
}

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
    await move(deps, trx, order, 'ship', packer, `Shipped with ${shipment.carrier}, ${shipment.tracking}`, {});
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

async function requireOrder(trx: Database, ref: string): Promise<OrderRow> {
  const order = await lockOrder(trx, ref);
  if (order === null) throw new Refusal('not-found', `The bench has no order ${ref}.`);
  return order;
}

async function requireMine(trx: Database, packer: Packer, ref: string): Promise<OrderRow> {
  const order = await requireOrder(trx, ref);
  if (order.claimedBy === null) throw new Refusal('wrong-state', `Nobody has claimed ${ref}; claim it first.`);
  if (order.claimedBy !== packer.id) {
    throw new Refusal('already-claimed', `${order.claimedByName} has ${ref}.`);
  }
  return order;
}

async function move(
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
