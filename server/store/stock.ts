import type { KeptPieces, LotShare, LotStock } from '../domain/stock.ts';
import type { Database } from './connection.ts';

export interface LotRow extends LotStock {
  code: string;
  bin: string;
  receivedOn: string;
}

export type StockReason =
  'opening' | 'counted' | 'received' | 'damaged' | 'lost' | 'found' | 'returned' | 'shipped';

export interface Actor {
  id: string | null;
  name: string;
}

const lotColumns = [
  'lots.id',
  'lots.part_id as partId',
  'lots.on_hand as onHand',
  'lots.reserved',
  'lots.code',
  'bins.code as bin',
];

/** The lots of some parts, ascending by id (oldest first). */
export async function lotsOfParts(db: Database, partIds: readonly number[]): Promise<LotRow[]> {
  return db('lots')
    .join('bins', 'bins.id', 'lots.bin_id')
    .whereIn('lots.part_id', partIds)
    .orderBy('lots.id')
    .select(...lotColumns, db.raw(`to_char(lots.received_on, 'YYYY-MM-DD') as "receivedOn"`));
}

/**
 * Locks the lots of some parts for the rest of the transaction. Always in ascending id, so that two
 * buyers who want the same parts wait for one another instead of deadlocking.
 */
export async function lockLotsOfParts(
  db: Database,
  partIds: readonly number[],
): Promise<LotStock[]> {
  return db('lots')
    .whereIn('part_id', partIds)
    .orderBy('id')
    .forUpdate()
    .select('id', 'part_id as partId', 'on_hand as onHand', 'reserved');
}

/** Locks one lot; null when there is none. */
export async function lockLot(
  db: Database,
  lotId: number,
): Promise<(LotStock & { code: string }) | null> {
  const row = await db('lots')
    .where({ id: lotId })
    .forUpdate()
    .first('id', 'part_id as partId', 'on_hand as onHand', 'reserved', 'code');
  return row ?? null;
}

/** Holds pieces of lots for an order. The lots must be locked; the schema refuses absent pieces. */
export async function holdShares(
  db: Database,
  orderId: number,
  shares: readonly LotShare[],
): Promise<void> {
  await db('reservations').insert(
    shares.map(({ lotId, quantity }) => ({
      order_id: orderId,
      lot_id: lotId,
      quantity,
      state: 'held',
    })),
  );
}

/** Keeps further pieces for an order that is being picked. The lots must be locked. */
export async function keepMore(
  db: Database,
  orderId: number,
  shares: readonly LotShare[],
): Promise<void> {
  for (const { lotId, quantity } of shares) {
    await db('reservations')
      .insert({ order_id: orderId, lot_id: lotId, quantity, state: 'allocated' })
      .onConflict(['order_id', 'lot_id'])
      .merge({ quantity: db.raw('reservations.quantity + excluded.quantity') });
  }
}

/** Sets how many pieces of some lots are kept for an order and in its tray; none kept drops the pick. */
export async function setKept(db: Database, lots: readonly KeptPieces[]): Promise<void> {
  for (const { id, quantity, picked } of lots) {
    const own = db('reservations').where({ id });
    await (quantity === 0 ? own.delete() : own.update({ quantity, picked }));
  }
}

/** Drops an order's released reservations, so that it can be promised parts again. */
export async function forgetReleased(db: Database, orderId: number): Promise<void> {
  await db('reservations').where({ order_id: orderId, state: 'released' }).delete();
}

/** Moves all live reservations of an order to another state, lots in ascending id. */
export async function moveReservations(
  db: Database,
  orderId: number,
  to: 'allocated' | 'released' | 'consumed',
): Promise<void> {
  const rows: { id: number; lot_id: number }[] = await db('reservations')
    .where({ order_id: orderId })
    .whereIn('state', ['held', 'allocated'])
    .orderBy('lot_id')
    .forUpdate()
    .select('id', 'lot_id');
  for (const row of rows) await db('reservations').where({ id: row.id }).update({ state: to });
}

/** How many pieces are promised to an order and still on the shelf. */
export async function promisedPieces(db: Database, orderId: number): Promise<number> {
  const [row] = await db('reservations')
    .where({ order_id: orderId })
    .whereIn('state', ['held', 'allocated'])
    .sum({ pieces: 'quantity' });
  return Number(row?.pieces ?? 0);
}

export interface PickRow {
  id: number;
  lotId: number;
  partId: number;
  lot: string;
  bin: string;
  walkOrder: number;
  quantity: number;
  picked: number;
}

/** What must be taken for an order, in the order of the walk through the bins. */
export async function picksOfOrder(db: Database, orderId: number): Promise<PickRow[]> {
  return db('reservations')
    .join('lots', 'lots.id', 'reservations.lot_id')
    .join('bins', 'bins.id', 'lots.bin_id')
    .where('reservations.order_id', orderId)
    .whereIn('reservations.state', ['held', 'allocated', 'consumed'])
    .orderBy(['bins.walk_order', 'reservations.id'])
    .select(
      'reservations.id',
      'lots.id as lotId',
      'lots.part_id as partId',
      'lots.code as lot',
      'bins.code as bin',
      'bins.walk_order as walkOrder',
      'reservations.quantity',
      'reservations.picked',
    );
}

/** How many stops each order's walk has. */
export async function stopsOfOrders(
  db: Database,
  orderIds: readonly number[],
): Promise<Map<number, number>> {
  const rows: { orderId: number; stops: number }[] = await db('reservations')
    .whereIn('order_id', orderIds)
    .whereIn('state', ['held', 'allocated', 'consumed'])
    .groupBy('order_id')
    .select('order_id as orderId')
    .count({ stops: '*' });
  return new Map(rows.map((row) => [row.orderId, row.stops]));
}

/** Sets how many pieces of one pick are in the tray; false when the order has no such pick. */
export async function setPicked(
  db: Database,
  orderId: number,
  pickId: number,
  picked: number,
): Promise<boolean> {
  const changed = await db('reservations')
    .where({ id: pickId, order_id: orderId, state: 'allocated' })
    .where('quantity', '>=', picked)
    .update({ picked });
  return changed === 1;
}

/** Puts an order's picks back to none, when it is handed back. */
export async function clearPicked(db: Database, orderId: number): Promise<void> {
  await db('reservations').where({ order_id: orderId, state: 'allocated' }).update({ picked: 0 });
}

export interface LedgerPosting {
  lotId: number;
  delta: number;
  reason: StockReason;
  actor: Actor;
  at: Date;
  orderId?: number;
  note?: string;
}

/** Posts entries to the stock ledger; each moves what its lot has on hand. */
export async function postToLedger(
  db: Database,
  postings: readonly LedgerPosting[],
): Promise<void> {
  for (const posting of postings) {
    await db('stock_ledger').insert({
      lot_id: posting.lotId,
      delta: posting.delta,
      // The trigger writes the true balance; the column must not be null before it runs.
      balance: 0,
      reason: posting.reason,
      order_id: posting.orderId ?? null,
      actor_id: posting.actor.id,
      actor_name: posting.actor.name,
      note: posting.note ?? null,
      at: posting.at,
    });
  }
}

export interface LedgerRow {
  at: Date;
  who: string;
  reason: StockReason;
  note: string | null;
  orderRef: string | null;
  partName: string;
  lot: string;
  bin: string;
  from: number;
  to: number;
}

/** The newest ledger entries, of one part or of all. */
export async function newestLedger(
  db: Database,
  limit: number,
  partId?: number,
): Promise<LedgerRow[]> {
  return db('stock_ledger')
    .join('lots', 'lots.id', 'stock_ledger.lot_id')
    .join('parts', 'parts.id', 'lots.part_id')
    .join('bins', 'bins.id', 'lots.bin_id')
    .leftJoin('orders', 'orders.id', 'stock_ledger.order_id')
    .modify((query) => {
      if (partId !== undefined) query.where('lots.part_id', partId);
    })
    .orderBy([
      { column: 'stock_ledger.at', order: 'desc' },
      { column: 'stock_ledger.id', order: 'desc' },
    ])
    .limit(limit)
    .select(
      'stock_ledger.at',
      'stock_ledger.actor_name as who',
      'stock_ledger.reason',
      'stock_ledger.note',
      'orders.ref as orderRef',
      'parts.name as partName',
      'lots.code as lot',
      'bins.code as bin',
      db.raw('stock_ledger.balance - stock_ledger.delta as "from"'),
      'stock_ledger.balance as to',
    );
}
