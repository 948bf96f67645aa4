import type Stripe from 'stripe';
import { makeId } from './ids.ts';
import type { KeptEvent, State } from './state.ts';

/** What the parts of the stand-in share: its memory, its time and where its pages are. */
export interface Service {
  state: State;
  /** Milliseconds of the epoch. */
  now(): number;
  publicUrl(): string;
  save(): void;
}

/** Seconds of the epoch, as the API gives times. */
export function nowSeconds(service: Service): number {
  return Math.floor(service.now() / 1000);
}

const apiVersion = '2026-10-28.endive';

/** Records an event about an object as it is now, and queues its delivery. */
export function record(service: Service, type: Stripe.Event['type'], about: object): KeptEvent {
  const event: KeptEvent = {
    id: makeId('evt'),
    object: 'event',
    api_version: apiVersion,
    created: nowSeconds(service),
    data: { object: structuredClone(about) },
    livemode: false,
    pending_webhooks: 1,
    request: { id: null, idempotency_key: null },
    type,
  };
  service.state.events[event.id] = event;
  service.state.deliveries.push({ eventId: event.id, attempts: 0, dueAt: service.now() });
  service.save();
  return event;
}
