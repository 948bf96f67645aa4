import {
  briefSchema,
  careLevels,
  ledColours,
  targetUnits,
  type ParsedBrief,
} from '../contracts/brief.ts';
import { packRoles, type PackRole } from '../contracts/packs.ts';
import type { PackChoice } from './pack-choice.ts';

/** What a pack token holds: which parts for which brief. Prices and promises are worked out anew. */
export interface PackTokenContent {
  choice: PackChoice;
  brief: ParsedBrief;
}

const version = 1;

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
    version,
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
  let raw: unknown;
  try {
    raw = JSON.parse(text);
  } catch {
    return null;
  }
  if (
    !Array.isArray(raw) ||
    raw[0] !== version ||
    !Array.isArray(raw[2]) ||
    !Array.isArray(raw[3])
  ) {
    return null;
  }
  const [, join, flat, b] = raw;
  const parts: PackChoice['parts'] = {};
  for (let k = 0; k + 1 < flat.length; k += 2) {
    const role = packRoles[flat[k]];
    if (role === undefined || !Number.isInteger(flat[k + 1])) return null;
    parts[role] = flat[k + 1];
  }
  const brief = briefSchema.safeParse({
    target: { value: b[0], unit: targetUnits[b[1]] },
    duty: b[2],
    supply: typeof b[3] === 'string' ? { battery: b[3] } : { volts: b[3] },
    load:
      b[4] === 0
        ? undefined
        : b[4] === 1
          ? { kind: 'logic' }
          : { kind: 'led', colour: ledColours[b[4]?.[0]], amps: b[4]?.[1] },
    band: b[5],
    ambient: { minCelsius: b[6], maxCelsius: b[7] },
    mounting: b[8] === 0 ? 'through-hole' : 'surface-mount',
    careLevel: careLevels[b[9]],
    quantity: b[10],
  });
  if (!brief.success) return null;
  return {
    choice: { parts, join: join === 1 ? 'series' : join === 2 ? 'parallel' : null },
    brief: brief.data,
  };
}
