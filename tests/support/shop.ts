import { spawn, type ChildProcess } from 'node:child_process';
import { closeSync, mkdtempSync, openSync, readFileSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { createMailStandIn, type MailStandIn } from '../../server/mail-stand-in/mail-stand-in.ts';
import { createStripeMock, type StripeMock } from '../../server/stripe-mock/stripe-mock.ts';
import { openBareDatabase } from './database.ts';

const built = (file: string) => fileURLToPath(new URL(`../../dist/${file}`, import.meta.url));
const secretKey = 'sk_test_local_end_to_end';
const webhookSecret = 'whsec_local_end_to_end';

export interface RunningShop {
  url: string;
  databaseUrl: string;
  payments: StripeMock;
  mail: MailStandIn;
  /** Where caught mail can be read. */
  mailPageUrl: string;
  /** What the server has written so far. */
  log(): string;
  stop(): Promise<void>;
}

/**
 * The built shop as it is shipped, demo seeded, on a database of its own, with the stand-ins for cards
 * and mail in this process so that a test can hold events back or read mails.
 */
export async function startShop(extra: Record<string, string> = {}): Promise<RunningShop> {
  const database = await openBareDatabase();
  const folder = mkdtempSync(path.join(tmpdir(), 'tockwell-shop-'));
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const webhookUrl = `${url}/api/webhooks/stripe`;
  const payments = createStripeMock({ secretKey, webhookSecret, webhookUrl });
  const mail = createMailStandIn();
  const stripeApiUrl = await payments.listen();
  const { smtpUrl, pageUrl: mailPageUrl } = await mail.listen();
  const env = {
    ...process.env,
    NODE_ENV: 'test',
    DEMO: '1',
    HOST: '127.0.0.1',
    PORT: String(port),
    PUBLIC_URL: url,
    CLIENT_DIR: built('client'),
    DATA_DIR: folder,
    DATABASE_URL: database.url,
    SESSION_SECRET: 'session-secret-of-the-end-to-end-tests',
    TOKEN_SECRET: 'token-secret-of-the-end-to-end-tests',
    STRIPE_SECRET_KEY: secretKey,
    STRIPE_WEBHOOK_SECRET: webhookSecret,
    STRIPE_API_URL: stripeApiUrl,
    SMTP_URL: smtpUrl,
    MAIL_PAGE_URL: mailPageUrl,
    ...extra,
  };
  const logFile = path.join(folder, 'server.log');
  const log = () => readFileSync(logFile, 'utf8');
  let server: ChildProcess | null = null;
  const stop = async () => {
    await ended(server);
    await payments.close();
    await mail.close();
    await database.drop();
    rmSync(folder, { recursive: true, force: true });
  };
  try {
    await finished(run('server/migrate.js', env, logFile), log);
    server = run('server/main.js', env, logFile);
    await ready(`${url}/api/ready`, server, log);
  } catch (error) {
    await stop();
    throw error;
  }
  return { url, databaseUrl: database.url, payments, mail, mailPageUrl, log, stop };
}

function run(script: string, env: NodeJS.ProcessEnv, logFile: string): ChildProcess {
  const log = openSync(logFile, 'a');
  const stdio = ['ignore', log, log] as const;
  const child = spawn(process.execPath, [built(script)], { env, stdio: [...stdio] });
  closeSync(log);
  return child;
}

function freePort(): Promise<number> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });
}

async function finished(child: ChildProcess, log: () => string): Promise<void> {
  const code = await new Promise((done) => child.once('exit', done));
  if (code !== 0) throw new Error(`Preparing the database failed:\n${log()}`);
}

async function ready(url: string, server: ChildProcess, log: () => string): Promise<void> {
  for (const end = Date.now() + 60_000; Date.now() < end; await sleep(100)) {
    if (server.exitCode !== null) break;
    const answer = await fetch(url).catch(() => null);
    if (answer?.ok) return;
  }
  throw new Error(`The server is not ready:\n${log()}`);
}

async function ended(child: ChildProcess | null): Promise<void> {
  if (!child || child.exitCode !== null || child.signalCode !== null) return;
  const exit = new Promise((done) => child.once('exit', done));
  child.kill('SIGTERM');
  const impatience = setTimeout(() => child.kill('SIGKILL'), 10_000);
  await exit;
  clearTimeout(impatience);
}
