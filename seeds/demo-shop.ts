import { hashPassword } from '../server/use-cases/password-hash.ts';
import type { Knex } from 'knex';
import { demoCatalogue, type DemoPart } from './demo-catalogue.ts';

/** Sign-ins of the demonstration shop; invented people. */
export const demoPeople = [
  { email: 'maker@tockwell.example', name: 'Fenna Orrick', role: 'customer' },
  { email: 'packer@tockwell.example', name: 'Ivo Brandreth', role: 'packer' },
  { email: 'second-packer@tockwell.example', name: 'Sanne Quill', role: 'packer' },
  { email: 'owner@tockwell.example', name: 'Maud Tarrow', role: 'owner' },
] as const;
export const demoPassword = 'merrow-quay-demo';

const places: Record<string, string> = {
  A: 'Front counter, boards and chips',
  B: 'Front counter, chips on strips',
  C: 'Long wall, carbon drawers',
  D: 'Long wall, metal film drawers',
  E: 'Long wall, precision drawers',
  F: 'Window bench, ceramic trays',
  G: 'Reel rack, chip resistors',
  H: 'Reel rack, precision chips',
  J: 'Window bench, polypropylene trays',
  K: 'Window bench, polyester trays',
  L: 'Window bench, decoupling',
  M: 'Back room, electrolytics',
  N: 'Reel rack, chip ceramics',
  P: 'Reel rack, chip film',
  Q: 'Reel rack, decoupling',
  R: 'Lamp cabinet',
  S: 'Back room, power',
  T: 'Loft, second lots',
  U: 'Window bench, trimmers',
};

/**
 * Fills the demonstration shop: people, bins, parts, lots and their opening entries in the ledger.
 * Runs once; a shop that has any part is left alone. Returns whether it filled anything.
 */
export async function seedDemoShop(db: Knex): Promise<boolean> {
  return db.transaction(async (trx) => {
    // Two processes may start on one empty database at the same moment.
    await trx.raw(`select pg_advisory_xact_lock(hashtext('tockwell demo shop'))`);
    if (await trx('parts').first('id')) return false;
    await seedPeople(trx);
    const parts = demoCatalogue();
    const bins = await seedBins(trx, parts);
    await seedParts(trx, parts, bins);
    return true;
  });
}

async function seedPeople(trx: Knex.Transaction): Promise<void> {
  const passwordHash = await hashPassword(demoPassword);
  await trx('users')
    .insert(demoPeople.map((person) => ({ ...person, password_hash: passwordHash })))
    .onConflict('email')
    .ignore();
}

async function seedBins(
  trx: Knex.Transaction,
  parts: readonly DemoPart[],
): Promise<Map<string, number>> {
  const loft = Array.from({ length: 24 }, (_, k) => `T-${String(k + 1).padStart(2, '0')}`);
  const codes = [...new Set([...parts.map((part) => part.bin), ...loft])].sort();
  const rows = await trx('bins')
    .insert(codes.map((code, k) => ({ code, walk_order: 10 * (k + 1), place: places[code[0]!] })))
    .returning(['id', 'code']);
  return new Map(rows.map((row) => [row.code, row.id]));
}

async function seedParts(
  trx: Knex.Transaction,
  parts: readonly DemoPart[],
  bins: ReadonlyMap<string, number>,
): Promise<void> {
  const inserted = await insertAll(
    trx,
    'parts',
    parts.map((part) => part.row),
  );
  const lots = parts.flatMap((part, k) => lotsFor(part, k, inserted[k]!, bins));
  const lotIds = await insertAll(
    trx,
    'lots',
    lots.map((lot) => lot.row),
  );
  const opening = lots
    .map((lot, k) => ({
      lot_id: lotIds[k]!,
      delta: lot.count,
      balance: 0,
      reason: 'opening',
      actor_name: 'Opening stock',
      note: 'Counted when the shop opened',
    }))
    .filter((entry) => entry.delta > 0);
  await trx.batchInsert('stock_ledger', opening, 200);
}

/** Inserts rows in order and returns their ids in the same order. */
async function insertAll(
  trx: Knex.Transaction,
  table: string,
  rows: Record<string, unknown>[],
): Promise<number[]> {
  const inserted = await trx.batchInsert<Record<string, unknown>>(table, rows, 200).returning('id');
  return inserted.map((row) => Number(row.id));
}

const sampleCount = 30;

/**
 * What a sample of a capacitor lot measured, invented and always the same: a mean up to half the
 * tolerance off, pieces scattered by about a ninth of it. Ceramics for decoupling are not sampled.
 */
function sampleOf({ row }: DemoPart, k: number) {
  if (row.kind !== 'capacitor' || row.dielectric === 'X7R') {
    return { measured_mean: null, measured_deviation: null, measured_count: null };
  }
  const [farads, tolerance] = [Number(row.farads), Number(row.tolerance)];
  const off = ((k * 37) % 101) / 100 - 0.5;
  const scatter = 0.08 + ((k * 53) % 61) / 1000;
  return {
    measured_mean: Number((farads * (1 + off * tolerance)).toPrecision(5)),
    measured_deviation: Number((farads * tolerance * scatter).toPrecision(3)),
    measured_count: sampleCount,
  };
}

/** One lot for most parts; every ninth has a second, newer one in the loft. */
function lotsFor(part: DemoPart, k: number, partId: number, bins: ReadonlyMap<string, number>) {
  const month = String(1 + (k % 9)).padStart(2, '0');
  const first = {
    row: {
      part_id: partId,
      bin_id: bins.get(part.bin),
      code: `26${month}-A`,
      received_on: `2026-${month}-12`,
      ...sampleOf(part, k),
    },
    count: part.count,
  };
  if (k % 9 !== 4 || part.count === 0) return [first];
  const bin = `T-${String(1 + (k % 24)).padStart(2, '0')}`;
  const second = {
    row: {
      part_id: partId,
      bin_id: bins.get(bin),
      code: '2610-B',
      received_on: '2026-10-05',
      ...sampleOf(part, k + 400),
    },
    count: Math.ceil(part.count / 3),
  };
  return [{ ...first, count: part.count - second.count + Math.min(second.count, 3) }, second];
}
