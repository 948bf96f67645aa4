import { createServer } from 'node:http';
import type { IncomingMessage } from 'node:http';
import type { AddressInfo } from 'node:net';
import { vi } from 'vitest';
import type { BenchOrder } from '../../server/contracts/bench.ts';

export interface Call {
  method: string;
  path: string;
  body: unknown;
  key: string | undefined;
}

type Answer = (call: Call) => { status: number; body: unknown } | 'hang up';

async function read(request: IncomingMessage): Promise<Call> {
  let text = '';
  for await (const piece of request) text += String(piece);
  const { method = '', url = '', headers } = request;
  const key = headers['idempotency-key'];
  const body: unknown = text === '' ? null : JSON.parse(text);
  return { method, path: url, body, key: typeof key === 'string' ? key : undefined };
}

/** An HTTP server that answers as told, with the page's requests led to it; it notes every call. */
export async function startAnswering(answer: Answer) {
  const calls: Call[] = [];
  const server = createServer((request, response) => {
    void read(request).then((call) => {
      calls.push(call);
      const said = answer(call);
      if (said === 'hang up') return request.socket.destroy();
      response.writeHead(said.status, { 'content-type': 'application/json', connection: 'close' });
      return response.end(JSON.stringify(said.body));
    });
  });
  await new Promise<void>((done) => server.listen(0, '127.0.0.1', done));
  const { port } = server.address() as AddressInfo;
  const real = globalThis.fetch;
  vi.stubGlobal('fetch', (path: string, init: RequestInit = {}) =>
    // The page's abort signals are jsdom's, which the real fetch does not take.
    real(`http://127.0.0.1:${port}${path}`, { ...init, signal: null }),
  );
  const stop = async () => {
    vi.unstubAllGlobals();
    await new Promise((done) => server.close(done));
  };
  return { calls, stop };
}

/** Keeps one order as the shop would: picks are ticked, and it can be packed and shipped. */
export function keepOrder(start: BenchOrder): { order: () => BenchOrder; answer: Answer } {
  let order = start;
  return {
    order: () => order,
    answer: ({ path, body }) => {
      if (path.endsWith('/picks')) {
        const { id, quantity } = body as { id: string; quantity: number };
        const picks = order.picks.map((pick) =>
          pick.id === id ? { ...pick, picked: quantity } : pick,
        );
        order = { ...order, picks };
      }
      if (path.endsWith('/pack')) order = { ...order, status: 'packed' };
      if (path.endsWith('/ship')) {
        const shipment = body as { carrier: string; tracking: string };
        order = { ...order, status: 'shipped', shipment };
      }
      return { status: 200, body: order };
    },
  };
}
