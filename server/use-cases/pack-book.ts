import type { Pack } from '../contracts/packs.ts';
import { resolveBrief, type BriefInHand } from '../domain/brief.ts';
import { isKind, partsOf, type CataloguePart, type PartOf } from '../domain/catalogue.ts';
import { cautionsFor } from '../domain/cautions.ts';
import { money } from '../domain/money.ts';
import { writePackContent, readPackContent } from './pack-token.ts';
import { demandOfChoice, type PackChoice } from '../domain/pack-choice.ts';
import { inBillOrder, toPackPart } from '../domain/pack-parts.ts';
import { kitPrice, type KitPrice, type PriceRule } from '../domain/price.ts';
import { promiseOf } from '../domain/promise.ts';
import { toStockedCapacitor, toStockedComparator, toStockedResistor } from '../domain/shelf.ts';
import { makeableKits } from '../domain/stock.ts';
import { analyseCycle } from '../engine/cycle.ts';
import { pulseStrip } from '../engine/pulse-strip.ts';
import { aimFrame } from '../engine/search/candidates.ts';
import { demandOf } from '../engine/search/demand.ts';
import { promise, type RankedPack } from '../engine/search/find-packs.ts';
import type { Frame } from '../engine/search/frame.ts';
import { periodAt } from '../engine/prepared-single.ts';
import type { ParsedBrief } from '../contracts/brief.ts';
import { homeTerms, type ShopSettings } from '../store/settings.ts';
import type { Deps, Signer } from '../ports.ts';

/** Everything that packs are made and priced from, as it stands at one moment. */
export interface PackBook {
  catalogue: readonly CataloguePart[];
  byId: ReadonlyMap<number, CataloguePart>;
  settings: ShopSettings;
  rule: PriceRule;
}

/** The shelves as they stand, fees and home tax. */
export async function openPackBook(deps: Pick<Deps, 'db' | 'stockView'>): Promise<PackBook> {
  const [catalogue, { settings, taxBasisPoints }] = await Promise.all([
    deps.stockView.current(),
    homeTerms(deps.db),
  ]);
  const rule = { kitFeeMinor: settings.kitFeeMinor, taxBasisPoints };
  return { catalogue, byId: indexOf(catalogue), settings, rule };
}

const indexes = new WeakMap<PackBook['catalogue'], PackBook['byId']>();

/** Parts by id, made once for each state of the shelves. */
function indexOf(catalogue: PackBook['catalogue']): PackBook['byId'] {
  let index = indexes.get(catalogue);
  if (!index) {
    index = new Map(catalogue.map((part) => [part.id, part]));
    indexes.set(catalogue, index);
  }
  return index;
}

/** A pack in full: what the maker sees, and what the house works with. */
export interface AssessedPack {
  pack: Pack;
  choice: PackChoice;
  inHand: BriefInHand;
  ranked: RankedPack;
  price: KitPrice;
}

/** Turns a found pack into what a maker sees: parts, promise, price, cautions, strip, token. */
export function assess(
  book: PackBook,
  signer: Signer,
  parsed: ParsedBrief,
  inHand: BriefInHand,
  ranked: RankedPack,
  choice: PackChoice,
): AssessedPack {
  const demand = demandOfChoice(choice);
  const parts = inBillOrder(
    demand.map(({ role, partId }) => toPackPart(role, book.byId.get(partId)!)),
  );
  const price = priceOf(book, choice);
  const kits = parsed.quantity;
  const cycle = analyseCycle(ranked.circuit);
  if (cycle.kind !== 'oscillates')
    throw new Error(`A found pack does not oscillate: ${cycle.reason}`);
  const pack: Pack = {
    token: signer.seal(writePackContent({ choice, brief: parsed })),
    topology: ranked.topology,
    join: choice.join,
    timingOhms: ranked.timingOhms,
    parts,
    promise: promiseOf(ranked, inHand.brief),
    price: { unit: money(price.grossMinor), total: money(price.grossMinor * kits) },
    makeable: makeableKits(demand, (id) => book.byId.get(id)?.available ?? 0),
    cautions: cautionsFor({
      frequencyHz: ranked.frequencyHz,
      ...ranked.guaranteed,
      hasLed: choice.parts.LED !== undefined,
      hasBattery: choice.parts.BAT !== undefined,
      darkBelowVolts: darkBelow(inHand),
      hasPolarised: parts.some((part) => part.dielectric === 'electrolytic'),
    }),
    strip: pulseStrip(ranked.circuit, cycle),
    wins: ranked.wins,
  };
  return { pack, choice, inHand, ranked, price };
}

/** Where the LED goes dark before the cells are empty: at its own forward voltage. */
function darkBelow({ led, battery }: BriefInHand): number | null {
  if (led === null || battery === null) return null;
  const { forwardVolts } = led.facts;
  return forwardVolts >= battery.facts.emptyVolts ? forwardVolts : null;
}

const priceGroups: readonly (readonly [string, readonly string[]])[] = [
  ['Resistors', ['resistor']],
  ['Capacitors', ['capacitor']],
  ['Comparator', ['comparator']],
  ['LED', ['led']],
  ['Board', ['board']],
  ['Holder and cells', ['holder', 'battery']],
];

/** The price of one kit of a choice, in the lines the pack page shows. */
export function priceOf(book: PackBook, choice: PackChoice, rule: PriceRule = book.rule): KitPrice {
  const parts = demandOfChoice(choice).map(({ partId }) => book.byId.get(partId)!);
  const lines = priceGroups
    .map(([label, kinds]) => ({
      label,
      netMinor: parts
        .filter((part) => kinds.includes(part.kind))
        .reduce((sum, part) => sum + part.priceMinor, 0),
    }))
    .filter((line) => line.netMinor > 0);
  return kitPrice(lines, rule);
}

export type OpenedToken =
  | { kind: 'opened'; assessed: AssessedPack; parsed: ParsedBrief }
  | { kind: 'unknown' }
  | { kind: 'gone'; reason: string };

/** Opens a pack token and works the pack out anew from today's shelves and prices. */
export function openToken(book: PackBook, signer: Signer, token: string): OpenedToken {
  const text = signer.open(token);
  const content = text === null ? null : readPackContent(text);
  if (content === null) return { kind: 'unknown' };
  const { choice, brief: parsed } = content;
  const inHand = resolveBrief(parsed, book.catalogue);
  if (inHand.kind === 'impossible') return { kind: 'gone', reason: inHand.errors[0]!.message };
  const missing = Object.entries(choice.parts).find(([, id]) => !book.byId.has(id));
  if (missing) {
    return {
      kind: 'gone',
      reason: `The shop no longer keeps the part for ${missing[0]}; ask for a new pack.`,
    };
  }
  const ranked = rankedFromChoice(book, choice, inHand);
  if (ranked === null)
    return { kind: 'gone', reason: 'This pack no longer works; ask for a new one.' };
  return { kind: 'opened', parsed, assessed: assess(book, signer, parsed, inHand, ranked, choice) };
}

function rankedFromChoice(
  book: PackBook,
  { parts, join }: PackChoice,
  { search }: BriefInHand,
): RankedPack | null {
  const resistor = (id: number | undefined) => {
    const part = id === undefined ? undefined : book.byId.get(id);
    return part && isKind(part, 'resistor') ? toStockedResistor(part) : null;
  };
  const comparator = partById(book, 'comparator', parts.U1);
  const capacitor = partById(book, 'capacitor', parts.C1);
  const [r1, r2, r3] = [resistor(parts.R1), resistor(parts.R2), resistor(parts.R3)];
  const first = resistor(parts.R4 ?? parts.R4A);
  const second = resistor(parts.R4B);
  if (!comparator || !capacitor || !r1 || !r2 || !r3 || !first) return null;
  const pullUp = resistor(parts.RP);
  const ledResistor = resistor(parts.RL);
  const frame: Frame = {
    comparator: toStockedComparator(comparator),
    thresholds: { r1, r2, r3 },
    pullUp,
    ledResistor,
    capacitor: toStockedCapacitor(capacitor),
    demand: demandOf([r1, r2, r3, pullUp, ledResistor]),
    minTimingOhms: 0,
    priceMinor: 0,
  };
  const timingOhms =
    second === null
      ? first.ohms
      : join === 'parallel'
        ? (first.ohms * second.ohms) / (first.ohms + second.ohms)
        : first.ohms + second.ohms;
  const period = periodAt(aimFrame(frame, search).prepared, timingOhms);
  if (!(period > 0)) return null;
  const candidate = {
    frame,
    timingOhms,
    first,
    second,
    join,
    frequencyHz: 1 / period,
    distance: Math.abs(Math.log(period * search.targetHz)),
    priceMinor: 0,
  };
  return promise(candidate, search);
}

function partById<Kind extends 'comparator' | 'capacitor'>(
  book: PackBook,
  kind: Kind,
  id: number | undefined,
): PartOf<Kind> | null {
  return partsOf(book.catalogue, kind).find((part) => part.id === id) ?? null;
}
