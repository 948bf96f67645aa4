import { createServer } from 'node:http';
import pg from 'pg';
import { pino } from 'pino';
import { seedDemoOrders } from '../seeds/demo-orders.ts';
import { createSmtpMail } from './adapters/smtp-mail.ts';
import { composeDeps } from './compose.ts';
import { readConfig } from './config.ts';
import { createApp } from './http/app.ts';
import { startWorker } from './jobs/worker.ts';
import { warmSearch } from './use-cases/solve-brief.ts';

const config = readConfig(process.env);
const log = pino({ level: config.logLevel });
const noteLoss = (error: Error) => log.warn({ err: error }, 'database connection lost');
const deps = composeDeps(config, noteLoss);
const mail = createSmtpMail(config.smtpUrl, config.mailFrom);
const pool = new pg.Pool({ connectionString: config.databaseUrl, max: 5 });
pool.on('error', noteLoss);
pool.on('connect', (client) => client.on('error', noteLoss));

const app = createApp(deps, {
  sessionSecret: config.sessionSecret,
  secureCookies: config.publicUrl.startsWith('https:'),
  clientDir: config.clientDir,
  trustProxy: config.trustProxy,
  logger: log,
});
const server = createServer({ requestTimeout: 30_000, headersTimeout: 15_000 }, app);
await warmSearch(deps);
if (config.demo && config.stripe.apiUrl !== null) await seedDemoOrders(deps);
const worker = await startWorker({ ...deps, mail }, pool, log);
server.listen(config.port, config.host, () =>
  log.info(`listening on ${config.host}:${config.port}`),
);

let stopping = false;
/** Stops taking requests, finishes those under way and the jobs in hand, then ends. */
async function stop(): Promise<void> {
  if (stopping) return;
  stopping = true;
  const closed = new Promise((resolve) => server.close(resolve));
  server.closeIdleConnections();
  setTimeout(() => server.closeAllConnections(), 5000).unref();
  await closed;
  await worker.stop();
  mail.close();
  await pool.end();
  await deps.close();
}

for (const signal of ['SIGTERM', 'SIGINT', 'SIGHUP'] as const)
  process.on(signal, () => void stop());
