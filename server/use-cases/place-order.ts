import type { Checkout, CheckoutResponse } from '../contracts/orders.ts';
import { taxWithin, withTax } from '../domain/money.ts';
import { demandOfChoice } from '../domain/pack-choice.ts';
import { allocate } from '../domain/stock.ts';
import { PaymentRefused, type Deps } from '../ports.ts';
import { basketLines, emptyBasket, findBasket, type BasketKeeper } from '../store/baskets.ts';
import type { Database } from '../store/connection.ts';
import { addOrder, addOrderEvent, addOrderLine } from '../store/orders.ts';
import { freezePack } from '../store/packs.ts';
import { addPayment } from '../store/payments.ts';
import { holdShares, lockLotsOfParts } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { cancelUnpaidOrder } from './cancel-unpaid-order.ts';
import { openPackBook, type PackBook } from './pack-book.ts';
import { destination, priceLines, type PricedBasket, type PricedLine } from './quote-checkout.ts';
import { Refusal } from './refusal.ts';
import { openLines } from './view-basket.ts';

/** Stock is kept this long for a buyer who is paying. */
export const reservationMinutes = 35;

export interface Buyer {
  keeper: BasketKeeper | null;
  userId: string | null;
}

interface PlacedOrder {
  id: number;
  ref: string;
  basketId: string;
  tokens: string[];
  totalMinor: number;
  reservedUntil: Date;
  pageLines: { name: string; amountMinor: number; quantity: number }[];
}

/**
 * Turns the buyer's basket into an order: freezes the packs, promises the parts, opens the payment
 * page. Order, packs and reservations commit together; if the payment service then refuses, the
 * order is cancelled and the parts go back.
 */
export async function placeOrder(
  deps: Deps,
  buyer: Buyer,
  input: Checkout,
): Promise<CheckoutResponse> {
  // Opened before the transaction, which counts the lots anew once it has locked them.
  const book = await openPackBook(deps);
  const placed = await inTransaction(deps.db, (trx) => writeOrder(deps, trx, book, buyer, input));
  const token = deps.signer.orderToken(placed.ref);
  try {
    const { sessionId, url } = await deps.payments.openCheckout({
      orderRef: placed.ref,
      email: input.email,
      lines: placed.pageLines,
      successUrl: `${deps.publicUrl}/orders/${placed.ref}/thanks?token=${token}`,
      cancelUrl: `${deps.publicUrl}/orders/${placed.ref}?token=${token}`,
      expiresAt: placed.reservedUntil,
      key: `checkout-${placed.ref}`,
    });
    await inTransaction(deps.db, async (trx) => {
      await addPayment(trx, {
        orderId: placed.id,
        sessionId,
        paymentUrl: url,
        amountMinor: placed.totalMinor,
      });
      await emptyBasket(trx, placed.basketId, placed.tokens);
    });
    return { orderRef: placed.ref, paymentUrl: url };
  } catch (error) {
    await cancelUnpaidOrder(deps, placed.ref, 'The payment page could not be opened');
    if (!(error instanceof PaymentRefused)) throw error;
    throw new Refusal(
      'payment-refused',
      `The payment page could not be opened (${error.message}). Your basket is as it was; try again in a minute.`,
    );
  }
}

async function writeOrder(
  deps: Deps,
  trx: Database,
  book: PackBook,
  buyer: Buyer,
  input: Checkout,
): Promise<PlacedOrder> {
  const basketId = buyer.keeper === null ? null : await findBasket(trx, buyer.keeper);
  const stored = basketId === null ? [] : await basketLines(trx, basketId);
  if (basketId === null || stored.length === 0) {
    throw new Refusal('basket-empty', 'Your basket is empty; put a pack in first.');
  }
  const { rate, methods } = await destination(
    trx,
    input.shippingAddress.country,
    'shippingAddress.country',
  );
  const method = methods.find((one) => one.code === input.shippingMethod);
  if (!method) {
    const message = `Choose one of ${methods.map((one) => one.code).join(', ')} for this country.`;
    throw new Refusal('invalid', message, [{ path: 'shippingMethod', message }]);
  }
  const opened = openLines(book, deps.signer, stored);
  if (opened.length < stored.length) {
    throw new Refusal(
      'basket-changed',
      'A pack in your basket is no longer made; open the basket and choose again.',
    );
  }
  const priced = priceLines(book, opened, rate.basisPoints);
  requireMakeable(priced.lines);
  requireAcknowledgements(priced.lines, input.acknowledgements);
  const shippingMinor = withTax(method.netMinor, rate.basisPoints);
  const placedAt = deps.clock.now();
  const reservedUntil = new Date(placedAt.getTime() + reservationMinutes * 60_000);
  const order = await addOrder(trx, {
    userId: buyer.userId,
    basketId,
    email: input.email,
    shipTo: input.shippingAddress,
    shippingMethod: method.code,
    shippingName: method.name,
    acknowledgements: input.acknowledgements,
    goodsMinor: priced.goodsMinor,
    shippingMinor,
    taxBasisPoints: rate.basisPoints,
    taxMinor: priced.goodsTaxMinor + taxWithin(shippingMinor, rate.basisPoints),
    reservedUntil,
    placedAt,
  });
  await writeLines(trx, order, priced);
  await promiseParts(trx, book, order.id, priced.lines);
  await addOrderEvent(trx, order.id, {
    at: placedAt,
    who: input.shippingAddress.name,
    what: 'Ordered; the parts are kept for payment',
    from: null,
    to: 'awaiting_payment',
  });
  return {
    ...order,
    basketId,
    tokens: stored.map((line) => line.token),
    totalMinor: priced.goodsMinor + shippingMinor,
    reservedUntil,
    pageLines: [
      ...priced.lines.map(({ assessed, line, unitGrossMinor }) => ({
        name: `Timing kit: ${assessed.inHand.brief.sentence}`.slice(0, 240),
        amountMinor: unitGrossMinor,
        quantity: line.quantity,
      })),
      { name: `Shipping: ${method.name}`, amountMinor: shippingMinor, quantity: 1 },
    ],
  };
}

function requireMakeable(lines: readonly PricedLine[]): void {
  const short = lines.find((line) => line.problem !== null);
  if (short?.problem) throw new Refusal('out-of-stock', short.problem);
}

function requireAcknowledgements(lines: readonly PricedLine[], given: readonly string[]): void {
  const missing = lines
    .flatMap(({ assessed }) => assessed.pack.cautions)
    .find((caution) => caution.mustAcknowledge && !given.includes(caution.code));
  if (!missing) return;
  throw new Refusal('acknowledgement-missing', `Read and acknowledge this first: ${missing.text}`, [
    { path: 'acknowledgements', message: `Add "${missing.code}" once it has been read.` },
  ]);
}

async function writeLines(
  trx: Database,
  order: { id: number; ref: string },
  { lines }: PricedBasket,
): Promise<void> {
  for (const [k, { assessed, line, unitGrossMinor, lineTaxMinor }] of lines.entries()) {
    const { pack, choice, inHand, ranked } = assessed;
    const packId = await freezePack(trx, {
      identifier: `${order.ref}-${k + 1}`,
      token: pack.token,
      topology: pack.topology,
      sentence: inHand.brief.sentence,
      brief: inHand.brief,
      parts: pack.parts,
      promise: pack.promise,
      cautions: pack.cautions,
      strip: pack.strip,
      circuit: ranked.circuit,
    });
    await addOrderLine(trx, order.id, {
      lineNo: k + 1,
      packId,
      quantity: line.quantity,
      unitGrossMinor,
      lineTaxMinor,
      parts: demandOfChoice(choice).map(({ role, partId, quantity }) => ({
        role,
        partId,
        quantity: quantity * line.quantity,
      })),
    });
  }
}

/** Locks the lots, then shares the parts out; another buyer may have been quicker. */
async function promiseParts(
  trx: Database,
  book: PackBook,
  orderId: number,
  lines: readonly PricedLine[],
): Promise<void> {
  const demands = lines.flatMap(({ assessed, line }) =>
    demandOfChoice(assessed.choice).map(({ partId, quantity }) => ({
      partId,
      quantity: quantity * line.quantity,
    })),
  );
  const lots = await lockLotsOfParts(trx, [...new Set(demands.map((demand) => demand.partId))]);
  const allocation = allocate(demands, lots);
  if (allocation.kind === 'short') {
    const [short] = allocation.short;
    const name = book.byId.get(short!.partId)?.facts.name ?? 'A part';
    throw new Refusal(
      'out-of-stock',
      `${name}: somebody was quicker, ${short!.available} are left and ${short!.wanted} are needed. ` +
        'Lower the quantity, or take another pack.',
    );
  }
  await holdShares(trx, orderId, allocation.shares);
}
