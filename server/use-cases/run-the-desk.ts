import type {
  AuditPage,
  DeskOrder,
  DeskOrdersPage,
  DeskPart,
  DeskPartsPage,
  DeskToday,
  PartHistory,
} from '../contracts/desk.ts';
import type { OrderStatus } from '../contracts/orders.ts';
import { auditText } from '../domain/audit-text.ts';
import type { CataloguePart } from '../domain/catalogue.ts';
import { money } from '../domain/money.ts';
import { holdsStock } from '../domain/order-state.ts';
import type { Deps } from '../ports.ts';
import { auditOf, listAudit } from '../store/audit.ts';
import { findOrder, linesOfOrders, listOrders, ordersToday } from '../store/orders.ts';
import { findPart, listDeskParts, type DeskPartsFilter } from '../store/parts.ts';
import { paymentsOfOrder, refundsOfOrder } from '../store/payments.ts';
import { lotsOfParts, newestLedger, type LedgerRow, type LotRow } from '../store/stock.ts';
import { toPublicPart } from './list-parts.ts';
import { refundableMinor } from './refund-order.ts';
import { Refusal } from './refusal.ts';
import { describeOrder, sentenceOfLines } from './view-order.ts';

function toDeskPart(part: CataloguePart, lots: readonly LotRow[]): DeskPart {
  return {
    id: String(part.id),
    part: toPublicPart(part),
    cost: money(part.costMinor),
    onHand: part.onHand,
    reserved: part.reserved,
    active: part.active,
    lots: lots
      .filter((lot) => lot.partId === part.id)
      .map((lot) => ({
        id: String(lot.id),
        code: lot.code,
        bin: lot.bin,
        onHand: lot.onHand,
        reserved: lot.reserved,
        receivedOn: lot.receivedOn,
      })),
  };
}

/** A page of parts with cost, stock and lots. */
export async function listDeskPartsPage(
  deps: Pick<Deps, 'db'>,
  filter: DeskPartsFilter,
): Promise<DeskPartsPage> {
  const { parts, total } = await listDeskParts(deps.db, filter);
  const lots = await lotsOfParts(deps.db, parts.map((part) => part.id));
  return {
    items: parts.map((part) => toDeskPart(part, lots)),
    page: filter.page,
    pageSize: filter.pageSize,
    total,
  };
}

/** One part with cost, stock and lots. */
export async function viewDeskPart(deps: Pick<Deps, 'db'>, id: number): Promise<DeskPart> {
  const part = await findPart(deps.db, id);
  if (part === null) throw new Refusal('not-found', 'The catalogue has no such part.');
  return toDeskPart(part, await lotsOfParts(deps.db, [id]));
}

const reasonWords: Record<LedgerRow['reason'], string> = {
  opening: 'Opening stock',
  counted: 'Counted',
  received: 'Received',
  damaged: 'Damaged',
  lost: 'Lost',
  found: 'Found',
  returned: 'Returned',
  shipped: 'Shipped',
};

function ledgerLine(row: LedgerRow, withPart: boolean) {
  const what = [withPart ? row.partName : '', reasonWords[row.reason], row.orderRef ?? '', row.note ?? '']
    .filter((text) => text !== '')
    .join(', ');
  return { at: row.at.toISOString(), who: row.who, what, lot: row.lot, bin: row.bin, from: row.from, to: row.to };
}

/** What happened to a part: its stock ledger and its lines in the audit log. */
export async function viewPartHistory(deps: Pick<Deps, 'db'>, id: number): Promise<PartHistory> {
  const part = await findPart(deps.db, id);
  if (part === null) throw new Refusal('not-found', 'The catalogue has no such part.');
  const [ledger, audit] = await Promise.all([
    newestLedger(deps.db, 200, id),
    auditOf(deps.db, 'part', part.facts.sku),
  ]);
  return {
    ledger: ledger.map((row) => ledgerLine(row, false)),
    audit: audit.map((row) => ({
      at: row.at.toISOString(),
      who: row.who,
      what: [row.action, row.note].filter(Boolean).join(': '),
      from: auditText(row.before),
      to: auditText(row.after),
    })),
  };
}

/** A page of orders, newest first. */
export async function listDeskOrders(
  deps: Pick<Deps, 'db'>,
  filter: { search?: string | undefined; status?: OrderStatus | undefined; page: number; pageSize: number },
): Promise<DeskOrdersPage> {
  const { status, ...rest } = filter;
  const { orders, total } = await listOrders(deps.db, {
    ...rest,
    ...(status ? { statuses: [status] } : {}),
    order: 'newest',
  });
  const lines = await linesOfOrders(deps.db, orders.map((order) => order.id));
  const items = orders.map((order) => {
    const own = lines.filter((line) => line.orderId === order.id);
    return {
      ref: order.ref,
      status: order.status,
      placedAt: order.placedAt.toISOString(),
      email: order.email,
      name: order.shipTo.name,
      kits: own.reduce((sum, line) => sum + line.quantity, 0),
      total: money(order.totalMinor),
      sentence: sentenceOfLines(own),
    };
  });
  return { items, page: filter.page, pageSize: filter.pageSize, total };
}

/** One order with its payments and what may be refunded. */
export async function viewDeskOrder(deps: Pick<Deps, 'db'>, ref: string): Promise<DeskOrder> {
  const order = await findOrder(deps.db, ref);
  if (order === null) throw new Refusal('not-found', `There is no order ${ref}.`);
  const [base, payments, refunds, refundable] = await Promise.all([
    describeOrder(deps.db, order),
    paymentsOfOrder(deps.db, order.id),
    refundsOfOrder(deps.db, order.id),
    refundableMinor(deps.db, order.id),
  ]);
  return {
    ...base,
    payments: [
      ...payments.map((payment) => ({
        at: payment.createdAt.toISOString(),
        what: 'Card payment',
        amount: money(payment.amountMinor),
        status: payment.status,
        reference: payment.intentId ?? payment.sessionId,
      })),
      ...refunds.map((refund) => ({
        at: refund.createdAt.toISOString(),
        what: `Refund: ${refund.reason} (${refund.actorName})`,
        amount: money(-refund.amountMinor),
        status: refund.status,
        reference: refund.refundId ?? 'asked for',
      })),
    ],
    refundable: money(refundable),
    stockNote: holdsStock(order.status)
      ? 'A refund puts the parts back on the shelf.'
      : 'The parts have left or are free already; a refund moves no stock.',
  };
}

/** A page of the audit log. */
export async function listAuditPage(
  deps: Pick<Deps, 'db'>,
  filter: { search?: string | undefined; page: number; pageSize: number },
): Promise<AuditPage> {
  const { rows, total } = await listAudit(deps.db, filter);
  return {
    items: rows.map((row) => ({
      at: row.at.toISOString(),
      who: row.who,
      what: row.action,
      subject: `${row.subjectKind} ${row.subjectId}`,
      from: auditText(row.before),
      to: auditText(row.after),
      note: row.note,
    })),
    page: filter.page,
    pageSize: filter.pageSize,
    total,
  };
}

/** What the owner sees first: what waits, what runs out, what needs a decision. */
export async function viewToday(deps: Pick<Deps, 'db' | 'clock'>): Promise<DeskToday> {
  const now = deps.clock.now();
  const midnight = new Date(now);
  midnight.setUTCHours(0, 0, 0, 0);
  const byAvailable = { sort: 'available', direction: 'up', page: 1 } as const;
  const [today, low, out, held, ledger] = await Promise.all([
    ordersToday(deps.db, now, midnight),
    listDeskParts(deps.db, { ...byAvailable, stock: 'low', pageSize: 8 }),
    listDeskParts(deps.db, { ...byAvailable, stock: 'out', pageSize: 1 }),
    listOrders(deps.db, { statuses: ['on_hold'], order: 'newest', page: 1, pageSize: 5 }),
    newestLedger(deps.db, 10),
  ]);
  const decisions = [
    ...held.orders.map((order) => ({
      when: 'now',
      text: `${order.ref} is on hold: paid, but its parts or its amount need a decision.`,
      path: `/desk/orders/${order.ref}`,
      action: 'See the order',
    })),
    ...(today.late > 0
      ? [
          {
            when: 'now',
            text: `${today.late} ${today.late === 1 ? 'order is' : 'orders are'} past the ship-by time.`,
            path: '/bench',
            action: 'See the queue',
          },
        ]
      : []),
    ...low.parts.slice(0, 4).map((part) => ({
      when: 'soon',
      text: `${part.facts.name} runs out: ${part.available} left.`,
      path: `/desk/parts/${part.id}`,
      action: 'See the part',
    })),
  ];
  return {
    waiting: today.waiting,
    late: today.late,
    soldToday: money(today.soldMinor),
    outOfStock: out.total,
    lowStock: low.parts.map((part) => ({
      id: String(part.id),
      sku: part.facts.sku,
      name: part.facts.name,
      available: part.available,
    })),
    decisions,
    ledger: ledger.map((row) => ledgerLine(row, true)),
  };
}
