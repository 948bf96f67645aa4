import type { z } from 'zod';
import { problemSchema } from '../../server/contracts/common.ts';
import { ConnectionError, ProblemError } from './problem-error.ts';

export interface RequestOptions {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  body?: unknown;
  signal?: AbortSignal;
  /** Sent as Idempotency-Key: the same key never makes money or stock move twice. */
  idempotencyKey?: string;
}

/** A fresh key for one intent of the person at the screen; keep it across retries of that intent. */
export function newIdempotencyKey(): string {
  if (typeof crypto.randomUUID === 'function') return crypto.randomUUID();
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** `?a=1&b=2` from the given values; absent and empty ones are left out. */
export function queryString(
  values: Record<string, string | number | boolean | null | undefined>,
): string {
  const query = new URLSearchParams();
  for (const [key, value] of Object.entries(values)) {
    if (value !== undefined && value !== null && value !== '') query.set(key, String(value));
  }
  const text = query.toString();
  return text === '' ? '' : `?${text}`;
}

async function send(path: string, options: RequestOptions): Promise<Response> {
  const headers: Record<string, string> = { Accept: 'application/json' };
  if (options.body !== undefined) headers['Content-Type'] = 'application/json';
  if (options.idempotencyKey !== undefined) headers['Idempotency-Key'] = options.idempotencyKey;
  try {
    return await fetch(path, {
      method: options.method ?? 'GET',
      headers,
      credentials: 'same-origin',
      body: options.body === undefined ? undefined : JSON.stringify(options.body),
      signal: options.signal,
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new ConnectionError();
  }
}

async function readJson(response: Response): Promise<unknown> {
  const text = await response.text();
  if (text === '') return undefined;
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new ConnectionError('The shop answered with something that could not be read.');
  }
}

function problemFrom(response: Response, body: unknown): ProblemError {
  const parsed = problemSchema.safeParse(body);
  if (parsed.success) return new ProblemError(parsed.data);
  return new ProblemError({
    type: 'about:blank',
    title: 'The shop could not answer',
    status: response.status,
    detail: `The shop could not answer just now (${response.status}). Try again in a moment.`,
  });
}

/** Sends a request and reads the answer by its contract; throws ProblemError or ConnectionError. */
export async function request<Schema extends z.ZodType>(
  schema: Schema,
  path: string,
  options: RequestOptions = {},
): Promise<z.output<Schema>> {
  const response = await send(path, options);
  const body = response.status === 204 ? undefined : await readJson(response);
  if (!response.ok) throw problemFrom(response, body);
  const parsed = schema.safeParse(body);
  if (!parsed.success) {
    throw new ConnectionError(
      'The shop answered in a form this page does not know. Load it again.',
    );
  }
  return parsed.data;
}
