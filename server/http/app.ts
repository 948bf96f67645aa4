import { existsSync } from 'node:fs';
import path from 'node:path';
import compression from 'compression';
import cookieParser from 'cookie-parser';
import express, { type Express } from 'express';
import helmet from 'helmet';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import type { Deps } from '../ports.ts';
import { checkReadiness } from '../use-cases/check-readiness.ts';
import { authRoutes } from './auth-routes.ts';
import { basketRoutes } from './basket-routes.ts';
import { benchRoutes } from './bench-routes.ts';
import { deskRoutes } from './desk-routes.ts';
import { openApiDocument } from './openapi.ts';
import { orderRoutes } from './order-routes.ts';
import { packRoutes } from './pack-routes.ts';
import { errorMap, sendProblem } from './problem.ts';
import { readableAddress, recogniseVisitor, sameOriginOnly } from './visitor.ts';
import { webhookRoutes } from './webhook-routes.ts';

export interface AppSettings {
  sessionSecret: string;
  /** Cookies only over TLS. */
  secureCookies: boolean;
  /** Built client; null serves the interface alone. */
  clientDir: string | null;
  trustProxy: boolean;
  logger: Logger | null;
}

/** The whole web application over its dependencies. */
export function createApp(deps: Deps, settings: AppSettings): Express {
  const app = express();
  const cookies = { secret: settings.sessionSecret, secure: settings.secureCookies };
  app.disable('x-powered-by');
  if (settings.trustProxy) app.set('trust proxy', 1);
  if (settings.logger) app.use(requestLog(settings.logger));
  app.use(securityHeaders(settings.secureCookies), compression());

  app.get('/api/health', (_req, res) => {
    res.json({ status: 'ok' });
  });
  app.get('/api/ready', async (_req, res) => {
    if (await checkReadiness(deps)) res.json({ status: 'ready' });
    else sendProblem(res, 'not-ready', 'The database does not answer or is not migrated yet.');
  });
  app.use('/api/webhooks', webhookRoutes(deps));

  app.use('/api', readableAddress, (_req, res, next) => {
    res.set('Cache-Control', 'no-store');
    next();
  });
  app.use('/api', express.json({ limit: '100kb' }), cookieParser(), sameOriginOnly);
  app.get('/api/openapi.json', (_req, res) => {
    res.json(openApiDocument(deps.publicUrl));
  });
  app.use('/api', recogniseVisitor(deps, cookies));
  app.use('/api/auth', authRoutes(deps, cookies));
  app.use('/api/basket', basketRoutes(deps, cookies));
  app.use('/api/bench', benchRoutes(deps));
  app.use('/api/desk', deskRoutes(deps));
  app.use('/api', packRoutes(deps), orderRoutes(deps));
  app.use('/api', (_req, res) => sendProblem(res, 'not-found', 'There is no such call.'));

  if (settings.clientDir !== null) serveClient(app, settings.clientDir);
  app.use(errorMap);
  return app;
}

function requestLog(logger: Logger) {
  return pinoHttp({
    logger,
    // Tokens travel in the query of links from mails; they do not belong in a log.
    serializers: {
      req: (req: { id: unknown; method: string; url: string }) => ({
        id: req.id,
        method: req.method,
        url: req.url.split('?')[0],
      }),
      res: (res: { statusCode: number }) => ({ status: res.statusCode }),
    },
    customLogLevel: (_req, res, error) =>
      error || res.statusCode >= 500 ? 'error' : res.statusCode >= 400 ? 'info' : 'debug',
  });
}

function securityHeaders(secure: boolean) {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'"],
        styleSrc: ["'self'"],
        imgSrc: ["'self'", 'data:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'self'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        ...(secure ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    hsts: secure,
    referrerPolicy: { policy: 'same-origin' },
  });
}

/** Serves the built pages: hashed files for a year, the page itself never from a cache. */
function serveClient(app: Express, clientDir: string): void {
  const page = path.resolve(clientDir, 'index.html');
  if (!existsSync(page)) throw new Error(`No built client in ${clientDir}; run the build first.`);
  app.use(
    '/assets',
    express.static(path.resolve(clientDir, 'assets'), {
      immutable: true,
      maxAge: '1y',
      fallthrough: false,
    }),
  );
  app.use(express.static(path.resolve(clientDir), { index: false, maxAge: '1h' }));
  app.get('/{*splat}', (_req, res) => {
    res.set('Cache-Control', 'no-cache').sendFile(page);
  });
}
