import Stripe from 'stripe';
import type { Service } from './service.ts';
import type { Delivery, KeptEvent } from './state.ts';

export interface WebhookTarget {
  url: string;
  secret: string;
}

const patienceMs = 10_000;
const longestPauseMs = 300_000;
const mostAttempts = 20;
const keptDelivered = 1000;

/** 1 s, 2 s, 4 s … to five minutes. */
export function pauseAfter(attempts: number): number {
  return Math.min(1000 * 2 ** (attempts - 1), longestPauseMs);
}

/** Sends one event, signed as the service signs; true when it was taken with a 2xx. */
export async function sendEvent(
  event: KeptEvent,
  { url, secret }: WebhookTarget,
  stopped?: AbortSignal,
): Promise<boolean> {
  const payload = JSON.stringify(event);
  const signature = Stripe.webhooks.generateTestHeaderString({ payload, secret });
  try {
    const answer = await fetch(url, {
      method: 'POST',
      headers: { 'content-type': 'application/json; charset=utf-8', 'stripe-signature': signature },
      body: payload,
      redirect: 'manual',
      signal: AbortSignal.any([AbortSignal.timeout(patienceMs), ...(stopped ? [stopped] : [])]),
    });
    await answer.arrayBuffer();
    return answer.ok;
  } catch {
    return false;
  }
}

/** Delivers what is due, side by side and so in any order, as the service itself does. */
export class WebhookDelivery {
  #holding = false;
  #underWay = new Map<string, Promise<void>>();
  #stopping = new AbortController();

  constructor(
    private readonly service: Service,
    private readonly target: WebhookTarget | null,
  ) {}

  /** Keeps events back until `release`. */
  hold(): void {
    this.#holding = true;
  }

  release(): Promise<void> {
    this.#holding = false;
    return this.deliverDue();
  }

  /** Ends for good. What is under way is broken off and kept as not taken, to be sent again. */
  async stop(): Promise<void> {
    this.#stopping.abort();
    await Promise.all(this.#underWay.values());
  }

  async deliverDue(): Promise<void> {
    if (this.#holding || this.#stopping.signal.aborted) return;
    const now = this.service.now();
    const due = this.service.state.deliveries.filter(
      ({ eventId, dueAt }) => dueAt <= now && !this.#underWay.has(eventId),
    );
    await Promise.all(due.map((delivery) => this.#start(delivery)));
  }

  #start(delivery: Delivery): Promise<void> {
    const { eventId } = delivery;
    const work = this.#deliver(delivery).finally(() => this.#underWay.delete(eventId));
    this.#underWay.set(eventId, work);
    return work;
  }

  async #deliver(delivery: Delivery): Promise<void> {
    const { state } = this.service;
    const event = state.events[delivery.eventId];
    const { signal } = this.#stopping;
    const taken = !event || !this.target || (await sendEvent(event, this.target, signal));
    delivery.attempts += 1;
    delivery.dueAt = this.service.now() + pauseAfter(delivery.attempts);
    if (taken || delivery.attempts >= mostAttempts) {
      state.deliveries = state.deliveries.filter((other) => other !== delivery);
      if (event) event.pending_webhooks = 0;
      this.#forgetOldest();
    }
    this.service.save();
  }

  /** The service lists events of thirty days; here the last thousand are enough. */
  #forgetOldest(): void {
    const { state } = this.service;
    const settled = Object.values(state.events).filter((event) => event.pending_webhooks === 0);
    for (const event of settled.slice(0, -keptDelivered)) delete state.events[event.id];
  }
}
