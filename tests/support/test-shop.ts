import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';
import { Logger, runTaskListOnce } from 'graphile-worker';
import type { Knex } from 'knex';
import pg from 'pg';
import supertest from 'supertest';
import { seedDemoShop } from '../../seeds/demo-shop.ts';
import { seedReference } from '../../seeds/reference.ts';
import { createPrinter } from '../../server/adapters/pdf/printer.ts';
import { createSigner } from '../../server/adapters/signer.ts';
import { createSmtpMail } from '../../server/adapters/smtp-mail.ts';
import { createStripePayments } from '../../server/adapters/stripe-payments.ts';
import { createApp } from '../../server/http/app.ts';
import { tasks, type JobDeps } from '../../server/jobs/worker.ts';
import { createMailStandIn, type MailStandIn } from '../../server/mail-stand-in/mail-stand-in.ts';
import type { Deps } from '../../server/ports.ts';
import { createStockView } from '../../server/store/stock-view.ts';
import { createStripeMock, type StripeMock } from '../../server/stripe-mock/stripe-mock.ts';
import { openTestDatabase } from './database.ts';

export const webhookSecret = 'whsec_local_tests';
export const sessionSecret = 'session-secret-of-the-tests-of-http';
export const demoPassword = 'merrow-quay-demo';

/** The real time, moved on at will. */
export interface MovedClock {
  now(): Date;
  pass(minutes: number): void;
}

export type Visit = ReturnType<typeof supertest.agent>;

export interface TestShop {
  url: string;
  db: Knex;
  deps: Deps;
  clock: MovedClock;
  payments: StripeMock;
  mail: MailStandIn;
  /** A browser of its own: keeps its cookies. */
  visit(): Visit;
  /** Waits for events on their way, then works off the queue until it is empty. */
  work(): Promise<void>;
  close(): Promise<void>;
}

function movedClock(): MovedClock {
  let ahead = 0;
  return {
    now: () => new Date(Date.now() + ahead),
    pass: (minutes) => {
      ahead += minutes * 60_000;
    },
  };
}

/**
 * The web application over real adapters: the demonstration shop in a database of the file's own, the
 * card stand-in through the real SDK, the mail stand-in over SMTP.
 */
export async function openTestShop(settings: { clientDir?: string } = {}): Promise<TestShop> {
  const database = await openTestDatabase();
  await seedReference(database.db);
  await seedDemoShop(database.db);
  const clock = movedClock();
  const server = createServer();
  await new Promise<void>((done) => server.listen(0, '127.0.0.1', done));
  const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  const secretKey = 'sk_test_local_http';
  const webhookUrl = `${url}/api/webhooks/stripe`;
  const payments = createStripeMock({
    secretKey,
    webhookSecret,
    webhookUrl,
    clock: () => clock.now(),
  });
  const apiUrl = await payments.listen();
  const mail = createMailStandIn();
  const { smtpUrl } = await mail.listen();
  const smtp = createSmtpMail(smtpUrl, 'Tockwell <shop@tockwell.example>');
  const stockView = createStockView(database.url, database.db);
  const deps: JobDeps = {
    db: database.db,
    stockView,
    clock,
    payments: createStripePayments({ secretKey, webhookSecret, apiUrl }),
    signer: createSigner('token-secret-of-the-tests-of-http'),
    printer: createPrinter(),
    publicUrl: url,
    demo: true,
    mailPageUrl: null,
    mail: smtp,
  };
  server.on(
    'request',
    createApp(deps, {
      sessionSecret,
      secureCookies: false,
      clientDir: settings.clientDir ?? null,
      trustProxy: false,
      logger: null,
    }),
  );
  const pool = new pg.Pool({ connectionString: database.url, max: 2 });
  return {
    url,
    db: database.db,
    deps,
    clock,
    payments,
    mail,
    visit: () => supertest.agent(server),
    work: () => workOff(pool, deps, payments),
    async close() {
      await pool.end();
      smtp.close();
      await payments.close();
      await mail.close();
      await closed(server);
      await stockView.close();
      await database.drop();
    },
  };
}

const silent = new Logger(() => () => undefined);

async function workOff(pool: pg.Pool, deps: JobDeps, payments: StripeMock): Promise<void> {
  await payments.controls.settle();
  const waiting = () => payments.controls.events().some((event) => event.pending_webhooks > 0);
  for (const end = Date.now() + 5000; waiting() && Date.now() < end;) await sleep(20);
  const client = await pool.connect();
  try {
    await runTaskListOnce({ noHandleSignals: true, logger: silent }, tasks(deps), client).promise;
  } finally {
    client.release();
  }
}

async function closed(server: Server): Promise<void> {
  server.closeAllConnections();
  await new Promise((done) => server.close(done));
}
