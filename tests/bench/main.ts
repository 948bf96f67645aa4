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
import { warmSearch } from '../../server/use-cases/solve-brief.ts';
import { httpThroughput } from './http-throughput.ts';

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
await solveAll(rates.slice(0, 60));
const reference = await timeCalls(400, () => fetch(`${bare.url}/row`).then((res) => res.json()));
const solved = await solveAll(rates);

console.log(
  '\nPOST /api/packs/solve, rank closest, 400 rates from 0.05 Hz to 50 kHz, seeded stock',
);
row('bare Express + one-row SELECT', reference);
row('solve', solved.times);
console.log(
  `  ratio at the median ${(quantile(solved.times, 0.5) / quantile(reference, 0.5)).toFixed(1)}`,
);
console.log(`  p95 ${quantile(solved.times, 0.95).toFixed(1)} ms, wanted under 100 ms`);
console.log(`  worst nominal error ${(solved.worst * 100).toExponential(2)} %, wanted under 0.1 %`);
await httpThroughput(deps);
engineSpeed();

shop.close();
bare.close();
await deps.close();
process.exitCode = quantile(solved.times, 0.95) < 100 && solved.worst < 1e-3 ? 0 : 1;

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

function quantile(times: readonly number[], share: number): number {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? NaN;
}

function row(name: string, times: readonly number[]): void {
  const [p50, p95, p99] = [0.5, 0.95, 0.99].map((share) => quantile(times, share).toFixed(1));
  console.log(`  ${name.padEnd(32)} p50 ${p50} ms   p95 ${p95} ms   p99 ${p99} ms`);
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
