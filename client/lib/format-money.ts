import type { Money } from '../../server/contracts/common.ts';
import { minus, narrow } from './spaces.ts';

/** ISO 4217 counts of minor units other than two, for the currencies the shop may meet. */
const minorDigits: Record<string, number> = { JPY: 0, KRW: 0, ISK: 0, KWD: 3, BHD: 3, TND: 3 };
const symbols: Record<string, string> = { EUR: '€', GBP: '£', USD: '$' };

/** € 4.85: sign, narrow space, and always all minor digits. */
export function formatMoney(money: Money): string {
  const digits = minorDigits[money.currency] ?? 2;
  const value = (Math.abs(money.amount) / 10 ** digits).toFixed(digits);
  const [whole = '0', rest] = value.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, narrow);
  const sign = money.amount < 0 ? minus : '';
  const symbol = symbols[money.currency] ?? money.currency;
  return `${sign}${symbol}${narrow}${grouped}${rest === undefined ? '' : `.${rest}`}`;
}
