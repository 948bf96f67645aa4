import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import autocannon, { type Request } from 'autocannon';
import express, { type Express } from 'express';
import { createApp } from '../../server/http/app.ts';
import type { Deps } from '../../server/ports.ts';
import { printTable } from './tables.ts';

const connections = 10;
const warmSeconds = 2;
const seconds = 8;
const briefsOf = (count: number, from: number) =>
  Array.from({ length: count }, (_, k) => ({
    target: { value: from * 1e6 ** (k / (count - 1)), unit: 'Hz' },
    rank: (['closest', 'best-value', 'steadiest'] as const)[k % 3],
  }));
const briefs = briefsOf(60, 0.05);
/** More than can be answered in the time, in an order that mixes slow and fast rates. */
const freshBriefs = briefsOf(6000, 0.0501).map((_, k, all) => all[(k * 2477) % all.length]!);

/**
 * Prints how many briefs a second the shop answers over ten connections, beside a bare Express route
 * that parses the same requests and answers the same bytes. The load comes from a thread of its own.
 */
export async function httpThroughput(deps: Deps): Promise<void> {
  const shop = await serve(shopApp(deps));
  const answers = new Map<number, string>();
  for (const brief of briefs) answers.set(brief.target.value, await answerTo(shop.url, brief));
  const bare = await serve(bareApp(answers));
  const reference = await requestsPerSecond(bare.url, briefs);
  const again = await requestsPerSecond(shop.url, briefs);
  const fresh = await requestsPerSecond(shop.url, freshBriefs);
  await Promise.all([shop.close(), bare.close()]);
  const row = (name: string, rate: number) => [
    name,
    rate.toFixed(0),
    (rate / reference).toFixed(3),
  ];
  printTable(
    `POST /api/packs/solve, ${connections} connections, all three ranks`,
    ['', 'requests a second', 'of the bare route'],
    [
      row('bare Express route, the same bytes', reference),
      row('solve, 60 briefs over and over', again),
      row('solve, every brief for the first time', fresh),
    ],
  );
}

function shopApp(deps: Deps): Express {
  return createApp(deps, {
    sessionSecret: 'session-secret-of-the-benchmark-run',
    secureCookies: false,
    clientDir: null,
    // Each brief comes from an address of its own: the limit for one address is not what is measured.
    trustProxy: true,
    logger: null,
  });
}

function bareApp(answers: ReadonlyMap<number, string>): Express {
  const app = express();
  app.post('/api/packs/solve', express.json(), (req, res) => {
    const { target } = req.body as (typeof briefs)[number];
    res.type('json').send(answers.get(target.value));
  });
  return app;
}

async function answerTo(url: string, brief: object): Promise<string> {
  const { headers, body } = requestFor(brief, 0);
  const res = await fetch(`${url}/api/packs/solve`, { method: 'POST', headers, body });
  if (!res.ok) throw new Error(`The shop answered ${res.status}: ${await res.text()}`);
  return res.text();
}

function requestFor(brief: object, k: number) {
  const headers = {
    'content-type': 'application/json',
    'x-forwarded-for': `10.0.${k >> 8}.${k & 255}`,
  };
  return { headers, body: JSON.stringify(brief) };
}

async function requestsPerSecond(url: string, asked: typeof briefs): Promise<number> {
  const requests: Request[] = asked.map((brief, k) => ({
    method: 'POST',
    path: '/api/packs/solve',
    ...requestFor(brief, k),
  }));
  const load = (duration: number) =>
    autocannon({ url, connections, duration, requests, workers: 1 });
  await load(warmSeconds);
  const result = await load(seconds);
  const failed = result.non2xx + result.errors;
  if (failed > 0) throw new Error(`${failed} requests of the throughput run failed.`);
  return result.requests.average;
}

async function serve(app: Express): Promise<{ url: string; close(): Promise<void> }> {
  const server: Server = createServer(app);
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  const { port } = server.address() as AddressInfo;
  const close = async () => {
    server.closeAllConnections();
    await new Promise((closed) => server.close(closed));
  };
  return { url: `http://127.0.0.1:${port}`, close };
}
