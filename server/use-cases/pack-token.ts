import {
  briefSchema,
  careLevels,
  ledColours,
  targetUnits,
  type ParsedBrief,
} from '../contracts/brief.ts';
import {
  packTokenSchema,
  packTokenVersion,
  type PackTokenFields,
} from '../contracts/pack-token.ts';
import { packRoles, type PackRole } from '../contracts/packs.ts';
import type { PackChoice } from '../domain/pack-choice.ts';

/** What a pack token holds: which parts for which brief. Prices and promises are worked out anew. */
export interface PackTokenContent {
  choice: PackChoice;
  brief: ParsedBrief;
}

/** Writes a token's content as compact text, so that links to a pack stay short. */
export function writePackContent({ choice, brief }: PackTokenContent): string {
  const join = choice.join === null ? 0 : choice.join === 'series' ? 1 : 2;
  const parts = (Object.entries(choice.parts) as [PackRole, number][]).flatMap(([role, id]) => [
    packRoles.indexOf(role),
    id,
  ]);
  const supply = 'volts' in brief.supply ? brief.supply.volts : brief.supply.battery;
  const load =
    brief.load === undefined
      ? 0
      : brief.load.kind === 'logic'
        ? 1
        : [ledColours.indexOf(brief.load.colour), brief.load.amps];
  return JSON.stringify([
    packTokenVersion,
    join,
    parts,
    [
      brief.target.value,
      targetUnits.indexOf(brief.target.unit),
      brief.duty,
      supply,
      load,
      brief.band,
      brief.ambient.minCelsius,
      brief.ambient.maxCelsius,
      brief.mounting === 'through-hole' ? 0 : 1,
      careLevels.indexOf(brief.careLevel),
      brief.quantity,
    ],
  ]);
}

/** Reads a token's content; null when it is of another version or makes no sense. */
export function readPackContent(text: string): PackTokenContent | null {
  const raw = packTokenSchema.safeParse(parseJson(text));
  if (!raw.success) return null;
  const [, join, flat, fields] = raw.data;
  const parts = readParts(flat);
  const brief = briefSchema.safeParse(readBrief(fields));
  if (parts === null || !brief.success) return null;
  const joins = [null, 'series', 'parallel'] as const;
  return { choice: { parts, join: joins[join] }, brief: brief.data };
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

function readParts(flat: readonly number[]): PackChoice['parts'] | null {
  const parts: PackChoice['parts'] = {};
  for (let k = 0; k + 1 < flat.length; k += 2) {
    const role = packRoles[flat[k]!];
    if (role === undefined) return null;
    parts[role] = flat[k + 1]!;
  }
  return parts;
}

function readBrief(fields: PackTokenFields): unknown {
  const [value, unit, duty, supply, load, band, min, max, mounting, care, quantity] = fields;
  return {
    target: { value, unit: targetUnits[unit] },
    duty,
    supply: typeof supply === 'string' ? { battery: supply } : { volts: supply },
    load: readLoad(load),
    band,
    ambient: { minCelsius: min, maxCelsius: max },
    mounting: mounting === 0 ? 'through-hole' : 'surface-mount',
    careLevel: careLevels[care],
    quantity,
  };
}

function readLoad(load: number | [number, number]): unknown {
  if (load === 0) return undefined;
  if (!Array.isArray(load)) return { kind: 'logic' };
  const [colour, amps] = load;
  return { kind: 'led', colour: ledColours[colour], amps };
}
