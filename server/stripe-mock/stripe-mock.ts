import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import express, { type Express } from 'express';
import { lookRouter } from '../stand-in-look/look-router.ts';
import { answerError, refuseAddress } from './api-answers.ts';
import { apiRouter } from './api-router.ts';
import { cardRouter } from './card-router.ts';
import type { Service } from './service.ts';
import { expireDueSessions } from './sessions.ts';
import { loadState, saveState, type KeptEvent } from './state.ts';
import { sendEvent, WebhookDelivery } from './webhook-delivery.ts';

export interface StripeMockSettings {
  secretKey: string;
  webhookSecret: string;
  /** Where events go; null keeps them unsent. */
  webhookUrl: string | null;
  /** Where the memory is kept over a restart; in memory only when left out. */
  stateFile?: string;
  clock?: () => Date;
  /** How browsers reach the card page; the listening address when left out. */
  publicUrl?: string;
  shopName?: string;
}

/** What a test may do beyond the API. */
export interface StripeMockControls {
  /** All events, oldest first. */
  events(): KeptEvent[];
  /** Keeps events back until `release`, which sends them. */
  hold(): void;
  release(): Promise<void>;
  /** Sends an event once more, whether it was taken or not; true when it is taken. */
  redeliver(eventId: string): Promise<boolean>;
  /** Expires and delivers what is due by the clock, now instead of within the second. */
  settle(): Promise<void>;
}

export interface StripeMock {
  app: Express;
  controls: StripeMockControls;
  /** Listens on loopback; answers the address, such as http://127.0.0.1:12111. */
  listen(port?: number): Promise<string>;
  close(): Promise<void>;
}

const beatMs = 500;

/** A local stand-in of the card-payment service: its API, its webhooks and its hosted page. */
export function createStripeMock(settings: StripeMockSettings): StripeMock {
  const stateFile = settings.stateFile ?? null;
  const state = loadState(stateFile);
  let address = settings.publicUrl ?? '';
  const service: Service = {
    state,
    now: () => (settings.clock?.() ?? new Date()).getTime(),
    publicUrl: () => address,
    save: () => saveState(stateFile, state),
  };
  const { webhookUrl, webhookSecret } = settings;
  const target = webhookUrl === null ? null : { url: webhookUrl, secret: webhookSecret };
  const delivery = new WebhookDelivery(service, target);
  const settle = async () => {
    expireDueSessions(service);
    await delivery.deliverDue();
  };

  let server: Server | null = null;
  let beat: NodeJS.Timeout | null = null;
  const app = createApp(service, settings, () => void delivery.deliverDue());
  return {
    app,
    controls: {
      events: () => Object.values(state.events),
      hold: () => delivery.hold(),
      release: () => delivery.release(),
      redeliver: (eventId) => redeliver(state.events[eventId], target),
      settle,
    },
    async listen(port = 0) {
      server = await listening(app, port);
      const base = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
      address = settings.publicUrl ?? base;
      beat = setInterval(() => void settle(), beatMs);
      return base;
    },
    async close() {
      if (beat) clearInterval(beat);
      const closed = new Promise((done) => (server ? server.close(done) : done(undefined)));
      server?.closeAllConnections();
      // A delivery that ended later would write the state file anew, over that of a successor.
      await delivery.stop();
      await closed;
    },
  };
}

function createApp(service: Service, settings: StripeMockSettings, afterChange: () => void) {
  const app = express();
  app.disable('x-powered-by');
  app.set('query parser', 'extended');
  app.get('/health', (_request, response) => void response.json({ status: 'ok' }));
  app.use('/look', lookRouter());
  app.use('/c/pay', cardRouter(service, settings.shopName ?? 'Tockwell', afterChange));
  app.use('/v1', apiRouter(service, settings.secretKey, afterChange));
  app.use(refuseAddress, answerError);
  return app;
}

async function redeliver(
  event: KeptEvent | undefined,
  target: { url: string; secret: string } | null,
): Promise<boolean> {
  if (!event) throw new RangeError('There is no event of this id.');
  return target !== null && (await sendEvent(event, target));
}

function listening(app: Express, port: number): Promise<Server> {
  return new Promise((resolve, reject) => {
    const server = app.listen(port, '127.0.0.1', (error) =>
      error ? reject(error) : resolve(server),
    );
  });
}
