import type { Basket } from '../contracts/basket.ts';
import { money } from '../domain/money.ts';
import { demandOfChoice } from '../domain/pack-choice.ts';
import { mergeDemands, type PartDemand } from '../domain/stock.ts';
import type { Deps } from '../ports.ts';
import { basketLines, findBasket, type BasketKeeper, type BasketLine } from '../store/baskets.ts';
import { openPackBook, openToken, type AssessedPack, type PackBook } from './pack-book.ts';

export type { BasketKeeper };

/** A basket line with its pack worked out from today's shelves and prices. */
export interface OpenBasketLine {
  line: BasketLine;
  assessed: AssessedPack;
  /** A sentence when the shelves cannot make it beside the lines before; null otherwise. */
  problem: string | null;
}

/**
 * Works out every line of a basket against one picture of the shelves. Lines are served in the order
 * they were put in, so two lines never count on the same pieces. A line whose pack is no more is
 * left out.
 */
export function openLines(
  book: PackBook,
  signer: Deps['signer'],
  lines: readonly BasketLine[],
): OpenBasketLine[] {
  const taken = new Map<number, number>();
  const left = (partId: number) =>
    (book.byId.get(partId)?.available ?? 0) - (taken.get(partId) ?? 0);
  const opened: OpenBasketLine[] = [];
  for (const line of lines) {
    const token = openToken(book, signer, line.token);
    if (token.kind !== 'opened') continue;
    const demand = mergeDemands(
      demandOfChoice(token.assessed.choice).map((part) => ({
        ...part,
        quantity: part.quantity * line.quantity,
      })),
    );
    const problem = shortage(book, demand, left);
    if (problem === null) {
      for (const { partId, quantity } of demand) {
        taken.set(partId, (taken.get(partId) ?? 0) + quantity);
      }
    }
    opened.push({ line, assessed: token.assessed, problem });
  }
  return opened;
}

function shortage(
  book: PackBook,
  demand: readonly PartDemand[],
  left: (partId: number) => number,
): string | null {
  const short = demand.find(({ partId, quantity }) => left(partId) < quantity);
  if (!short) return null;
  const name = book.byId.get(short.partId)?.facts.name ?? 'a part';
  const available = Math.max(0, left(short.partId));
  return (
    `${name}: ${available} left for this line and ${short.quantity} needed. ` +
    'Lower the quantity, or take another pack.'
  );
}

/** The keeper's basket at today's prices, with what must be acknowledged before paying. */
export async function viewBasket(
  deps: Pick<Deps, 'db' | 'stockView' | 'signer'>,
  keeper: BasketKeeper | null,
): Promise<Basket> {
  const basketId = keeper === null ? null : await findBasket(deps.db, keeper);
  const stored = basketId === null ? [] : await basketLines(deps.db, basketId);
  if (stored.length === 0) return { lines: [], kits: 0, total: money(0), acknowledgements: [] };
  const book = await openPackBook(deps);
  const lines = openLines(book, deps.signer, stored).map(({ line, assessed, problem }) => ({
    id: line.id,
    sentence: assessed.inHand.brief.sentence,
    pack: assessed.pack,
    quantity: line.quantity,
    unitPrice: money(assessed.price.grossMinor),
    total: money(assessed.price.grossMinor * line.quantity),
    problem,
  }));
  const cautions = lines.flatMap(({ pack }) => pack.cautions.filter((one) => one.mustAcknowledge));
  return {
    lines,
    kits: lines.reduce((sum, line) => sum + line.quantity, 0),
    total: money(lines.reduce((sum, line) => sum + line.total.amount, 0)),
    acknowledgements: [
      ...new Map(cautions.map(({ code, text }) => [code, { code, text }])).values(),
    ],
  };
}
