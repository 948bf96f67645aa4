import type { Knex } from 'knex';

/**
 * Countries the shop delivers to: [ISO 3166-1 code, name, standard VAT rate in basis points, zone].
 * The rates are from memory and must be checked with a tax adviser before real use.
 */
const countries = [
  ['IE', 'Ireland', 2300, 'home'],
  ['AT', 'Austria', 2000, 'europe'],
  ['BE', 'Belgium', 2100, 'europe'],
  ['CZ', 'Czechia', 2100, 'europe'],
  ['DE', 'Germany', 1900, 'europe'],
  ['DK', 'Denmark', 2500, 'europe'],
  ['ES', 'Spain', 2100, 'europe'],
  ['FI', 'Finland', 2550, 'europe'],
  ['FR', 'France', 2000, 'europe'],
  ['GR', 'Greece', 2400, 'europe'],
  ['HU', 'Hungary', 2700, 'europe'],
  ['IT', 'Italy', 2200, 'europe'],
  ['LU', 'Luxembourg', 1700, 'europe'],
  ['NL', 'Netherlands', 2100, 'europe'],
  ['PL', 'Poland', 2300, 'europe'],
  ['PT', 'Portugal', 2300, 'europe'],
  ['RO', 'Romania', 2100, 'europe'],
  ['SE', 'Sweden', 2500, 'europe'],
  ['SI', 'Slovenia', 2200, 'europe'],
  ['CH', 'Switzerland', 0, 'world'],
  ['GB', 'United Kingdom', 0, 'world'],
  ['NO', 'Norway', 0, 'world'],
  ['US', 'United States', 0, 'world'],
] as const;

/** [code, zone, name, days, net price in cents, position]; invented prices. */
const methods = [
  ['standard', 'home', 'Letter', '2 to 3 working days', 290, 1],
  ['express', 'home', 'Courier', 'next working day', 690, 2],
  ['standard', 'europe', 'Letter, tracked', '4 to 7 working days', 520, 1],
  ['express', 'europe', 'Courier', '2 to 3 working days', 1490, 2],
  ['standard', 'world', 'Letter, tracked', '7 to 14 working days', 790, 1],
] as const;

const shop = {
  name: 'Tockwell',
  address: ['Tockwell Timing Kits', 'The Old Clock House', '3 Lantern Steps', 'Merrow Quay'],
  email: 'shop@tockwell.example',
  homeCountry: 'IE',
  kitFeeMinor: 145,
  careFeesMinor: { 'as-stocked': 0, 'lot-checked': 60, 'bench-tuned': 240, 'trimmer-fitted': 0 },
  // A good handheld meter at 1 kHz; from memory.
  meterUncertainty: 0.0025,
  carriers: ['Quay Post', 'Harbour Courier'],
};

/** Puts in what every shop needs to open; rows that exist stay as the owner has made them. */
export async function seedReference(db: Knex): Promise<void> {
  await db('settings')
    .insert({ name: 'shop', value: JSON.stringify(shop) })
    .onConflict('name')
    .ignore();
  await db('tax_rates')
    .insert(countries.map(([country, name, basis_points]) => ({ country, name, basis_points })))
    .onConflict('country')
    .ignore();
  await db('shipping_zones')
    .insert(countries.map(([country, , , zone]) => ({ country, zone })))
    .onConflict('country')
    .ignore();
  await db('shipping_methods')
    .insert(
      methods.map(([code, zone, name, days, net_minor, position]) => ({
        code,
        zone,
        name,
        days,
        net_minor,
        position,
      })),
    )
    .onConflict(['code', 'zone'])
    .ignore();
}
