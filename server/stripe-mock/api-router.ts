import express, { Router, type NextFunction, type Request, type Response } from 'express';
import { z } from 'zod';
import { ApiError, errorBody, missingResource } from './api-error.ts';
import { expanded } from './expand.ts';
import { idempotent } from './idempotency.ts';
import { makeId } from './ids.ts';
import * as parameters from './parameters.ts';
import { createRefund } from './refunds.ts';
import type { Service } from './service.ts';
import { createSession, expireSession, findSession } from './sessions.ts';
import type { KeptSession, State } from './state.ts';

const { readParameters } = parameters;

/** The service's API under /v1. `afterChange` is called when events may wait to be sent. */
export function apiRouter(service: Service, secretKey: string, afterChange: () => void): Router {
  const router = Router();
  const { state } = service;
  router.use((_request, response, next) => {
    response.set('request-id', makeId('req', 14));
    next();
  });
  router.use(authenticated(secretKey), express.urlencoded({ extended: true, limit: '1mb' }));
  router.use(idempotent(service));

  router.post('/checkout/sessions', (request, response) => {
    const asked = readParameters(parameters.sessionParameters, request.body);
    response.json(sessionView(state, createSession(service, asked), asked.expand));
  });
  router.get('/checkout/sessions/:id', (request, response) => {
    response.json(sessionView(state, findSession(service, request.params.id), expandOf(request)));
  });
  router.get('/checkout/sessions/:id/line_items', (request, response) => {
    const { lineItems } = findSession(service, request.params.id);
    response.json(list(request, request.baseUrl + request.path, lineItems));
  });
  router.post('/checkout/sessions/:id/expire', (request, response) => {
    const kept = expireSession(service, request.params.id);
    afterChange();
    response.json(sessionView(state, kept, expandOf(request)));
  });
  router.post('/refunds', (request, response) => {
    const asked = readParameters(parameters.refundParameters, request.body);
    const refund = createRefund(service, asked);
    afterChange();
    response.json(expanded(state, refund, asked.expand));
  });
  readable(router, state, 'payment_intents', 'payment_intent', () => state.intents);
  readable(router, state, 'charges', 'charge', () => state.charges);
  readable(router, state, 'refunds', 'refund', () => state.refunds);
  readable(router, state, 'events', 'event', () => state.events);

  router.use((request) => {
    const message = `Unrecognized request URL (${request.method}: ${request.originalUrl}).`;
    throw new ApiError(404, 'invalid_request_error', message);
  });
  router.use(answerError);
  return router;
}

function authenticated(secretKey: string) {
  return (request: Request, _response: Response, next: NextFunction): void => {
    const [scheme, key] = (request.get('authorization') ?? '').split(' ');
    if (scheme?.toLowerCase() === 'bearer' && key === secretKey) return next();
    const message = key ? 'Invalid API Key provided.' : 'You did not provide an API key.';
    next(new ApiError(401, 'invalid_request_error', message));
  };
}

/** Retrieve and list of one kind of object, newest first. */
function readable(
  router: Router,
  state: State,
  place: string,
  kind: string,
  all: () => Record<string, object & { id: string }>,
): void {
  router.get(`/${place}/:id`, (request, response) => {
    const found = all()[request.params.id];
    if (!found) throw missingResource(kind, request.params.id);
    response.json(expanded(state, found, expandOf(request)));
  });
  router.get(`/${place}`, (request, response) => {
    const answer = list(request, `/v1/${place}`, Object.values(all()).reverse());
    response.json(expanded(state, answer, expandOf(request)));
  });
}

const filters = ['payment_intent', 'charge', 'type'] as const;

function list(request: Request, url: string, all: (object & { id: string })[]) {
  const asked = readParameters(parameters.listParameters, request.query);
  const matching = all.filter((item) =>
    filters.every((name) => asked[name] === undefined || valueOf(item, name) === asked[name]),
  );
  const from = matching.findIndex(({ id }) => id === asked.starting_after) + 1;
  const data = matching.slice(from, from + asked.limit);
  return { object: 'list', url, has_more: matching.length > from + asked.limit, data };
}

function valueOf(item: object, name: string): unknown {
  return (item as Record<string, unknown>)[name];
}

function expandOf(request: Request): string[] | undefined {
  const source = (request.method === 'GET' ? request.query : request.body) as object | undefined;
  return readParameters(z.object({ expand: z.array(z.string()).optional() }), source).expand;
}

/** A session as the API shows it: its items only when they are asked for. */
function sessionView(state: State, kept: KeptSession, paths: string[] = []): object {
  const data = kept.lineItems;
  const url = `/v1/checkout/sessions/${kept.session.id}/line_items`;
  const withItems = { line_items: { object: 'list', data, has_more: false, url } };
  const asked = paths.some((path) => path.split('.')[0] === 'line_items');
  return expanded(state, { ...kept.session, ...(asked && withItems) }, paths);
}

function answerError(error: unknown, _request: Request, response: Response, next: NextFunction) {
  if (response.headersSent) return next(error);
  const known = error instanceof ApiError ? error : unforeseen(error);
  response.status(known.status).json(errorBody(known));
}

function unforeseen(error: unknown): ApiError {
  const status = (error as { status?: unknown }).status;
  const message = error instanceof Error ? error.message : 'No reason known.';
  return typeof status === 'number' && status < 500
    ? new ApiError(status, 'invalid_request_error', message)
    : new ApiError(500, 'api_error', message);
}
