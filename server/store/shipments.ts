import type { Database } from './connection.ts';

export interface ShipmentRow {
  carrier: string;
  tracking: string;
  shippedAt: Date;
}

/** Records that an order left. */
export async function addShipment(
  db: Database,
  orderId: number,
  shipment: ShipmentRow & { shippedBy: string | null },
): Promise<void> {
  await db('shipments').insert({
    order_id: orderId,
    carrier: shipment.carrier,
    tracking: shipment.tracking,
    shipped_at: shipment.shippedAt,
    shipped_by: shipment.shippedBy,
  });
}

/** The shipment of an order, or null. */
export async function findShipment(db: Database, orderId: number): Promise<ShipmentRow | null> {
  const row = await db('shipments')
    .where({ order_id: orderId })
    .first('carrier', 'tracking', 'shipped_at as shippedAt');
  return row ?? null;
}
