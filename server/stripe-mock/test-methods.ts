import type Stripe from 'stripe';
import { invalidRequest } from './api-error.ts';
import { acceptedNumber, declinedNumber, type Card, type Decline } from './card.ts';
import { makeId } from './ids.ts';
import type { Service } from './service.ts';

interface TestMethod {
  number: string;
  decline: Decline | null;
}

const declined = {
  number: declinedNumber,
  decline: { code: 'generic_decline', message: 'Your card was declined.' },
};

// The names and codes are those of the service's own test methods, from memory.
const testMethods: Record<string, TestMethod> = {
  pm_card_visa: { number: acceptedNumber, decline: null },
  pm_card_chargeDeclined: declined,
  pm_card_visa_chargeDeclined: declined,
  pm_card_visa_chargeDeclinedInsufficientFunds: {
    number: '4000 0000 0000 9995',
    decline: { code: 'insufficient_funds', message: 'Your card has insufficient funds.' },
  },
};

/** Makes a payment method of a test name; its new id, as the service gives every use its own. */
export function takeMethod(service: Service, name: string): string {
  if (!Object.hasOwn(testMethods, name)) {
    const known = Object.keys(testMethods).join(', ');
    const message = `No such PaymentMethod: '${name}'. This stand-in knows ${known}.`;
    throw invalidRequest(message, 'resource_missing', 'payment_method');
  }
  const id = makeId('pm');
  service.state.methods[id] = name;
  return id;
}

/** The card an intent is to be paid with, and what its bank says: null for yes. */
export function cardOf(
  service: Service,
  { id, payment_method: used }: Stripe.PaymentIntent,
): { card: Card; decline: Decline | null } {
  const name = typeof used === 'string' ? service.state.methods[used] : undefined;
  const method = name === undefined ? undefined : testMethods[name];
  if (!method) throw new RangeError(`${id} has no payment method of this stand-in.`);
  const expiryYear = new Date(service.now()).getUTCFullYear() + 1;
  const number = method.number.replaceAll(' ', '');
  return { card: { number, expiryMonth: 12, expiryYear, name: '' }, decline: method.decline };
}
