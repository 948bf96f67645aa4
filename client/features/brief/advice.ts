import { z } from 'zod';
import {
  ambientSchema,
  careLevels,
  loadSchema,
  supplySchema,
  targetSchema,
} from '../../../server/contracts/brief.ts';
import type { BriefDraft } from './model.ts';

/** A patch of the brief as advice carries it; what it does not know is left alone. */
const patchSchema = z.object({
  target: targetSchema.partial().optional(),
  duty: z.number().optional(),
  supply: supplySchema.optional(),
  load: loadSchema.optional(),
  band: z.number().optional(),
  ambient: z
    .object({ minCelsius: z.number().optional(), maxCelsius: z.number().optional() })
    .or(ambientSchema)
    .optional(),
  mounting: z.string().optional(),
  careLevel: z.enum(careLevels).optional(),
  quantity: z.number().optional(),
  rank: z.string().optional(),
});

function plain(value: number, digits = 5): string {
  return String(Number(value.toPrecision(digits)));
}

/** The draft after one tap on an advice. */
export function applyAdvice(draft: BriefDraft, change: Record<string, unknown>): BriefDraft {
  const parsed = patchSchema.safeParse(change);
  if (!parsed.success) return draft;
  const { target, duty, supply, load, band, ambient, mounting, careLevel, quantity, rank } =
    parsed.data;
  const next: BriefDraft = { ...draft };
  if (target?.value !== undefined) next.rate = plain(target.value, 7);
  if (target?.unit !== undefined) next.unit = target.unit;
  if (duty !== undefined) next.lit = plain(duty * 100, 4);
  if (band !== undefined) next.band = plain(band * 100, 4);
  if (supply !== undefined && 'volts' in supply) {
    next.supply = 'volts';
    next.volts = plain(supply.volts);
  } else if (supply !== undefined) next.supply = supply.battery;
  if (load !== undefined) {
    next.load = load.kind === 'logic' ? 'clock' : load.colour;
    if (load.kind === 'led') next.milliamps = plain(load.amps * 1000);
  }
  if (ambient?.minCelsius !== undefined) next.from = plain(ambient.minCelsius);
  if (ambient?.maxCelsius !== undefined) next.to = plain(ambient.maxCelsius);
  if (mounting !== undefined) next.mounting = mounting;
  if (careLevel !== undefined) next.care = careLevel;
  if (quantity !== undefined) next.kits = plain(quantity);
  if (rank !== undefined) next.rank = rank;
  return next;
}
