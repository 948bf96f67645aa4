import type { Quote } from '../contracts/orders.ts';
import { money, taxWithin, withTax } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import { basketLines, findBasket, type BasketKeeper } from '../store/baskets.ts';
import type { Database } from '../store/connection.ts';
import { shippingMethods, taxRates, type ShippingMethod, type TaxRate } from '../store/settings.ts';
import { openPackBook, priceOf, type PackBook } from './pack-book.ts';
import { Refusal } from './refusal.ts';
import { openLines, type OpenBasketLine } from './view-basket.ts';

/** Where an order goes and how: its tax and its ways of shipping. */
export interface Destination {
  rate: TaxRate;
  rates: TaxRate[];
  methods: ShippingMethod[];
}

/** Looks up a country, or refuses with the countries that are served. */
export async function destination(
  db: Database,
  country: string,
  path: string,
): Promise<Destination> {
  const rates = await taxRates(db);
  const rate = rates.find((one) => one.country === country);
  if (!rate) {
    const message = `We do not ship to ${country} yet; choose one of ${rates.map((one) => one.country).join(', ')}.`;
    throw new Refusal('invalid', message, [{ path, message }]);
  }
  return { rate, rates, methods: await shippingMethods(db, rate.zone) };
}

export interface PricedLine extends OpenBasketLine {
  unitGrossMinor: number;
  lineGrossMinor: number;
  lineTaxMinor: number;
}

export interface PricedBasket {
  lines: PricedLine[];
  goodsMinor: number;
  goodsTaxMinor: number;
}

/** Prices basket lines with the tax of the country they go to. Unit price times kits is the line, exactly. */
export function priceLines(
  book: PackBook,
  lines: readonly OpenBasketLine[],
  taxBasisPoints: number,
): PricedBasket {
  const priced = lines.map((line) => {
    const { choice, pack } = line.assessed;
    const { grossMinor } = priceOf(book, choice, pack.careLevel, { ...book.rule, taxBasisPoints });
    const lineGrossMinor = grossMinor * line.line.quantity;
    return {
      ...line,
      unitGrossMinor: grossMinor,
      lineGrossMinor,
      lineTaxMinor: taxWithin(lineGrossMinor, taxBasisPoints),
    };
  });
  return {
    lines: priced,
    goodsMinor: priced.reduce((sum, line) => sum + line.lineGrossMinor, 0),
    goodsTaxMinor: priced.reduce((sum, line) => sum + line.lineTaxMinor, 0),
  };
}

/** What the basket would cost, shipped to a country: everything said before anybody pays. */
export async function quoteCheckout(
  deps: Pick<Deps, 'db' | 'stockView' | 'signer'>,
  keeper: BasketKeeper | null,
  query: { country: string; shippingMethod?: string | undefined },
): Promise<Quote> {
  const { rate, rates, methods } = await destination(deps.db, query.country, 'country');
  const book = await openPackBook(deps);
  const basketId = keeper === null ? null : await findBasket(deps.db, keeper);
  const stored = basketId === null ? [] : await basketLines(deps.db, basketId);
  const priced = priceLines(book, openLines(book, deps.signer, stored), rate.basisPoints);
  const method = methods.find((one) => one.code === query.shippingMethod) ?? methods[0];
  const shippingMinor = method ? withTax(method.netMinor, rate.basisPoints) : 0;
  return {
    country: rate.country,
    lines: priced.lines.map(({ line, assessed, unitGrossMinor, lineGrossMinor }) => ({
      id: line.id,
      sentence: assessed.inHand.brief.sentence,
      quantity: line.quantity,
      unitPrice: money(unitGrossMinor),
      total: money(lineGrossMinor),
    })),
    goods: money(priced.goodsMinor),
    shipping: money(shippingMinor),
    tax: money(priced.goodsTaxMinor + taxWithin(shippingMinor, rate.basisPoints)),
    taxRate: rate.basisPoints / 10_000,
    total: money(priced.goodsMinor + shippingMinor),
    methods: methods.map(({ code, name, days, netMinor }) => ({
      code,
      name,
      days,
      price: money(withTax(netMinor, rate.basisPoints)),
    })),
    countries: rates.map(({ country, name }) => ({ code: country, name })),
  };
}
