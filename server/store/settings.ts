import type { Database } from './connection.ts';

export interface ShopSettings {
  name: string;
  address: string[];
  email: string;
  homeCountry: string;
  /** Net fee per kit, in minor units: bag, build sheet, picking. */
  kitFeeMinor: number;
  /** Net fee per kit for each care level, in minor units. */
  careFeesMinor: Record<'as-stocked' | 'lot-checked' | 'bench-tuned' | 'trimmer-fitted', number>;
  /** Uncertainty of the bench's capacitance meter, as a fraction of the reading. */
  meterUncertainty: number;
  carriers: string[];
}

const neverSeeded = 'The settings are missing: run the migrations with their seeds.';

/** The shop's own details and fees; throws when the database was never seeded. */
export async function shopSettings(db: Database): Promise<ShopSettings> {
  const row = await db('settings').where({ name: 'shop' }).first('value');
  if (!row) throw new Error(neverSeeded);
  return row.value;
}

/** The shop's details with the tax rate of its own country, zero where none is kept. */
export async function homeTerms(
  db: Database,
): Promise<{ settings: ShopSettings; taxBasisPoints: number }> {
  const row = await db('settings')
    .leftJoin('tax_rates', 'tax_rates.country', db.raw(`settings.value ->> 'homeCountry'`))
    .where({ 'settings.name': 'shop' })
    .first('value', 'basis_points');
  if (!row) throw new Error(neverSeeded);
  return { settings: row.value, taxBasisPoints: row.basis_points ?? 0 };
}

export interface TaxRate {
  country: string;
  name: string;
  basisPoints: number;
  zone: 'home' | 'europe' | 'world';
}

/** Every country the shop delivers to, by name. */
export async function taxRates(db: Database): Promise<TaxRate[]> {
  return db('tax_rates')
    .join('shipping_zones', 'shipping_zones.country', 'tax_rates.country')
    .orderBy('tax_rates.name')
    .select('tax_rates.country', 'tax_rates.name', 'basis_points as basisPoints', 'zone');
}

/** A country's name; its code where the shop does not deliver there any more. */
export async function countryName(db: Database, country: string): Promise<string> {
  const row = await db('tax_rates').where({ country }).first('name');
  return row?.name ?? country;
}

export interface ShippingMethod {
  code: string;
  name: string;
  days: string;
  netMinor: number;
}

/** The ways of shipping to a zone, in the order they are offered. */
export async function shippingMethods(db: Database, zone: string): Promise<ShippingMethod[]> {
  return db('shipping_methods')
    .where({ zone })
    .orderBy('position')
    .select('code', 'name', 'days', 'net_minor as netMinor');
}
