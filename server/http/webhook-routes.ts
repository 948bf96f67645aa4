import express, { Router } from 'express';
import type { Deps } from '../ports.ts';
import { receivePaymentEvent } from '../use-cases/receive-payment-event.ts';
import { Refusal } from '../use-cases/refusal.ts';

/** Signed calls of the payment service. The signature is over the raw bytes, so no JSON parser comes before. */
export function webhookRoutes(deps: Pick<Deps, 'db' | 'payments'>): Router {
  const router = Router();
  router.post('/stripe', express.raw({ type: () => true, limit: '512kb' }), async (req, res) => {
    const signature = req.get('stripe-signature');
    if (signature === undefined || !Buffer.isBuffer(req.body)) {
      throw new Refusal('bad-signature', 'The Stripe-Signature header or the body is missing.');
    }
    await receivePaymentEvent(deps, req.body, signature);
    res.json({ received: true });
  });
  return router;
}
