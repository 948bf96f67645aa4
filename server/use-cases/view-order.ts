import type { Order, OrderSummary } from '../contracts/orders.ts';
import type { Page } from '../contracts/common.ts';
import { money } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import type { Database } from '../store/connection.ts';
import {
  findOrder,
  linesOfOrders,
  listOrders,
  orderEvents,
  type OrderLineRow,
  type OrderRow,
} from '../store/orders.ts';
import { findShipment } from '../store/shipments.ts';
import { paymentsOfOrder, refundsOfOrder } from '../store/payments.ts';
import { Refusal } from './refusal.ts';

/** Who asks: a signed-in user, or a guest with the token from the mail; either may be absent. */
export interface OrderReader {
  userId: string | null;
  token: string | null;
}

/** The order, if it is the reader's; otherwise as if there were none. */
export async function requireOwnOrder(
  deps: Pick<Deps, 'db' | 'signer'>,
  reader: OrderReader,
  ref: string,
): Promise<OrderRow> {
  const order = await findOrder(deps.db, ref);
  const owns = order !== null && order.userId !== null && order.userId === reader.userId;
  const holdsToken = reader.token !== null && reader.token === deps.signer.orderToken(ref);
  if (order === null || !(owns || holdsToken)) {
    throw new Refusal(
      'not-found',
      'There is no such order here. Open it by the link in the mail, or sign in as the one who ordered.',
    );
  }
  return order;
}

/** One order in full, as its buyer sees it. */
export async function viewOrder(
  deps: Pick<Deps, 'db' | 'signer'>,
  reader: OrderReader,
  ref: string,
): Promise<Order> {
  return describeOrder(deps.db, await requireOwnOrder(deps, reader, ref));
}

/** Gathers everything about an order. */
export async function describeOrder(db: Database, order: OrderRow): Promise<Order> {
  const [lines, events, shipment, payments, refunds] = await Promise.all([
    linesOfOrders(db, [order.id]),
    orderEvents(db, order.id),
    findShipment(db, order.id),
    paymentsOfOrder(db, order.id),
    refundsOfOrder(db, order.id),
  ]);
  const open = payments.find((payment) => payment.status === 'open');
  const refunded = refunds
    .filter((refund) => refund.status === 'done')
    .reduce((sum, refund) => sum + refund.amountMinor, 0);
  return {
    ref: order.ref,
    status: order.status,
    email: order.email,
    placedAt: order.placedAt.toISOString(),
    reservedUntil: order.reservedUntil?.toISOString() ?? null,
    shipBy: order.shipBy?.toISOString() ?? null,
    shippingAddress: order.shipTo,
    shippingMethod: { code: order.shippingMethod, name: order.shippingName },
    lines: lines.map((line) => describeLine(order.ref, line)),
    goods: money(order.goodsMinor),
    shipping: money(order.shippingMinor),
    tax: money(order.taxMinor),
    total: money(order.totalMinor),
    refunded: money(refunded),
    paymentUrl: order.status === 'awaiting_payment' ? (open?.paymentUrl ?? null) : null,
    shipment: shipment && { ...shipment, shippedAt: shipment.shippedAt.toISOString() },
    events: events.map((event) => ({ ...event, at: event.at.toISOString() })),
  };
}

function describeLine(ref: string, line: OrderLineRow): Order['lines'][number] {
  return {
    id: line.id,
    sentence: line.sentence,
    quantity: line.quantity,
    unitPrice: money(line.unitGrossMinor),
    total: money(line.lineGrossMinor),
    parts: line.parts,
    promise: line.promise,
    cautions: line.cautions,
    strip: line.strip,
    identifier: line.identifier,
    buildSheetPath: `/orders/${ref}/lines/${line.id}/build-sheet`,
  };
}

/** A page of the signed-in buyer's orders, newest first. */
export async function listMyOrders(
  deps: Pick<Deps, 'db'>,
  userId: string,
  page: { page: number; pageSize: number },
): Promise<Page<OrderSummary>> {
  const { orders, total } = await listOrders(deps.db, { userId, order: 'newest', ...page });
  const lines = await linesOfOrders(
    deps.db,
    orders.map((order) => order.id),
  );
  const items = orders.map((order) => {
    return {
      ref: order.ref,
      status: order.status,
      placedAt: order.placedAt.toISOString(),
      total: money(order.totalMinor),
      ...summariseKits(lines, order.id),
      strip: lines.find((line) => line.orderId === order.id)?.strip ?? null,
    };
  });
  return { items, ...page, total };
}

/** What a list says of one order's kits: how many, and the first line's sentence. */
export function summariseKits(
  lines: readonly OrderLineRow[],
  orderId: number,
): { kits: number; sentence: string } {
  const own = lines.filter((line) => line.orderId === orderId);
  return {
    kits: own.reduce((sum, line) => sum + line.quantity, 0),
    sentence: sentenceOfLines(own),
  };
}

/** The first line's sentence, and how many more there are. */
function sentenceOfLines(lines: readonly { sentence: string }[]): string {
  const more = lines.length - 1;
  const first = lines[0]?.sentence ?? '';
  return more > 0 ? `${first}, and ${more} more ${more === 1 ? 'pack' : 'packs'}` : first;
}
