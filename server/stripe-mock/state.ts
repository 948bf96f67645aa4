import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import type Stripe from 'stripe';

export interface KeptSession {
  session: Stripe.Checkout.Session;
  lineItems: Stripe.LineItem[];
  intentMetadata: Stripe.Metadata;
}

export interface KeptEvent {
  id: string;
  object: 'event';
  api_version: string | null;
  created: number;
  data: { object: object };
  livemode: boolean;
  pending_webhooks: number;
  request: { id: string | null; idempotency_key: string | null };
  type: Stripe.Event['type'];
}

export interface Delivery {
  eventId: string;
  attempts: number;
  /** Milliseconds of the epoch. */
  dueAt: number;
}

export interface KeptAnswer {
  requestHash: string;
  /** Milliseconds of the epoch. */
  keptAt: number;
  status: number;
  body: object;
}

/** All the service remembers. Plain data, so that one JSON file holds it. */
export interface State {
  sessions: Record<string, KeptSession>;
  intents: Record<string, Stripe.PaymentIntent>;
  charges: Record<string, Stripe.Charge>;
  refunds: Record<string, Stripe.Refund>;
  /** Id of a payment method → the test name it was made of. */
  methods: Record<string, string>;
  events: Record<string, KeptEvent>;
  deliveries: Delivery[];
  answers: Record<string, KeptAnswer>;
}

function emptyState(): State {
  return {
    sessions: {},
    intents: {},
    charges: {},
    refunds: {},
    methods: {},
    events: {},
    deliveries: [],
    answers: {},
  };
}

export function loadState(file: string | null): State {
  if (file === null || !existsSync(file)) return emptyState();
  return { ...emptyState(), ...(JSON.parse(readFileSync(file, 'utf8')) as Partial<State>) };
}

/** Writes aside and renames, so that a kill in between leaves the older state whole. */
export function saveState(file: string | null, state: State): void {
  if (file === null) return;
  mkdirSync(path.dirname(file), { recursive: true });
  writeFileSync(`${file}.new`, JSON.stringify(state), { mode: 0o600 });
  renameSync(`${file}.new`, file);
}
