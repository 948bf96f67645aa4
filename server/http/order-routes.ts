import { Router, type Request } from 'express';
import { pageQuerySchema } from '../contracts/common.ts';
import { checkoutSchema, quoteQuerySchema } from '../contracts/orders.ts';
import type { Deps } from '../ports.ts';
import { placeOrder } from '../use-cases/place-order.ts';
import { quoteCheckout } from '../use-cases/quote-checkout.ts';
import { viewBuildSheet } from '../use-cases/view-build-sheet.ts';
import { listMyOrders, viewOrder, type OrderReader } from '../use-cases/view-order.ts';
import { lineId } from './basket-routes.ts';
import { idempotent } from './idempotent.ts';
import { basketKeeper, guard, requireSignedIn, signedIn } from './visitor.ts';

/** Checkout, and the buyer's own orders. */
export function orderRoutes(deps: Deps): Router {
  const router = Router();
  const reader = (req: Request): OrderReader => ({
    userId: signedIn(req)?.id ?? null,
    token: typeof req.query.token === 'string' ? req.query.token : null,
  });

  router.get('/checkout/quote', async (req, res) => {
    res.json(await quoteCheckout(deps, basketKeeper(req), quoteQuerySchema.parse(req.query)));
  });

  router.post(
    '/checkout',
    idempotent(deps, async (req) => {
      const buyer = { keeper: basketKeeper(req), userId: signedIn(req)?.id ?? null };
      return { status: 201, body: await placeOrder(deps, buyer, checkoutSchema.parse(req.body)) };
    }),
  );

  router.get('/orders', guard('orders.own'), async (req, res) => {
    res.json(await listMyOrders(deps, requireSignedIn(req).id, pageQuerySchema.parse(req.query)));
  });

  router.get('/orders/:ref', async (req, res) => {
    res.json(await viewOrder(deps, reader(req), req.params.ref));
  });

  router.get('/orders/:ref/lines/:id/build-sheet', async (req, res) => {
    res.json(await viewBuildSheet(deps, reader(req), req.params.ref, lineId(req.params.id)));
  });

  router.get('/orders/:ref/lines/:id/build-sheet.pdf', async (req, res) => {
    const sheet = await viewBuildSheet(deps, reader(req), req.params.ref, lineId(req.params.id));
    res
      .type('application/pdf')
      .set('Content-Disposition', `inline; filename="build-sheet-${sheet.identifier}.pdf"`)
      .send(await deps.printer.buildSheet(sheet));
  });

  return router;
}
