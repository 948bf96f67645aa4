import type { QueueItem } from '../contracts/bench.ts';
import type { Page } from '../contracts/common.ts';
import type { Deps } from '../ports.ts';
import { linesOfOrders, listOrders } from '../store/orders.ts';
import { stopsOfOrders } from '../store/stock.ts';
import type { Packer } from './bench-order.ts';
import { summariseKits } from './view-order.ts';

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
  const [lines, stops] = await Promise.all([
    linesOfOrders(deps.db, ids),
    stopsOfOrders(deps.db, ids),
  ]);
  const now = deps.clock.now();
  const items = orders.map((order) => {
    const shipBy = order.shipBy ?? order.placedAt;
    return {
      ref: order.ref,
      status: order.status,
      shipBy: shipBy.toISOString(),
      late: shipBy < now,
      ...summariseKits(lines, order.id),
      stops: stops.get(order.id) ?? 0,
      shippingMethod: order.shippingName,
      claimedBy: order.claimedByName,
      mine: order.claimedBy === packer.id,
    };
  });
  return { items, ...page, total };
}
