import { createHash } from 'node:crypto';
import type { NextFunction, Request, Response } from 'express';
import { ApiError, invalidRequest } from './api-error.ts';
import type { Service } from './service.ts';

const longestKey = 255;
const keptMs = 24 * 3_600_000;

/**
 * Gives a repeated request under one key the first answer; another request under it is refused.
 *
 * The service keeps the first answer once the work has begun, good or bad: 2xx, a declined card
 * (402), a refusal by the state of things (400) and 500 are all replayed. A request wrong in
 * itself (parameters, address, API key) is not kept and may be mended under the same key. Its
 * reference does not say on which side an unknown id falls; here it is not kept. Two requests at
 * once under one key, which the service refuses with 409, cannot meet: each is done in one turn.
 */
export function idempotent(service: Service) {
  return (request: Request, response: Response, next: NextFunction): void => {
    const key = request.get('idempotency-key');
    if (request.method !== 'POST' || !key) return next();
    if (key.length > longestKey) {
      return next(invalidRequest(`An idempotency key has at most ${longestKey} characters.`));
    }
    forgetOld(service);
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

function forgetOld(service: Service): void {
  const { answers } = service.state;
  for (const [key, { keptAt }] of Object.entries(answers)) {
    if (service.now() - keptAt >= keptMs) delete answers[key];
  }
}

function keepAnswer(service: Service, response: Response, key: string, requestHash: string): void {
  response.set('idempotency-key', key);
  const send = response.json.bind(response);
  response.json = (body: object) => {
    if (response.statusCode < 400 || response.locals.underWay === true) {
      const { statusCode: status } = response;
      service.state.answers[key] = { requestHash, keptAt: service.now(), status, body };
      service.save();
    }
    return send(body);
  };
}
