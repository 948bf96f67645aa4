import type { Pack } from '../contracts/packs.ts';
import { resolveBrief, type BriefInHand } from '../domain/brief.ts';
import type { CataloguePart } from '../domain/catalogue.ts';
import { cautionsFor } from '../domain/cautions.ts';
import { money } from '../domain/money.ts';
import { writePackContent, readPackContent } from './pack-token.ts';
import { candidateOf } from '../domain/pack-candidate.ts';
import { demandOfChoice, type PackChoice } from '../domain/pack-choice.ts';
import { inBillOrder, toPackPart } from '../domain/pack-parts.ts';
import { kitPrice, type KitPrice, type PriceRule } from '../domain/price.ts';
import { promiseOf } from '../domain/promise.ts';
import { packNotes, whyTopology } from '../domain/pack-notes.ts';
import { makeableKits } from '../domain/stock.ts';
import { analyseCycle } from '../engine/cycle.ts';
import { pulseStrip } from '../engine/pulse-strip.ts';
import { promise, type RankedPack } from '../engine/search/promise.ts';
import type { CareLevel, ParsedBrief } from '../contracts/brief.ts';
import { homeTerms, type ShopSettings } from '../store/settings.ts';
import type { Deps, Signer } from '../ports.ts';
import { searchShelf } from './search-shelf.ts';

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
  const { kitFeeMinor, careFeesMinor } = settings;
  const rule = { kitFeeMinor, careFeesMinor, taxBasisPoints };
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
  const price = priceOf(book, choice, parsed.careLevel);
  const kits = parsed.quantity;
  const cycle = analyseCycle(ranked.circuit);
  if (cycle.kind !== 'oscillates')
    throw new Error(`A found pack does not oscillate: ${cycle.reason}`);
  const pack: Pack = {
    token: signer.seal(writePackContent({ choice, brief: parsed })),
    topology: ranked.topology,
    why: whyTopology(ranked, inHand.search),
    careLevel: parsed.careLevel,
    join: choice.join,
    timingOhms: ranked.timing.kind === 'steered' ? null : ranked.timing.ohms,
    buffered: ranked.frame.head.buffered,
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
    notes: packNotes(ranked, inHand.search),
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
  ['Resistors', ['resistor', 'trimmer']],
  ['Capacitors', ['capacitor']],
  ['Comparator', ['comparator']],
  ['Diodes', ['diode']],
  ['LED', ['led']],
  ['Board', ['board']],
  ['Holder and cells', ['holder', 'battery']],
];

/** The price of one kit of a choice, in the lines the pack page shows. */
export function priceOf(
  book: PackBook,
  choice: PackChoice,
  careLevel: CareLevel,
  rule: PriceRule = book.rule,
): KitPrice {
  const parts = demandOfChoice(choice).map(({ partId }) => book.byId.get(partId)!);
  const lines = priceGroups
    .map(([label, kinds]) => ({
      label,
      netMinor: parts
        .filter((part) => kinds.includes(part.kind))
        .reduce((sum, part) => sum + part.priceMinor, 0),
    }))
    .filter((line) => line.netMinor > 0);
  return kitPrice(lines, rule, careLevel);
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
  const inHand = resolveBrief(parsed, book.catalogue, book.settings);
  if (inHand.kind === 'impossible') return { kind: 'gone', reason: inHand.errors[0]!.message };
  const missing = Object.entries(choice.parts).find(([, id]) => !book.byId.has(id));
  if (missing) {
    return {
      kind: 'gone',
      reason: `The shop no longer keeps the part for ${missing[0]}; ask for a new pack.`,
    };
  }
  const candidate = candidateOf(choice, book.byId, inHand.search);
  if (candidate === null)
    return { kind: 'gone', reason: 'This pack no longer works; ask for a new one.' };
  const ranked = promise(candidate, inHand.search, searchShelf(book, inHand.brief));
  return { kind: 'opened', parsed, assessed: assess(book, signer, parsed, inHand, ranked, choice) };
}
