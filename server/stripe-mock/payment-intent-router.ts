import { Router } from 'express';
import { expanded } from './expand.ts';
import * as parameters from './intent-parameters.ts';
import { readParameters } from './parameters.ts';
import { cancelIntent, confirmIntent, createIntent, updateIntent } from './payment-intents.ts';
import type { Service } from './service.ts';

/** What changes a payment intent; reading is the listing's part. */
export function paymentIntentRouter(service: Service): Router {
  const router = Router();
  const { state } = service;
  router.post('/', (request, response) => {
    const asked = readParameters(parameters.intentParameters, request.body);
    response.json(expanded(state, createIntent(service, asked), asked.expand));
  });
  router.post('/:id', (request, response) => {
    const asked = readParameters(parameters.updateParameters, request.body);
    response.json(expanded(state, updateIntent(service, request.params.id, asked), asked.expand));
  });
  router.post('/:id/confirm', (request, response) => {
    const asked = readParameters(parameters.confirmParameters, request.body);
    const intent = confirmIntent(service, request.params.id, asked.payment_method);
    response.json(expanded(state, intent, asked.expand));
  });
  router.post('/:id/cancel', (request, response) => {
    const asked = readParameters(parameters.cancelParameters, request.body);
    response.json(expanded(state, cancelIntent(service, request.params.id, asked), asked.expand));
  });
  return router;
}
