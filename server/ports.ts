import type { Knex } from 'knex';
import type { BuildSheet } from './contracts/orders.ts';
import type { StockView } from './store/stock-view.ts';

/** What the use cases need of the outside world. Adapters implement these; tests may too. */

export interface Clock {
  now(): Date;
}

export interface CheckoutRequest {
  orderRef: string;
  email: string;
  lines: { name: string; amountMinor: number; quantity: number }[];
  successUrl: string;
  cancelUrl: string;
  expiresAt: Date;
  /** The same key asks for the same page, however often it is sent. */
  key: string;
}

export interface CheckoutState {
  status: 'open' | 'complete' | 'expired';
  paid: boolean;
  intentId: string | null;
  amountMinor: number;
  currency: string;
}

/** An event of the payment service, in the shop's own terms. */
export type PaymentEvent =
  | { kind: 'checkout-ended'; sessionId: string }
  | { kind: 'refunded'; intentId: string; refundedMinor: number; wholly: boolean }
  | { kind: 'other' };

export interface PaymentGateway {
  openCheckout(request: CheckoutRequest): Promise<{ sessionId: string; url: string }>;
  checkoutState(sessionId: string): Promise<CheckoutState>;
  /** Closes a payment page; harmless when it has ended already. */
  closeCheckout(sessionId: string): Promise<void>;
  refund(request: {
    intentId: string;
    amountMinor: number;
    key: string;
  }): Promise<{ refundId: string; succeeded: boolean }>;
  /** Checks the signature over the raw body; throws BadSignature when it does not hold. */
  readEvent(rawBody: Buffer, signature: string): { id: string; type: string; payload: unknown };
  /** What a kept event means. */
  interpret(event: { type: string; payload: unknown }): PaymentEvent;
}

/** The payment service refused or could not be reached; `message` says which. */
export class PaymentRefused extends Error {
  override name = 'PaymentRefused';
}

export class BadSignature extends Error {
  override name = 'BadSignature';
}

export interface MailSender {
  send(mail: {
    key: string;
    to: string;
    subject: string;
    text: string;
    html: string;
  }): Promise<void>;
}

/** Signs small texts so that only this shop can have made them. */
export interface Signer {
  /** Pack tokens: the choice of parts and the brief, readable by the shop alone as unaltered. */
  seal(payload: string): string;
  /** The payload, or null when the token was not sealed here. */
  open(token: string): string | null;
  /** A guest's key to one order. */
  orderToken(ref: string): string;
}

/** Puts documents on paper, as PDF. */
export interface Printer {
  buildSheet(sheet: BuildSheet): Promise<Buffer>;
}

export interface Deps {
  db: Knex;
  /** The shelves as they stand, kept in memory. What a transaction writes shows once it commits. */
  stockView: StockView;
  clock: Clock;
  payments: PaymentGateway;
  signer: Signer;
  printer: Printer;
  /** Where the shop is reached from outside, without a slash at the end. */
  publicUrl: string;
  demo: boolean;
  mailPageUrl: string | null;
}
