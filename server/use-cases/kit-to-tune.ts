import { isKind, type CataloguePart } from '../domain/catalogue.ts';
import type { PackChoice } from '../domain/pack-choice.ts';
import { joinOf, labelOf } from '../domain/pack-parts.ts';
import { limitDigits, readingRange, readingWords, timingRoles } from '../domain/tuning.ts';
import type { Database } from '../store/connection.ts';
import { linesOfOrders, partsOfOrder, type OrderLineRow } from '../store/orders.ts';
import { findParts } from '../store/parts.ts';
import { tuningsOfOrder, type TuningRow } from '../store/tunings.ts';
import { requireMine, type Packer } from './bench-order.ts';
import type { PackBook } from './pack-book.ts';
import { Refusal } from './refusal.ts';

export interface Reading {
  lineId: string;
  unit: number;
  farads: number;
}

/** A kit under the meter: its line, what it was sold with, and which R4 is kept for it so far. */
export interface KitToTune {
  reading: Reading;
  line: OrderLineRow;
  choice: PackChoice;
  parts: readonly CataloguePart[];
  before: TuningRow | null;
}

/** Locks the order and looks the kit up; null when this very reading stands already. */
export async function openKit(
  trx: Database,
  packer: Packer,
  ref: string,
  reading: Reading,
): Promise<KitToTune | null> {
  const order = await requireMine(trx, packer, ref);
  if (order.status !== 'picking') throw new Refusal('wrong-state', `${ref} is packed already.`);
  const line = requireLine(await linesOfOrders(trx, [order.id]), ref, reading);
  const needs = (await partsOfOrder(trx, order.id)).filter(({ lineId }) => lineId === line.id);
  const parts = await findParts(trx, [...new Set(needs.map(({ partId }) => partId))]);
  const choice = {
    parts: Object.fromEntries(needs.map(({ role, partId }) => [role, partId])),
    join: joinOf(line.parts, line.circuit),
  };
  const tunings = await tuningsOfOrder(trx, order.id);
  const before =
    tunings.find(({ lineId, unit }) => lineId === line.id && unit === reading.unit) ?? null;
  if (before?.stands && before.farads === reading.farads) return null;
  return { reading, line, choice, parts, before };
}

function requireLine(lines: readonly OrderLineRow[], ref: string, reading: Reading): OrderLineRow {
  const line = lines.find(({ id }) => id === reading.lineId);
  if (!line) throw new Refusal('not-found', `Order ${ref} has no such line.`);
  if (line.brief.careLevel !== 'bench-tuned') {
    throw new Refusal('wrong-state', `Line ${line.lineNo} of ${ref} is not sold bench-tuned.`);
  }
  if (reading.unit <= line.quantity) return line;
  const message = `Line ${line.lineNo} has ${line.quantity} kits; there is no kit ${reading.unit}.`;
  throw new Refusal('invalid', message, [{ path: 'unit', message }]);
}

/** The parts kept for the kit's timing so far: as it was tuned before, else as it was sold. */
export function ownPieces({ before, choice }: KitToTune): number[] {
  if (before === null) return timingRoles.flatMap((role) => choice.parts[role] ?? []);
  return [before.firstPartId, ...(before.secondPartId === null ? [] : [before.secondPartId])];
}

/** Refuses a reading that no sound piece of the capacitor gives, and says what one would give. */
export function requirePlausible(
  { choice, parts, reading }: KitToTune,
  { settings }: PackBook,
): void {
  const part = parts.find(({ id }) => id === choice.parts.C1);
  if (!part || !isKind(part, 'capacitor')) throw new Error('A tuned pack has a capacitor C1.');
  const { least, most } = readingRange(part.facts, settings);
  if (reading.farads >= least && reading.farads <= most) return;
  const message =
    `C1 should be ${labelOf(part)}, which reads ${readingWords(least, limitDigits)} to ${readingWords(most, limitDigits)}; ` +
    `this one reads ${readingWords(reading.farads)}. Check that it is the right part and that the ` +
    'meter is zeroed, or take another one.';
  throw new Refusal('implausible-reading', message, [{ path: 'farads', message }]);
}
