import type { Basket } from '../contracts/basket.ts';
import type { Deps } from '../ports.ts';
import {
  addBasketLine,
  findBasket,
  openBasket,
  removeLine,
  setLineQuantity,
  type BasketKeeper,
} from '../store/baskets.ts';
import { openPackBook, openToken } from './pack-book.ts';
import { Refusal } from './refusal.ts';
import { viewBasket } from './view-basket.ts';

type BasketDeps = Pick<Deps, 'db' | 'stockView' | 'signer'>;

/** Puts kits of a pack into the basket, if the shelves can make that many. */
export async function addToBasket(
  deps: BasketDeps,
  keeper: BasketKeeper,
  input: { token: string; quantity: number },
): Promise<Basket> {
  const opened = openToken(await openPackBook(deps), deps.signer, input.token);
  if (opened.kind === 'unknown') {
    throw new Refusal('invalid', 'This pack is unknown; ask for it again from the brief.', [
      { path: 'token', message: 'The token was not made by this shop, or was altered.' },
    ]);
  }
  if (opened.kind === 'gone') throw new Refusal('out-of-stock', opened.reason);
  const { makeable } = opened.assessed.pack;
  if (makeable < input.quantity) {
    throw new Refusal(
      'out-of-stock',
      `This pack can be made ${makeable} times today; lower the quantity or take another pack.`,
    );
  }
  const basketId = await openBasket(deps.db, keeper);
  await addBasketLine(deps.db, basketId, input.token, input.quantity);
  return viewBasket(deps, keeper);
}

/** Sets how many kits a basket line holds. */
export async function changeBasketLine(
  deps: BasketDeps,
  keeper: BasketKeeper | null,
  lineId: string,
  quantity: number,
): Promise<Basket> {
  await onOwnLine(deps, keeper, (basketId) => setLineQuantity(deps.db, basketId, lineId, quantity));
  return viewBasket(deps, keeper);
}

/** Takes a line out of the basket. */
export async function removeFromBasket(
  deps: BasketDeps,
  keeper: BasketKeeper | null,
  lineId: string,
): Promise<Basket> {
  await onOwnLine(deps, keeper, (basketId) => removeLine(deps.db, basketId, lineId));
  return viewBasket(deps, keeper);
}

async function onOwnLine(
  deps: BasketDeps,
  keeper: BasketKeeper | null,
  work: (basketId: string) => Promise<boolean>,
): Promise<void> {
  const basketId = keeper === null ? null : await findBasket(deps.db, keeper);
  if (basketId === null || !(await work(basketId))) {
    throw new Refusal('not-found', 'Your basket has no such line.');
  }
}
