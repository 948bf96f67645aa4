import { randomBytes } from 'node:crypto';

const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789';

/** An id with the service's usual prefix, such as `cs_test_…` or `pi_…`. */
export function makeId(prefix: string, length = 24): string {
  const letters = Array.from(randomBytes(length), (byte) => alphabet[byte % alphabet.length]);
  return `${prefix}_${letters.join('')}`;
}
