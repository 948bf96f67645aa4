// @vitest-environment node
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { type AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { queryString, request } from '../../../client/lib/http.ts';
import { ConnectionError, ProblemError } from '../../../client/lib/problem-error.ts';

const schema = z.object({ ok: z.boolean(), key: z.string().optional() });

function reply(incoming: IncomingMessage, response: ServerResponse): void {
  const send = (status: number, body: unknown, type = 'application/json') => {
    response.writeHead(status, { 'Content-Type': type });
    response.end(typeof body === 'string' ? body : JSON.stringify(body));
  };
  switch (incoming.url) {
    case '/good':
      return send(200, { ok: true, key: incoming.headers['idempotency-key'] });
    case '/refused':
      return send(
        409,
        {
          type: 'https://tockwell.example/problems/out-of-stock',
          title: 'Not enough on the shelf',
          status: 409,
          detail: 'Only 3 are left.',
        },
        'application/problem+json',
      );
    case '/page':
      return send(502, '<html>bad gateway</html>', 'text/html');
    case '/other-shape':
      return send(200, { ok: 'yes' });
    default:
      return undefined;
  }
}

describe('request', () => {
  const server = createServer(reply);
  let base = '';
  beforeAll(async () => {
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    base = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  });
  afterAll(() => {
    server.closeAllConnections();
    server.close();
  });

  it('reads an answer by its contract and sends the idempotency key', async () => {
    const answer = await request(schema, `${base}/good`, {
      method: 'POST',
      body: {},
      idempotencyKey: 'once',
    });
    expect(answer).toEqual({ ok: true, key: 'once' });
  });

  it('throws a refusal with its kind, status and sentence', async () => {
    const error: unknown = await request(schema, `${base}/refused`).catch(
      (caught: unknown) => caught,
    );
    expect(error).toBeInstanceOf(ProblemError);
    expect(error).toMatchObject({ kind: 'out-of-stock', status: 409, message: 'Only 3 are left.' });
  });

  it('says that the answer cannot be read when it is no JSON', async () => {
    await expect(request(schema, `${base}/page`)).rejects.toBeInstanceOf(ConnectionError);
  });

  it('refuses an answer that breaks the contract', async () => {
    await expect(request(schema, `${base}/other-shape`)).rejects.toBeInstanceOf(ConnectionError);
  });

  it('can be cancelled', async () => {
    const control = new AbortController();
    const waiting = request(schema, `${base}/silent`, { signal: control.signal });
    control.abort();
    await expect(waiting).rejects.toMatchObject({ name: 'AbortError' });
  });

  it('says so when nobody answers', async () => {
    await expect(request(schema, 'http://127.0.0.1:1/')).rejects.toBeInstanceOf(ConnectionError);
  });
});

describe('queryString', () => {
  it('leaves absent and empty values out', () => {
    expect(queryString({ page: 2, token: null, search: '', exact: false })).toBe(
      '?page=2&exact=false',
    );
    expect(queryString({ token: undefined })).toBe('');
  });
});
