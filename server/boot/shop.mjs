import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { freePort, isFree, rememberedPort } from './free-port.mjs';
import { ensureDatabase, startPostgres } from './postgres.mjs';
import { inProject } from './project.mjs';
import { mustRun } from './run-command.mjs';
import { keptSecrets } from './secrets.mjs';
import { PlainFailure } from './step.mjs';

const usualPort = 4310;
const loopback = '127.0.0.1';
const at = (port) => `http://${loopback}:${port}`;

/** The port asked for by PORT, or the usual one, or any free one when the usual is taken. */
export async function choosePort(asked) {
  if (asked === undefined || asked === '') {
    return (await isFree(usualPort)) ? usualPort : freePort();
  }
  const port = Number(asked);
  if (!Number.isInteger(port) || port < 1 || port > 65535) {
    throw new PlainFailure(`PORT is "${asked}".`, 'Set PORT to a whole number from 1 to 65535.');
  }
  if (await isFree(port)) return port;
  throw new PlainFailure(
    `Port ${port} is taken by another program.`,
    'End that program, set PORT to another number, or leave PORT out.',
  );
}

/** The database's address: DATABASE_URL when given, else a server of our own. */
export async function openDatabase(children, dataDir, env, options) {
  if (env.DATABASE_URL) return env.DATABASE_URL;
  return ensureDatabase(await startPostgres(children, dataDir, options), 'tockwell');
}

/** What every process of the shop is told; what the user has set wins. */
export async function shopEnvironment({ dataDir, databaseUrl, port, publicPort = port, env }) {
  const secrets = keptSecrets(dataDir);
  const shop = {
    HOST: loopback,
    PUBLIC_URL: at(publicPort),
    CLIENT_DIR: inProject('dist', 'client'),
    SESSION_SECRET: secrets.sessionSecret,
    TOKEN_SECRET: secrets.tokenSecret,
    ...env,
    PORT: String(port),
    DATA_DIR: dataDir,
    DATABASE_URL: databaseUrl,
  };
  if (!env.STRIPE_SECRET_KEY) {
    shop.STRIPE_SECRET_KEY = secrets.stripeSecretKey;
    shop.STRIPE_WEBHOOK_SECRET = secrets.stripeWebhookSecret;
    shop.STRIPE_API_URL = at(await rememberedPort(dataDir, 'payments'));
    shop.STRIPE_WEBHOOK_URL = `${at(port)}/api/webhooks/stripe`;
    shop.STRIPE_MOCK_STATE = path.join(dataDir, 'payments.json');
  }
  if (!env.SMTP_URL) {
    shop.SMTP_URL = `smtp://${loopback}:${await rememberedPort(dataDir, 'mail')}`;
    shop.MAIL_PAGE_URL = at(await rememberedPort(dataDir, 'mailPage'));
    shop.MAIL_FOLDER = path.join(dataDir, 'mail');
  }
  return shop;
}

/** Brings the database to the newest schema and seeds what is missing. */
export function migrate(script, env) {
  return mustRun(
    'Preparing the database',
    'Check DATABASE_URL when you have set it; else read the message above.',
    process.execPath,
    [...script],
    { env, cwd: inProject() },
  );
}

/** Starts the stand-ins that this environment calls for; resolves when all of them answer. */
export function startStandIns(children, scripts, env, givenEnv, logTo) {
  const waits = [];
  if (!givenEnv.STRIPE_SECRET_KEY) {
    children.start('payment stand-in', scripts.payments, { env, logFile: logTo('payments') });
    waits.push(waitFor(`${env.STRIPE_API_URL}/health`, 'payment stand-in'));
  }
  if (!givenEnv.SMTP_URL) {
    children.start('mail stand-in', scripts.mail, { env, logFile: logTo('mail') });
    waits.push(waitFor(`${env.MAIL_PAGE_URL}/api/mails`, 'mail stand-in'));
  }
  return Promise.all(waits);
}

/** Waits until an address answers 200; a service that never does is a failure in words. */
export async function waitFor(url, name, patienceMs = 60_000) {
  const end = Date.now() + patienceMs;
  while (Date.now() < end) {
    const answer = await fetch(url, { signal: AbortSignal.timeout(5_000) }).catch(() => null);
    await answer?.arrayBuffer();
    if (answer?.status === 200) return;
    await sleep(100);
  }
  throw new PlainFailure(
    `The ${name} does not answer at ${url}.`,
    'Read its log under logs/ in the data folder, then start again.',
  );
}
