import { Router, type Request } from 'express';
import { pickRequestSchema, readingRequestSchema, shipRequestSchema } from '../contracts/bench.ts';
import { pageQuerySchema } from '../contracts/common.ts';
import type { Deps } from '../ports.ts';
import type { Packer } from '../use-cases/bench-order.ts';
import { claimOrder } from '../use-cases/claim-order.ts';
import { listQueue } from '../use-cases/list-queue.ts';
import { packOrder } from '../use-cases/pack-order.ts';
import { releaseOrder } from '../use-cases/release-order.ts';
import { shipOrder } from '../use-cases/ship-order.ts';
import { tickPick } from '../use-cases/tick-pick.ts';
import { tuneKit } from '../use-cases/tune-kit.ts';
import { viewBenchOrder } from '../use-cases/view-bench-order.ts';
import { idempotent } from './idempotent.ts';
import { guard, requireSignedIn } from './visitor.ts';

/** The packers' side. */
export function benchRoutes(deps: Deps): Router {
  const router = Router();
  const packer = (req: Request): Packer => {
    const { id, name } = requireSignedIn(req);
    return { id, name };
  };
  const refOf = (req: Request) => String(req.params.ref);

  router.get('/queue', guard('bench.see'), async (req, res) => {
    res.json(await listQueue(deps, packer(req), pageQuerySchema.parse(req.query)));
  });

  router.get('/orders/:ref', guard('bench.see'), async (req, res) => {
    res.json(await viewBenchOrder(deps, packer(req), refOf(req)));
  });

  router.post('/orders/:ref/claim', guard('bench.claim'), async (req, res) => {
    res.json(await claimOrder(deps, packer(req), refOf(req)));
  });

  router.post('/orders/:ref/release', guard('bench.claim'), async (req, res) => {
    res.json(await releaseOrder(deps, packer(req), refOf(req)));
  });

  router.post('/orders/:ref/picks', guard('bench.pick'), async (req, res) => {
    res.json(await tickPick(deps, packer(req), refOf(req), pickRequestSchema.parse(req.body)));
  });

  router.post(
    '/orders/:ref/readings',
    guard('bench.tune'),
    idempotent(deps, async (req) => ({
      status: 200,
      body: await tuneKit(deps, packer(req), refOf(req), readingRequestSchema.parse(req.body)),
    })),
  );

  router.post('/orders/:ref/pack', guard('bench.pick'), async (req, res) => {
    res.json(await packOrder(deps, packer(req), refOf(req)));
  });

  router.post(
    '/orders/:ref/ship',
    guard('bench.ship'),
    idempotent(deps, async (req) => ({
      status: 200,
      body: await shipOrder(deps, packer(req), refOf(req), shipRequestSchema.parse(req.body)),
    })),
  );

  return router;
}
