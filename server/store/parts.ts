import type { Client } from 'pg';
import type { DeskPartsQuery } from '../contracts/desk.ts';
import type { Mounting } from '../contracts/common.ts';
import type { PartKind } from '../contracts/parts.ts';
import type { CataloguePart, LotFacts, PartFacts } from '../domain/catalogue.ts';
import type { Database } from './connection.ts';

interface PartRow {
  id: number;
  sku: string;
  kind: PartKind;
  name: string;
  mounting: Mounting;
  active: boolean;
  cost_minor: number;
  price_minor: number;
  grams: number;
  on_hand: number;
  reserved: number;
  lots: LotFacts[] | null;
  [column: string]: unknown;
}

/** Columns of a kind, as [fact, column]. */
const factColumns: Record<PartKind, readonly (readonly [string, string])[]> = {
  resistor: columns('ohms', 'tolerance', 'temperatureCoefficientPerKelvin', 'ratedWatts'),
  trimmer: columns('ohms', 'tolerance', 'temperatureCoefficientPerKelvin'),
  capacitor: columns(
    'farads',
    'tolerance',
    'dielectric',
    'ratedVolts',
    'temperatureCoefficientPerKelvin',
    'temperatureSpread',
    'insulationSeconds',
    'leakageAmps',
    'biasHalvingVolts',
    'polarised',
  ),
  comparator: columns(
    'output',
    'sections',
    'delayLowHighSeconds',
    'delayHighLowSeconds',
    'maxDelaySeconds',
    'inputBiasAmps',
    'maxInputBiasAmps',
    'offsetVolts',
    'maxOffsetVolts',
    'hysteresisVolts',
    'highOhms',
    'lowOhms',
    'maxOutputAmps',
    'quiescentAmps',
    'maxQuiescentAmps',
  ),
  led: columns('colour', 'forwardVolts', 'minForwardVolts', 'maxForwardVolts', 'maxAmps'),
  diode: columns(
    'saturationAmps',
    'emissionCoefficient',
    'energyGapElectronVolts',
    'saturationTemperatureExponent',
  ),
  board: columns('sections'),
  battery: columns(
    'cellSize',
    'cells',
    'nominalVolts',
    'freshVolts',
    'emptyVolts',
    'capacityAmpHours',
  ),
  holder: columns('cellSize', 'cells'),
};

function columns(...facts: string[]): [string, string][] {
  return facts.map((fact) => [
    fact,
    fact.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`),
  ]);
}

function toPart(row: PartRow): CataloguePart {
  const facts: Record<string, unknown> = { kind: row.kind, sku: row.sku, name: row.name };
  for (const [fact, column] of factColumns[row.kind]) facts[fact] = row[column];
  if (row.kind === 'comparator') {
    facts.supplyVolts = { min: row.supply_min_volts, max: row.supply_max_volts };
  }
  return {
    id: row.id,
    kind: row.kind,
    mounting: row.mounting,
    active: row.active,
    costMinor: row.cost_minor,
    priceMinor: row.price_minor,
    grams: row.grams,
    onHand: row.on_hand,
    reserved: row.reserved,
    available: row.on_hand - row.reserved,
    lots: row.lots ?? [],
    facts: facts as PartFacts,
  };
}

/** Every part, or the named ones, with the stock of its lots; the base of all reads below. */
function partsWithStock(db: Database, ids?: readonly number[]) {
  const stock = db('lots')
    .select('part_id')
    .sum({ on_hand: 'on_hand', reserved: 'reserved' })
    .select(
      db.raw(`
        json_agg(json_build_object('id', id, 'available', on_hand - reserved,
          'measuredMean', measured_mean, 'measuredDeviation', measured_deviation,
          'measuredCount', measured_count) order by received_on, id)
          filter (where on_hand > reserved) as lots`),
    )
    .groupBy('part_id')
    .as('stock');
  const parts = db('parts')
    .leftJoin(stock, 'stock.part_id', 'parts.id')
    .select('parts.*', 'stock.lots')
    .select(db.raw('coalesce(stock.on_hand, 0)::int as on_hand'))
    .select(db.raw('coalesce(stock.reserved, 0)::int as reserved'));
  if (ids === undefined) return parts;
  // Named on both sides of the join: the planner does not carry a list into an aggregate.
  stock.whereRaw('part_id = any(?)', [[...ids]]);
  return parts.whereRaw('parts.id = any(?)', [[...ids]]);
}

/**
 * The active parts with their stock, ascending by id, all of them or those named: facts and
 * quantities of one snapshot. `through` reads over that connection instead of the pool's.
 */
export async function loadCatalogue(
  db: Database,
  ids?: readonly number[],
  through?: Client,
): Promise<CataloguePart[]> {
  const query = partsWithStock(db, ids).where('parts.active', true).orderBy('parts.id');
  const rows: PartRow[] = await (through ? query.connection(through) : query);
  return rows.map(toPart);
}

/** The named parts, retired ones too, in no particular order. */
export async function findParts(db: Database, ids: readonly number[]): Promise<CataloguePart[]> {
  const rows: PartRow[] = await partsWithStock(db, ids);
  return rows.map(toPart);
}

/** The named parts as listed: a page is chosen first, so that lots are gathered for its parts alone. */
async function partsInOrder(db: Database, ids: readonly number[]): Promise<CataloguePart[]> {
  const found = new Map((await findParts(db, ids)).map((part) => [part.id, part]));
  return ids.flatMap((id) => found.get(id) ?? []);
}

/** One part by id, or null. */
export async function findPart(db: Database, id: number): Promise<CataloguePart | null> {
  const [part] = await findParts(db, [id]);
  return part ?? null;
}

export interface PartsFilter {
  kind?: PartKind | undefined;
  mounting?: Mounting | undefined;
  page: number;
  pageSize: number;
}

/** A page of the public catalogue, ascending by id. */
export async function listPublicParts(
  db: Database,
  filter: PartsFilter,
): Promise<{ parts: CataloguePart[]; total: number }> {
  const matching = db('parts')
    .where('parts.active', true)
    .modify((query) => {
      if (filter.kind) query.where('parts.kind', filter.kind);
      if (filter.mounting) query.where('parts.mounting', filter.mounting);
    });
  const [{ total }] = (await matching.clone().count({ total: '*' })) as [{ total: number }];
  const ids: number[] = await matching
    .clone()
    .orderBy('parts.id')
    .limit(filter.pageSize)
    .offset((filter.page - 1) * filter.pageSize)
    .pluck('parts.id');
  return { parts: await partsInOrder(db, ids), total };
}

/** A part runs low below this many unreserved pieces. */
export const lowStockBelow = 10;

const sortColumns: Record<NonNullable<DeskPartsQuery['sort']>, string> = {
  sku: 'sku',
  name: 'name',
  value: 'coalesce(ohms, farads, forward_volts, nominal_volts)',
  price: 'price_minor',
  onHand: 'on_hand',
  available: '(on_hand - reserved)',
};

export interface DeskPartsFilter {
  search?: string | undefined;
  kind?: PartKind | undefined;
  mounting?: Mounting | undefined;
  stock: 'all' | 'in' | 'low' | 'out';
  sort: NonNullable<DeskPartsQuery['sort']>;
  direction: 'up' | 'down';
  page: number;
  pageSize: number;
}

/** A page of parts for the desk, searched by SKU, name and bin, filtered and sorted. */
export async function listDeskParts(
  db: Database,
  filter: DeskPartsFilter,
): Promise<{ parts: CataloguePart[]; total: number }> {
  const matching = db.from(partsWithStock(db).as('p')).modify((query) => {
    if (filter.kind) query.where('kind', filter.kind);
    if (filter.mounting) query.where('mounting', filter.mounting);
    if (filter.stock === 'in') query.whereRaw('on_hand - reserved > 0');
    if (filter.stock === 'low')
      query.whereRaw('on_hand - reserved between 1 and ?', [lowStockBelow - 1]);
    if (filter.stock === 'out') query.whereRaw('on_hand - reserved <= 0');
    if (filter.search) matchSearch(query, db, filter.search);
  });
  const [{ total }] = (await matching.clone().count({ total: '*' })) as [{ total: number }];
  const direction = filter.direction === 'up' ? 'asc' : 'desc';
  const ids: number[] = await matching
    .clone()
    .orderByRaw(`${sortColumns[filter.sort]} ${direction} nulls last, id asc`)
    .limit(filter.pageSize)
    .offset((filter.page - 1) * filter.pageSize)
    .pluck('id');
  return { parts: await partsInOrder(db, ids), total };
}

function matchSearch(query: ReturnType<Database['from']>, db: Database, search: string): void {
  // Names join value and unit by no-break spaces; a typed blank stands for any of them.
  const pattern = `%${search.replace(/[\\%_]/g, '\\$&').replace(/\s+/g, '_')}%`;
  query.where((either) => {
    either
      .whereILike('sku', pattern)
      .orWhereILike('name', pattern)
      .orWhereIn(
        'id',
        db('lots')
          .join('bins', 'bins.id', 'lots.bin_id')
          .whereILike('bins.code', pattern)
          .select('part_id'),
      );
  });
}

/** Sets the net price of a part, in minor units. */
export async function setPrice(db: Database, partId: number, priceMinor: number): Promise<void> {
  await db('parts').where({ id: partId }).update({ price_minor: priceMinor });
}

/** Takes the part's row lock for the rest of the transaction. */
export async function lockPart(
  db: Database,
  partId: number,
): Promise<{ priceMinor: number } | null> {
  const row = await db('parts').where({ id: partId }).forUpdate().first('price_minor');
  return row ? { priceMinor: row.price_minor } : null;
}
