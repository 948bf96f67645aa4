import { readFileSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import express from 'express';
import type { Knex } from 'knex';
import { composeDeps } from '../../server/compose.ts';
import { readConfig } from '../../server/config.ts';
import { createCircuit } from '../../server/engine/circuit.ts';
import { analyseCycle } from '../../server/engine/cycle.ts';
import { periodAt, prepareSingle } from '../../server/engine/prepared-single.ts';
import { createApp } from '../../server/http/app.ts';
import { searchShelf } from '../../server/use-cases/search-shelf.ts';
import { warmSearch } from '../../server/use-cases/solve-brief.ts';
import { shopSettings } from '../../server/store/settings.ts';
import { httpThroughput } from './http-throughput.ts';
import { monteCarloSpeed } from './monte-carlo-speed.ts';
import { promisesKept } from './promises-kept.ts';
import { compareWithExhaustive, searchScaling } from './search-scaling.ts';
import { printTable, quantile } from './tables.ts';

/** Prints speed as ratios to a bare Express + one-row SELECT of the same run: machines differ, ratios less. */

const config = readConfig({
  ...process.env,
  SESSION_SECRET: 'session-secret-of-the-benchmark-run',
  TOKEN_SECRET: 'token-secret-of-the-benchmark-run-1',
  STRIPE_SECRET_KEY: 'sk_test_bench',
  STRIPE_WEBHOOK_SECRET: 'whsec_bench',
  SMTP_URL: 'smtp://127.0.0.1:1',
  LOG_LEVEL: 'silent',
});
const deps = composeDeps(config);
const shop = await serve(
  createApp(deps, {
    sessionSecret: config.sessionSecret,
    secureCookies: false,
    clientDir: null,
    trustProxy: false,
    logger: null,
  }),
);
const bare = await serve(bareApp(deps.db));

await warmSearch(deps);
const rates = Array.from({ length: 400 }, (_, k) => 0.05 * 1e6 ** (k / 399));
await solveAll(rates.filter((_, k) => k % 7 === 0).map((hz) => 1.01 * hz));
const reference = await timeCalls(400, () => fetch(`${bare.url}/row`).then((res) => res.json()));
const solved = await solveAll(rates);
const p95 = quantile(solved.times, 0.95);

printTable(
  'POST /api/packs/solve, rank closest, 400 rates from 0.05 Hz to 50 kHz, seeded stock',
  ['', 'p50', 'p95', 'p99'],
  [row('bare Express + one-row SELECT', reference), row('solve', solved.times)],
);
const ratio = quantile(solved.times, 0.5) / quantile(reference, 0.5);
console.log(`  ratio at the median ${ratio.toFixed(1)}; p95 wanted under 100 ms`);
console.log(`  worst nominal error ${(solved.worst * 100).toExponential(2)} %, wanted under 0.1 %`);
await httpThroughput(deps);
engineSpeed();
monteCarloSpeed();

const catalogue = await deps.stockView.current();
const book = { catalogue, settings: await shopSettings(deps.db) };
const searches = searchShelf(book, { mounting: 'through-hole', careLevel: 'as-stocked' });
printBudget();
const checks: [string, boolean][] = [
  ['solve p95 under 100 ms', p95 < 100],
  ['nominal error under 0.1 %', solved.worst < 1e-3],
  ['promises kept', promisesKept(book)],
  ['closest as the exhaustive search', compareWithExhaustive(searches)],
  ['search scaling within its limits', searchScaling()],
];
console.log('');
for (const [name, holds] of checks) console.log(`  ${holds ? 'holds' : 'FAILS'}  ${name}`);

shop.close();
bare.close();
await deps.close();
process.exitCode = checks.every(([, holds]) => holds) ? 0 : 1;

async function solveAll(targets: readonly number[]): Promise<{ times: number[]; worst: number }> {
  const times: number[] = [];
  let worst = 0;
  for (const value of targets) {
    const started = performance.now();
    const res = await fetch(`${shop.url}/api/packs/solve`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ target: { value, unit: 'Hz' }, rank: 'closest' }),
    });
    const body = (await res.json()) as { packs: { promise: { error: number } }[] };
    times.push(performance.now() - started);
    worst = Math.max(worst, Math.abs(body.packs[0]?.promise.error ?? 1));
  }
  return { times, worst };
}

async function timeCalls(count: number, call: () => Promise<unknown>): Promise<number[]> {
  const times: number[] = [];
  for (let k = 0; k < count; k += 1) {
    const started = performance.now();
    await call();
    times.push(performance.now() - started);
  }
  return times;
}

function row(name: string, times: readonly number[]): string[] {
  const at = (share: number) => `${quantile(times, share).toFixed(1)} ms`;
  return [name, at(0.5), at(0.95), at(0.99)];
}

/** How far the engine is from what it was held to, effect by effect; the tests read the same file. */
function printBudget(): void {
  const file = new URL('../../server/engine/error-budget.csv', import.meta.url);
  const [head, ...lines] = readFileSync(file, 'utf8').trim().split('\n');
  const cells = (line: string) => line.split(',');
  printTable('Effect budgets: relative deviation of the cycle', cells(head!), lines.map(cells));
}

/** The kernel of the search against the full analysis of the same circuit. */
function engineSpeed(): void {
  const circuit = createCircuit({
    supplyVolts: 5,
    r1Ohms: 1e6,
    r2Ohms: 1e6,
    r3Ohms: 1e6,
    timing: { kind: 'single', ohms: 887e3 },
    capacitor: { farads: 820e-9 },
    comparator: { delayHighLowSeconds: 1e-6, delayLowHighSeconds: 2e-6, highOhms: 50 },
  });
  const prepared = prepareSingle(circuit);
  const each = (count: number, work: (k: number) => void) => {
    for (let k = 0; k < count / 10; k += 1) work(k);
    const started = performance.now();
    for (let k = 0; k < count; k += 1) work(k);
    return ((performance.now() - started) * 1e6) / count;
  };
  const kernel = each(2_000_000, (k) => periodAt(prepared, 887e3 + k));
  const whole = each(100_000, () => analyseCycle(circuit));
  console.log('\nEngine, one circuit');
  console.log(
    `  full analysis ${whole.toFixed(0)} ns, search kernel ${kernel.toFixed(0)} ns, ratio ${(whole / kernel).toFixed(1)}\n`,
  );
}

function bareApp(db: Knex) {
  const app = express();
  app.get('/row', async (_req, res) => {
    res.json(await db.first(db.raw('1 as one')));
  });
  return app;
}

async function serve(app: express.Express): Promise<{ url: string; close(): void }> {
  const server = createServer(app);
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  const { port } = server.address() as AddressInfo;
  return { url: `http://127.0.0.1:${port}`, close: () => stop(server) };
}

function stop(server: Server): void {
  server.closeAllConnections();
  server.close();
}
