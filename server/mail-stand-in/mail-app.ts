import express, { type Express } from 'express';
import { lookRouter } from '../stand-in-look/look-router.ts';
import type { MailBox } from './mail-box.ts';
import { listPage, mailPage, missingPage } from './mail-pages.ts';

const ownPages = "default-src 'none'; style-src 'self'; font-src 'self'; img-src data:";
const ownPolicy = `${ownPages}; frame-src 'self'; form-action 'self'; base-uri 'none'`;
// A mail's own page runs nothing and fetches nothing, whoever opens it.
const letterPolicy =
  "sandbox allow-popups; default-src 'none'; style-src 'unsafe-inline'; img-src data:";

/** The pages and the JSON of caught mail. */
export function createMailApp(box: MailBox): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use('/look', lookRouter());
  app.use((_request, response, next) => {
    response.set({ 'content-security-policy': ownPolicy, 'cache-control': 'no-store' });
    next();
  });
  app.get('/api/mails', (_request, response) => void response.json(box.list()));
  app.delete('/api/mails', (_request, response) => {
    box.clear();
    response.status(204).end();
  });
  app.get('/', (_request, response) => void response.send(listPage(box.list())));
  app.post('/clear', (_request, response) => {
    box.clear();
    response.redirect(303, '/');
  });
  app.get('/mails/:id', (request, response) => {
    const kept = box.find(request.params.id);
    if (kept) response.send(mailPage(kept.mail, kept.source));
    else response.status(404).send(missingPage());
  });
  app.get('/mails/:id/page', (request, response) => {
    const letter = box.find(request.params.id)?.mail.html;
    response.set('content-security-policy', letterPolicy);
    if (letter) response.send(letter);
    else response.status(404).send(missingPage());
  });
  return app;
}
