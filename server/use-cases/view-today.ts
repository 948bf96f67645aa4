import type { DeskToday } from '../contracts/desk.ts';
import { ledgerLine } from '../domain/ledger-text.ts';
import { money } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import { listOrders, ordersToday } from '../store/orders.ts';
import { listDeskParts } from '../store/parts.ts';
import { newestLedger } from '../store/stock.ts';

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
