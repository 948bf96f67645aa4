import type { Database } from './connection.ts';

export interface BasketLine {
  id: string;
  token: string;
  quantity: number;
}

/** Whose basket: a signed-in user's, or a guest's by the hash of the key in the cookie. */
export type BasketKeeper = { userId: string } | { guestKeyHash: string };

function keeperColumns(keeper: BasketKeeper) {
  return 'userId' in keeper ? { user_id: keeper.userId } : { guest_key_hash: keeper.guestKeyHash };
}

/** The keeper's basket id, or null before anything was put in. */
export async function findBasket(db: Database, keeper: BasketKeeper): Promise<string | null> {
  const row = await db('baskets').where(keeperColumns(keeper)).first('id');
  return row?.id ?? null;
}

/** The keeper's basket id, made when there is none; two requests at once get the same one. */
export async function openBasket(db: Database, keeper: BasketKeeper): Promise<string> {
  const columns = keeperColumns(keeper);
  const [row] = await db('baskets')
    .insert(columns)
    .onConflict(Object.keys(columns))
    .merge({ updated_at: db.fn.now() })
    .returning('id');
  return row.id;
}

/** The lines of a basket, in the order they were put in. */
export async function basketLines(db: Database, basketId: string): Promise<BasketLine[]> {
  return db('basket_lines')
    .where({ basket_id: basketId })
    .orderBy(['added_at', 'id'])
    .select('id', 'token', 'quantity');
}

/** Adds kits to a basket; a pack already there gets the sum, capped at 500. */
export async function addBasketLine(
  db: Database,
  basketId: string,
  token: string,
  quantity: number,
): Promise<void> {
  await db('basket_lines')
    .insert({ basket_id: basketId, token, quantity })
    .onConflict(['basket_id', 'token'])
    .merge({ quantity: db.raw('least(500, basket_lines.quantity + excluded.quantity)') });
}

/** Sets a line's quantity; false when the basket has no such line. */
export async function setLineQuantity(
  db: Database,
  basketId: string,
  lineId: string,
  quantity: number,
): Promise<boolean> {
  const changed = await db('basket_lines')
    .where({ basket_id: basketId, id: lineId })
    .update({ quantity });
  return changed === 1;
}

/** Takes a line out; false when the basket has no such line. */
export async function removeLine(db: Database, basketId: string, lineId: string): Promise<boolean> {
  return (await db('basket_lines').where({ basket_id: basketId, id: lineId }).delete()) === 1;
}

/** Takes the given lines' kits out of a basket once they are ordered; later additions stay. */
export async function emptyBasket(
  db: Database,
  basketId: string,
  tokens: readonly string[],
): Promise<void> {
  await db('basket_lines').where({ basket_id: basketId }).whereIn('token', tokens).delete();
}

/** Moves a guest's lines into a user's basket at sign-in and forgets the guest's. */
export async function mergeBaskets(
  db: Database,
  guestId: string,
  userBasketId: string,
): Promise<void> {
  for (const line of await basketLines(db, guestId)) {
    await addBasketLine(db, userBasketId, line.token, line.quantity);
  }
  await db('baskets').where({ id: guestId }).delete();
}
