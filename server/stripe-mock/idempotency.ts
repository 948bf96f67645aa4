import { createHash } from 'node:crypto';
import type { NextFunction, Request, Response } from 'express';
import { ApiError } from './api-error.ts';
import type { Service } from './service.ts';

/** Gives a repeated request under one key the first answer; another request under it is refused. */
export function idempotent(service: Service) {
  return (request: Request, response: Response, next: NextFunction): void => {
    const key = request.get('idempotency-key');
    if (request.method !== 'POST' || !key) return next();
    const requestHash = hashOf([request.originalUrl, JSON.stringify(request.body ?? {})]);
    const kept = service.state.answers[key];
    if (!kept) {
      keepAnswer(service, response, key, requestHash);
      return next();
    }
    if (kept.requestHash !== requestHash) {
      const rule = 'Keys for idempotent requests can only be used with the same parameters';
      return next(new ApiError(400, 'idempotency_error', `${rule} they were first used with.`));
    }
    response.set({ 'idempotent-replayed': 'true', 'idempotency-key': key });
    response.status(kept.status).json(kept.body);
  };
}

function hashOf(parts: string[]): string {
  return createHash('sha256').update(parts.join('\n')).digest('hex');
}

/** Remembers what is sent, when it is a success; after a refusal the key may be tried again. */
function keepAnswer(service: Service, response: Response, key: string, requestHash: string): void {
  response.set('idempotency-key', key);
  const send = response.json.bind(response);
  response.json = (body: object) => {
    if (response.statusCode < 400) {
      service.state.answers[key] = { requestHash, status: response.statusCode, body };
      service.save();
    }
    return send(body);
  };
}
