import express, { Router, type NextFunction, type Request, type Response } from 'express';
import { answerError, refuseAddress } from './api-answers.ts';
import { ApiError } from './api-error.ts';
import { expanded } from './expand.ts';
import { idempotent } from './idempotency.ts';
import { makeId } from './ids.ts';
import { expandOf, list, readable } from './listing.ts';
import * as parameters from './parameters.ts';
import { paymentIntentRouter } from './payment-intent-router.ts';
import { createRefund } from './refunds.ts';
import type { Service } from './service.ts';
import { createSession, expireSession, findSession } from './sessions.ts';
import type { KeptSession, State } from './state.ts';

const { readParameters } = parameters;

/** The service's API under /v1. `afterAnswer` is called when events may wait to be sent. */
export function apiRouter(service: Service, secretKey: string, afterAnswer: () => void): Router {
  const router = Router();
  const { state } = service;
  router.use((_request, response, next) => {
    response.set('request-id', makeId('req', 14));
    response.on('finish', afterAnswer);
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
    response.json(sessionView(state, kept, expandOf(request)));
  });
  router.post('/refunds', (request, response) => {
    const asked = readParameters(parameters.refundParameters, request.body);
    response.json(expanded(state, createRefund(service, asked), asked.expand));
  });
  router.use('/payment_intents', paymentIntentRouter(service));
  readable(router, state, {
    place: 'payment_intents',
    kind: 'payment_intent',
    param: 'intent',
    all: () => state.intents,
  });
  readable(router, state, { place: 'charges', kind: 'charge', all: () => state.charges });
  readable(router, state, { place: 'refunds', kind: 'refund', all: () => state.refunds });
  readable(router, state, { place: 'events', kind: 'event', all: () => state.events });

  router.use(refuseAddress);
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

/** A session as the API shows it: its items only when they are asked for. */
function sessionView(state: State, kept: KeptSession, paths: string[] = []): object {
  const data = kept.lineItems;
  const url = `/v1/checkout/sessions/${kept.session.id}/line_items`;
  const withItems = { line_items: { object: 'list', data, has_more: false, url } };
  const asked = paths.some((path) => path.split('.')[0] === 'line_items');
  return expanded(state, { ...kept.session, ...(asked && withItems) }, paths);
}
