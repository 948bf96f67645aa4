import express, { Router, type Response } from 'express';
import { declineOf, readCard, type CardField } from './card.ts';
import type { PageTrouble } from './card-form.ts';
import { endedPage, payPage, successAddress } from './card-page.ts';
import { completePayment, declinePayment } from './payments.ts';
import type { Service } from './service.ts';
import { findSession } from './sessions.ts';
import type { KeptSession } from './state.ts';

/** The hosted card page. `afterPayment` is called when events wait to be sent. */
export function cardRouter(service: Service, shopName: string, afterPayment: () => void): Router {
  const router = Router();
  const find = (id: string) => (service.state.sessions[id] ? findSession(service, id) : null);
  const show = (response: Response, kept: KeptSession | null, trouble: PageTrouble | null) => {
    response.set('content-security-policy', policyFor(kept));
    if (kept?.session.status !== 'open') {
      response.status(kept ? 410 : 404).send(endedPage(shopName, kept));
      return;
    }
    const status = trouble ? (trouble.decline ? 402 : 422) : 200;
    response.status(status).send(payPage(shopName, kept, trouble));
  };

  router.get('/:id', (request, response) => show(response, find(request.params.id), null));
  router.post('/:id', express.urlencoded({ extended: false }), (request, response) => {
    const kept = find(request.params.id);
    // A second press of the button, or another tab: paid is paid, and the buyer goes on.
    if (kept?.session.status === 'complete') return response.redirect(303, successAddress(kept));
    if (kept?.session.status !== 'open') return show(response, kept, null);
    const trouble = pay(service, kept, typedFields(request.body));
    afterPayment();
    if (trouble) return show(response, kept, trouble);
    response.redirect(303, successAddress(kept));
  });
  return router;
}

function pay(service: Service, kept: KeptSession, typed: Record<CardField, string>) {
  const again = { expiry: typed.expiry, name: typed.name };
  const outcome = readCard(typed, new Date(service.now()));
  if ('faults' in outcome) return { faults: outcome.faults, decline: null, typed: again };
  const decline = declineOf(outcome.card);
  if (!decline) {
    completePayment(service, kept, outcome.card);
    return null;
  }
  declinePayment(service, kept, decline);
  return { faults: {}, decline: decline.message, typed: again };
}

function typedFields(body: unknown): Record<CardField, string> {
  const form = (body ?? {}) as Record<string, unknown>;
  const text = (name: CardField) => (typeof form[name] === 'string' ? form[name] : '');
  return { number: text('number'), expiry: text('expiry'), code: text('code'), name: text('name') };
}

/** Browsers hold the redirect after a form to the form's own policy, so the shop is named in it. */
function policyFor(kept: KeptSession | null): string {
  const shop = kept?.session.success_url ? new URL(kept.session.success_url).origin : '';
  const sources = "default-src 'none'; style-src 'self'; font-src 'self'; img-src data:";
  return `${sources}; form-action 'self' ${shop}; base-uri 'none'; frame-ancestors 'none'`;
}
