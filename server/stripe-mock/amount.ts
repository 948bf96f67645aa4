import { invalidRequest } from './api-error.ts';

const smallest = 50;
const largest = 99_999_999;

/**
 * Refuses what the service would not take for one payment, in minor units. The service's least
 * amount goes by currency; 50 is that of the euro and the dollar, and stands here for all.
 */
export function checkAmount(amount: number, param?: string): void {
  if (amount < smallest) {
    throw invalidRequest(`The total must be at least ${smallest}.`, 'amount_too_small', param);
  }
  if (amount > largest) {
    throw invalidRequest(`The total must be at most ${largest}.`, 'amount_too_large', param);
  }
}
