import { briefSchema, type BriefInput } from '../../server/contracts/brief.ts';
import type { PackPart, PackRole } from '../../server/contracts/packs.ts';
import { resolveBrief, type BriefInHand } from '../../server/domain/brief.ts';
import type { CataloguePart } from '../../server/domain/catalogue.ts';
import { choiceOf, chooseAccessories, type PackChoice } from '../../server/domain/pack-choice.ts';
import { inBillOrder, toPackPart } from '../../server/domain/pack-parts.ts';
import { shelfOf } from '../../server/domain/shelf.ts';
import { findPacks } from '../../server/engine/search/find-packs.ts';
import type { Rank, RankedPack } from '../../server/engine/search/promise.ts';
import { prepareShelf } from '../../server/engine/search/prepared-shelf.ts';
import {
  battery,
  board,
  capacitor,
  comparator,
  diode,
  holder,
  led,
  resistor,
  trimmer,
} from './sample-catalogue.ts';

const e12 = [10, 12, 15, 18, 22, 27, 33, 39, 47, 56, 68, 82];
const stock: CataloguePart[] = [
  ...[100, 1e3, 1e4].flatMap((decade) => e12.map((value) => resistor(value * decade))),
  resistor(1e6),
  ...[1e-8, 1e-7, 8.2e-7, 1e-6].map((farads) => capacitor(farads)),
  capacitor(4.7e-5, 'electrolytic'),
  capacitor(1e-7, 'X7R'),
  led('red', 1.9),
  battery(),
  holder(),
  diode(),
  ...[5e5, 1e6].map((ohms) => trimmer(ohms)),
];
const comparators = new Map([1, 2, 4].map((sections) => [sections, comparator(sections)]));
const boards = [1, 2, 4].map((sections) => board(sections));

export interface Found {
  inHand: BriefInHand;
  shelf: ReturnType<typeof prepareShelf>;
  packs: RankedPack[];
  /** Of the first pack. */
  parts: PackPart[];
  join: PackChoice['join'];
}

/** Solves a brief on a small shelf whose one comparator has so many sections. */
export function find(input: BriefInput, sections = 1, rank: Rank = 'closest'): Found {
  const catalogue = [...stock, ...boards, comparators.get(sections)!];
  const byId = new Map(catalogue.map((one) => [one.id, one]));
  const inHand = resolveBrief(briefSchema.parse(input), catalogue, { meterUncertainty: 0.0025 });
  if (inHand.kind === 'impossible') throw new Error(inHand.errors[0]!.message);
  const accessories = chooseAccessories(catalogue, inHand);
  const shelf = prepareShelf(shelfOf(catalogue, inHand.brief.mounting, null));
  const { packs } = findPacks(shelf, inHand.search, rank, 6);
  const { parts, join } = choiceOf(packs[0]!, inHand, accessories);
  const entries = Object.entries(parts) as [PackRole, number][];
  return {
    inHand,
    shelf,
    packs,
    join,
    parts: inBillOrder(entries.map(([role, id]) => toPackPart(role, byId.get(id)!))),
  };
}

export const blinker = find({
  target: { value: 90, unit: 'per_minute' },
  supply: { battery: 'TW-CELL-AA-2' },
  load: { kind: 'led', colour: 'red', amps: 0.001 },
});

export const rolesOf = (parts: readonly Pick<PackPart, 'role'>[]) => parts.map(({ role }) => role);
