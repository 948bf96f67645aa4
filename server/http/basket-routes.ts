import { Router } from 'express';
import { z } from 'zod';
import { addToBasketSchema, changeLineSchema } from '../contracts/basket.ts';
import type { Deps } from '../ports.ts';
import { addToBasket, changeBasketLine, removeFromBasket } from '../use-cases/change-basket.ts';
import { viewBasket } from '../use-cases/view-basket.ts';
import { Refusal } from '../use-cases/refusal.ts';
import type { CookieSettings } from './session-cookies.ts';
import { basketKeeper, openBasketKeeper } from './visitor.ts';

/** An id of a line; anything else is no line of anybody's. */
export function lineId(value: string | undefined): string {
  const parsed = z.uuid().safeParse(value);
  if (!parsed.success) throw new Refusal('not-found', 'There is no such line.');
  return parsed.data;
}

/** The basket, a guest's or a signed-in buyer's. */
export function basketRoutes(
  deps: Pick<Deps, 'db' | 'stockView' | 'signer'>,
  cookies: CookieSettings,
): Router {
  const router = Router();

  router.get('/', async (req, res) => {
    res.json(await viewBasket(deps, basketKeeper(req)));
  });

  router.post('/lines', async (req, res) => {
    const input = addToBasketSchema.parse(req.body);
    res.status(201).json(await addToBasket(deps, openBasketKeeper(req, res, cookies), input));
  });

  router.patch('/lines/:id', async (req, res) => {
    const { quantity } = changeLineSchema.parse(req.body);
    res.json(await changeBasketLine(deps, basketKeeper(req), lineId(req.params.id), quantity));
  });

  router.delete('/lines/:id', async (req, res) => {
    res.json(await removeFromBasket(deps, basketKeeper(req), lineId(req.params.id)));
  });

  return router;
}
