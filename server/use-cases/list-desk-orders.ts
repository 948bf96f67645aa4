import type { DeskOrdersPage } from '../contracts/desk.ts';
import type { OrderStatus } from '../contracts/orders.ts';
import { money } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import { linesOfOrders, listOrders } from '../store/orders.ts';
import { summariseKits } from './view-order.ts';

/** A page of orders, newest first. */
export async function listDeskOrders(
  deps: Pick<Deps, 'db'>,
  filter: {
    search?: string | undefined;
    status?: OrderStatus | undefined;
    page: number;
    pageSize: number;
  },
): Promise<DeskOrdersPage> {
  const { status, ...rest } = filter;
  const { orders, total } = await listOrders(deps.db, {
    ...rest,
    ...(status ? { statuses: [status] } : {}),
    order: 'newest',
  });
  const lines = await linesOfOrders(
    deps.db,
    orders.map((order) => order.id),
  );
  const items = orders.map((order) => {
    return {
      ref: order.ref,
      status: order.status,
      placedAt: order.placedAt.toISOString(),
      email: order.email,
      name: order.shipTo.name,
      ...summariseKits(lines, order.id),
      total: money(order.totalMinor),
    };
  });
  return { items, page: filter.page, pageSize: filter.pageSize, total };
}
