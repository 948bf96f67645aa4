import { Router, type Request } from 'express';
import {
  auditQuerySchema,
  changePriceSchema,
  changeStockSchema,
  deskOrdersQuerySchema,
  deskPartsQuerySchema,
  refundRequestSchema,
} from '../contracts/desk.ts';
import type { Deps } from '../ports.ts';
import { changePrice } from '../use-cases/change-price.ts';
import { correctStock } from '../use-cases/correct-stock.ts';
import { mapCoverage } from '../use-cases/map-coverage.ts';
import { refundOrder } from '../use-cases/refund-order.ts';
import { Refusal } from '../use-cases/refusal.ts';
import { listAuditPage } from '../use-cases/list-audit.ts';
import { listDeskOrders } from '../use-cases/list-desk-orders.ts';
import { listDeskPartsPage } from '../use-cases/list-desk-parts.ts';
import { viewDeskOrder } from '../use-cases/view-desk-order.ts';
import { viewDeskPart } from '../use-cases/view-desk-part.ts';
import { viewPartHistory } from '../use-cases/view-part-history.ts';
import { viewToday } from '../use-cases/view-today.ts';
import { idempotent } from './idempotent.ts';
import { guard, requireSignedIn } from './visitor.ts';

const largestId = 2 ** 31 - 1;

function partId(req: Request): number {
  const id = Number(req.params.id);
  if (!Number.isInteger(id) || id < 1 || id > largestId) {
    throw new Refusal('not-found', 'The catalogue has no such part.');
  }
  return id;
}

/** The owner's side. */
export function deskRoutes(deps: Deps): Router {
  const router = Router();
  router.use(guard('desk.see'));
  const actor = (req: Request) => {
    const { id, name } = requireSignedIn(req);
    return { id, name };
  };

  router.get('/today', async (_req, res) => {
    res.json(await viewToday(deps));
  });

  router.get('/coverage', async (_req, res) => {
    res.json(await mapCoverage(deps));
  });

  router.get('/parts', async (req, res) => {
    res.json(await listDeskPartsPage(deps, deskPartsQuerySchema.parse(req.query)));
  });

  router.get('/parts/:id', async (req, res) => {
    res.json(await viewDeskPart(deps, partId(req)));
  });

  router.get('/parts/:id/history', async (req, res) => {
    res.json(await viewPartHistory(deps, partId(req)));
  });

  router.patch('/parts/:id/price', guard('desk.change-price'), async (req, res) => {
    res.json(await changePrice(deps, actor(req), partId(req), changePriceSchema.parse(req.body)));
  });

  router.post(
    '/parts/:id/stock',
    guard('desk.change-stock'),
    idempotent(deps, async (req) => ({
      status: 200,
      body: await correctStock(deps, actor(req), partId(req), changeStockSchema.parse(req.body)),
    })),
  );

  router.get('/orders', async (req, res) => {
    res.json(await listDeskOrders(deps, deskOrdersQuerySchema.parse(req.query)));
  });

  router.get('/orders/:ref', async (req, res) => {
    res.json(await viewDeskOrder(deps, String(req.params.ref)));
  });

  router.post(
    '/orders/:ref/refund',
    guard('desk.refund'),
    idempotent(deps, async (req) => {
      const ref = String(req.params.ref);
      await refundOrder(deps, actor(req), ref, refundRequestSchema.parse(req.body).reason);
      return { status: 200, body: await viewDeskOrder(deps, ref) };
    }),
  );

  router.get('/audit', guard('desk.audit'), async (req, res) => {
    res.json(await listAuditPage(deps, auditQuerySchema.parse(req.query)));
  });

  return router;
}
