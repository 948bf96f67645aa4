import type { Address, OrderStatus } from '../contracts/orders.ts';
import type { FrozenPack } from './packs.ts';
import type { Database } from './connection.ts';

export interface OrderRow {
  id: number;
  ref: string;
  userId: string | null;
  email: string;
  status: OrderStatus;
  shipTo: Address;
  shippingMethod: string;
  shippingName: string;
  acknowledgements: string[];
  goodsMinor: number;
  shippingMinor: number;
  taxBasisPoints: number;
  taxMinor: number;
  totalMinor: number;
  reservedUntil: Date | null;
  shipBy: Date | null;
  claimedBy: string | null;
  claimedByName: string | null;
  placedAt: Date;
  paidAt: Date | null;
}

const orderColumns = {
  id: 'orders.id',
  ref: 'orders.ref',
  userId: 'orders.user_id',
  email: 'orders.email',
  status: 'orders.status',
  shipTo: 'orders.ship_to',
  shippingMethod: 'orders.shipping_method',
  shippingName: 'orders.shipping_name',
  acknowledgements: 'orders.acknowledgements',
  goodsMinor: 'orders.goods_minor',
  shippingMinor: 'orders.shipping_minor',
  taxBasisPoints: 'orders.tax_basis_points',
  taxMinor: 'orders.tax_minor',
  totalMinor: 'orders.total_minor',
  reservedUntil: 'orders.reserved_until',
  shipBy: 'orders.ship_by',
  claimedBy: 'orders.claimed_by',
  claimedByName: 'claimer.name',
  placedAt: 'orders.placed_at',
  paidAt: 'orders.paid_at',
};

function orders(db: Database) {
  return db('orders').leftJoin('users as claimer', 'claimer.id', 'orders.claimed_by');
}

export interface NewOrder {
  userId: string | null;
  basketId: string | null;
  email: string;
  shipTo: Address;
  shippingMethod: string;
  shippingName: string;
  acknowledgements: string[];
  goodsMinor: number;
  shippingMinor: number;
  taxBasisPoints: number;
  taxMinor: number;
  reservedUntil: Date;
  placedAt: Date;
}

/** Adds an order that waits for payment, with the next number of the shop's own. */
export async function addOrder(
  db: Database,
  order: NewOrder,
): Promise<{ id: number; ref: string }> {
  const [row] = await db('orders')
    .insert({
      ref: db.raw(`'TQ-' || nextval('order_number')`),
      user_id: order.userId,
      basket_id: order.basketId,
      email: order.email,
      status: 'awaiting_payment',
      ship_to: JSON.stringify(order.shipTo),
      shipping_method: order.shippingMethod,
      shipping_name: order.shippingName,
      acknowledgements: order.acknowledgements,
      currency: 'EUR',
      goods_minor: order.goodsMinor,
      shipping_minor: order.shippingMinor,
      tax_basis_points: order.taxBasisPoints,
      tax_minor: order.taxMinor,
      total_minor: order.goodsMinor + order.shippingMinor,
      reserved_until: order.reservedUntil,
      placed_at: order.placedAt,
    })
    .returning(['id', 'ref']);
  return { id: row.id, ref: row.ref };
}

export interface NewOrderLine {
  lineNo: number;
  packId: string;
  quantity: number;
  unitGrossMinor: number;
  lineTaxMinor: number;
  parts: { role: string; partId: number; quantity: number }[];
}

/** Adds a line with the parts it needs in all. */
export async function addOrderLine(
  db: Database,
  orderId: number,
  line: NewOrderLine,
): Promise<void> {
  const [row] = await db('order_lines')
    .insert({
      order_id: orderId,
      line_no: line.lineNo,
      pack_id: line.packId,
      quantity: line.quantity,
      unit_gross_minor: line.unitGrossMinor,
      line_gross_minor: line.unitGrossMinor * line.quantity,
      line_tax_minor: line.lineTaxMinor,
    })
    .returning('id');
  await db('order_parts').insert(
    line.parts.map((part) => ({
      order_line_id: row.id,
      role: part.role,
      part_id: part.partId,
      quantity: part.quantity,
    })),
  );
}

export interface OrderLineRow extends FrozenPack {
  id: string;
  orderId: number;
  lineNo: number;
  quantity: number;
  unitGrossMinor: number;
  lineGrossMinor: number;
  lineTaxMinor: number;
}

/** The lines of some orders with their frozen packs, in line order. */
export async function linesOfOrders(
  db: Database,
  orderIds: readonly number[],
): Promise<OrderLineRow[]> {
  return db('order_lines')
    .join('packs', 'packs.id', 'order_lines.pack_id')
    .whereIn('order_lines.order_id', orderIds)
    .orderBy(['order_lines.order_id', 'order_lines.line_no'])
    .select({
      id: 'order_lines.id',
      orderId: 'order_lines.order_id',
      lineNo: 'order_lines.line_no',
      quantity: 'order_lines.quantity',
      unitGrossMinor: 'order_lines.unit_gross_minor',
      lineGrossMinor: 'order_lines.line_gross_minor',
      lineTaxMinor: 'order_lines.line_tax_minor',
      identifier: 'packs.identifier',
      token: 'packs.token',
      topology: 'packs.topology',
      sentence: 'packs.sentence',
      brief: 'packs.brief',
      parts: 'packs.parts',
      promise: 'packs.promise',
      cautions: 'packs.cautions',
      strip: 'packs.strip',
      circuit: 'packs.circuit',
    });
}

/** An order by its reference, or null. */
export async function findOrder(db: Database, ref: string): Promise<OrderRow | null> {
  return (await orders(db).where('orders.ref', ref).first(orderColumns)) ?? null;
}

/** An order by reference, its row locked for the rest of the transaction; null when there is none. */
export async function lockOrder(db: Database, ref: string): Promise<OrderRow | null> {
  return readLocked(db, await db('orders').where({ ref }).forUpdate().first('id'));
}

/** As lockOrder, by id. */
export async function lockOrderById(db: Database, id: number): Promise<OrderRow | null> {
  return readLocked(db, await db('orders').where({ id }).forUpdate().first('id'));
}

/** Reads after the lock is had: a join beside it would still show who claimed before the wait. */
async function readLocked(db: Database, row: { id: number } | undefined): Promise<OrderRow | null> {
  if (!row) return null;
  return (await orders(db).where('orders.id', row.id).first(orderColumns)) ?? null;
}

export interface StatusChange {
  status: OrderStatus;
  claimedBy?: string | null;
  paidAt?: Date;
  shipBy?: Date;
  reservedUntil?: Date | null;
}

/** Moves an order to a status and whatever changes with it. */
export async function setStatus(
  db: Database,
  orderId: number,
  change: StatusChange,
): Promise<void> {
  const columns: Record<string, unknown> = { status: change.status };
  if (change.claimedBy !== undefined) {
    columns.claimed_by = change.claimedBy;
    columns.claimed_at = change.claimedBy === null ? null : db.fn.now();
  }
  if (change.paidAt !== undefined) columns.paid_at = change.paidAt;
  if (change.shipBy !== undefined) columns.ship_by = change.shipBy;
  if (change.reservedUntil !== undefined) columns.reserved_until = change.reservedUntil;
  await db('orders').where({ id: orderId }).update(columns);
}

export interface OrderEventRow {
  at: Date;
  who: string;
  what: string;
  from: string | null;
  to: string | null;
}

/** Writes a line of the order's own ledger. */
export async function addOrderEvent(
  db: Database,
  orderId: number,
  event: OrderEventRow,
): Promise<void> {
  await db('order_events').insert({
    order_id: orderId,
    at: event.at,
    who: event.who,
    what: event.what,
    from_status: event.from,
    to_status: event.to,
  });
}

/** The lines of an order's own ledger, oldest first. */
export async function orderEvents(db: Database, orderId: number): Promise<OrderEventRow[]> {
  return db('order_events')
    .where({ order_id: orderId })
    .orderBy('id')
    .select('at', 'who', 'what', 'from_status as from', 'to_status as to');
}

export interface OrdersFilter {
  userId?: string;
  statuses?: readonly OrderStatus[];
  search?: string | undefined;
  order: 'newest' | 'ship-by';
  page: number;
  pageSize: number;
}

/** A page of orders. The search looks at reference, e-mail, name and place of delivery. */
export async function listOrders(
  db: Database,
  filter: OrdersFilter,
): Promise<{ orders: OrderRow[]; total: number }> {
  const matching = orders(db).modify((query) => {
    if (filter.userId !== undefined) query.where('orders.user_id', filter.userId);
    if (filter.statuses) query.whereIn('orders.status', filter.statuses);
    if (filter.search) {
      const pattern = `%${filter.search.replace(/[\\%_]/g, '\\$&')}%`;
      query.where((either) => {
        either
          .whereILike('orders.ref', pattern)
          .orWhereILike('orders.email', pattern)
          .orWhereRaw(`orders.ship_to->>'name' ilike ?`, [pattern])
          .orWhereRaw(`orders.ship_to->>'city' ilike ?`, [pattern]);
      });
    }
  });
  const [{ total }] = (await matching.clone().count({ total: '*' })) as [{ total: number }];
  const rows = await matching
    .clone()
    .orderByRaw(
      filter.order === 'newest'
        ? 'orders.placed_at desc, orders.id desc'
        : 'orders.ship_by asc nulls last, orders.id asc',
    )
    .limit(filter.pageSize)
    .offset((filter.page - 1) * filter.pageSize)
    .select(orderColumns);
  return { orders: rows, total };
}

/** Orders whose time to pay ran out, oldest first. */
export async function overdueOrders(db: Database, now: Date, limit: number): Promise<OrderRow[]> {
  return orders(db)
    .where('orders.status', 'awaiting_payment')
    .where('orders.reserved_until', '<=', now)
    .orderBy('orders.reserved_until')
    .limit(limit)
    .select(orderColumns);
}

/** What all lines of an order need, by part. */
export async function partsOfOrder(
  db: Database,
  orderId: number,
): Promise<{ partId: number; quantity: number; role: string; lineId: string }[]> {
  return db('order_parts')
    .join('order_lines', 'order_lines.id', 'order_parts.order_line_id')
    .where('order_lines.order_id', orderId)
    .orderBy('order_parts.id')
    .select(
      'order_parts.part_id as partId',
      'order_parts.quantity',
      'order_parts.role',
      'order_lines.id as lineId',
    );
}

/** What the desk opens on: how many wait, how many are late, and what was sold since a moment. */
export async function ordersToday(
  db: Database,
  now: Date,
  since: Date,
): Promise<{ waiting: number; late: number; soldMinor: number }> {
  const [row] = (await db('orders').select(
    db.raw(`count(*) filter (where status in ('paid', 'picking', 'packed')) as waiting`),
    db.raw(
      `count(*) filter (where status in ('paid', 'picking', 'packed') and ship_by < ?) as late`,
      [now],
    ),
    db.raw(
      `coalesce(sum(total_minor) filter (where paid_at >= ? and status <> 'refunded'), 0)::bigint as "soldMinor"`,
      [since],
    ),
  )) as [{ waiting: number; late: number; soldMinor: number }];
  return row;
}
