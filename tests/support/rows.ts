import type { Knex } from 'knex';

/** Rows for tests of the store, each complete and each with a name of its own. */
let count = 0;

export async function addBin(db: Knex): Promise<number> {
  count += 1;
  const code = `Z-${String(count).padStart(2, '0')}`;
  const [row] = await db('bins').insert({ code, walk_order: count, place: 'Test' }).returning('id');
  return row.id;
}

export async function addResistor(db: Knex, change: object = {}): Promise<number> {
  count += 1;
  const [row] = await db('parts')
    .insert({
      sku: `TEST-${count}`,
      kind: 'resistor',
      name: 'Resistor',
      mounting: 'through-hole',
      cost_minor: 1,
      price_minor: 4,
      ohms: 1000,
      tolerance: 0.01,
      temperature_coefficient_per_kelvin: 5e-5,
      rated_watts: 0.25,
      ...change,
    })
    .returning('id');
  return row.id;
}

export async function addLot(db: Knex, partId: number): Promise<{ id: number; partId: number }> {
  count += 1;
  const bin = await db('bins').first('id');
  const [row] = await db('lots')
    .insert({ part_id: partId, bin_id: bin.id, code: `L${count}`, received_on: '2026-01-01' })
    .returning('id');
  return { id: row.id, partId };
}

/** Posts an entry to the stock ledger. */
export async function post(
  db: Knex,
  lotId: number,
  delta: number,
  reason: string,
  orderId: number | null = null,
): Promise<void> {
  await db('stock_ledger').insert({
    lot_id: lotId,
    delta,
    balance: 0,
    reason,
    order_id: orderId,
    actor_name: 'Test',
  });
}

/** An order of 2.90 that waits for payment. */
export async function addOrderRow(db: Knex, change: object = {}): Promise<number> {
  const [row] = await db('orders')
    .insert({
      ref: db.raw(`'TQ-' || nextval('order_number')`),
      email: 'tove@marlin.example',
      status: 'awaiting_payment',
      ship_to: '{}',
      shipping_method: 'standard',
      shipping_name: 'Letter',
      currency: 'EUR',
      goods_minor: 0,
      shipping_minor: 290,
      tax_basis_points: 2300,
      tax_minor: 54,
      total_minor: 290,
      reserved_until: new Date(Date.now() + 3_600_000),
      placed_at: new Date(),
      ...change,
    })
    .returning('id');
  return row.id;
}
