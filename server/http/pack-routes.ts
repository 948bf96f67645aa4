import { Router } from 'express';
import { rateLimit } from 'express-rate-limit';
import { solveRequestSchema } from '../contracts/brief.ts';
import { analyseRequestSchema } from '../contracts/circuits.ts';
import { partsQuerySchema } from '../contracts/parts.ts';
import type { Deps } from '../ports.ts';
import { analyseCircuit } from '../use-cases/analyse-circuit.ts';
import { listParts } from '../use-cases/list-parts.ts';
import { solveBrief } from '../use-cases/solve-brief.ts';
import { viewPack } from '../use-cases/view-pack.ts';
import { viewShop } from '../use-cases/view-shop.ts';
import { sendProblem } from './problem.ts';

/** Generous for somebody who types; a wall for a program that hammers. */
const solvesPerMinute = 6000;

/** The public side: shop, catalogue, circuits, packs. */
export function packRoutes(
  deps: Pick<Deps, 'db' | 'stockView' | 'signer' | 'demo' | 'mailPageUrl'>,
): Router {
  const router = Router();
  const limiter = rateLimit({
    windowMs: 60_000,
    limit: solvesPerMinute,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    handler: (_req, res) =>
      sendProblem(res, 'too-many-requests', 'Too many requests; wait a minute.'),
  });

  router.get('/shop', async (_req, res) => {
    res.json(await viewShop(deps));
  });

  router.get('/parts', async (req, res) => {
    res.json(await listParts(deps, partsQuerySchema.parse(req.query)));
  });

  router.post('/circuits/analyse', limiter, (req, res) => {
    res.json(analyseCircuit(analyseRequestSchema.parse(req.body)));
  });

  router.post('/packs/solve', limiter, async (req, res) => {
    res.json(await solveBrief(deps, solveRequestSchema.parse(req.body)));
  });

  router.get('/packs/:token', async (req, res) => {
    res.json(await viewPack(deps, req.params.token));
  });

  return router;
}
