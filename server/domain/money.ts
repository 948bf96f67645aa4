import type { Money } from '../contracts/common.ts';

/** The shop sells in one currency; ISO 4217 gives the euro two decimal digits. */
export const currency = 'EUR';

/** Wraps integer minor units (cents) as the money that calls answer with. */
export function money(amountMinor: number): Money {
  if (!Number.isSafeInteger(amountMinor)) {
    throw new RangeError(`Money is a whole number of minor units, not ${amountMinor}.`);
  }
  return { amount: amountMinor, currency };
}

/**
 * Adds tax to a net amount. Minor units in and out; the rate in basis points (2300 = 23 %).
 * Rounds half up to the whole minor unit.
 */
export function withTax(netMinor: number, basisPoints: number): number {
  return netMinor + roundHalfUp(netMinor * basisPoints, 10_000);
}

/** Tax contained in a gross amount, in minor units, rounded half up. */
export function taxWithin(grossMinor: number, basisPoints: number): number {
  return grossMinor - roundHalfUp(grossMinor * 10_000, 10_000 + basisPoints);
}

/** numerator/denominator rounded half up; exact for products below 2⁵³. Both not negative. */
function roundHalfUp(numerator: number, denominator: number): number {
  return Math.floor((2 * numerator + denominator) / (2 * denominator));
}
