import type { DrawingItem, PartSymbol } from '../contracts/drawing.ts';
import type { PackPart, PackRole } from '../contracts/packs.ts';

export type Point = [number, number];
export type Anchor = 'start' | 'middle' | 'end';

/** What a schematic is drawn from. */
export interface SchematicFacts {
  parts: readonly Pick<PackPart, 'role' | 'value' | 'dielectric' | 'kind' | 'sections'>[];
  /** How R4A and R4B are joined; null with a single R4, a trimmer or steered timing. */
  join: 'series' | 'parallel' | null;
  /** The whole timing resistance in ohms; null with steered timing. */
  timingOhms: number | null;
  /** True where a second section of the comparator drives the LED. */
  buffered: boolean;
  supplyLabel: string;
}

export const wire = (points: Point[], role?: PackRole): DrawingItem => ({
  kind: 'wire',
  points,
  role,
});

export const dot = (at: Point): DrawingItem => ({ kind: 'dot', at });

export const ground = (at: Point): DrawingItem => ({ kind: 'ground', at });

/** A two-ended part; diodes run from anode to cathode. */
export function part(symbol: PartSymbol, role: PackRole, from: Point, to: Point): DrawingItem {
  return { kind: 'part', symbol, role, from, to };
}

export function label(
  text: string,
  at: Point,
  anchor: Anchor,
  weight: 'strong' | 'plain',
  role?: PackRole,
): DrawingItem {
  return { kind: 'label', at, text, anchor, weight, role };
}

/** Distance between the base lines of a name and the value under it. */
const lineStep = 17;

/** Name and, one line lower, value of a part; the name alone where it has no value. */
export function names(role: PackRole, value: string, [x, y]: Point, anchor: Anchor): DrawingItem[] {
  const name = label(role, [x, y], anchor, 'strong', role);
  return value === '' ? [name] : [name, label(value, [x, y + lineStep], anchor, 'plain', role)];
}

/** Where names stand over and under a part that lies at height `y`. */
export const above = (x: number, y: number): Point => [x, y - 32];
export const below = (x: number, y: number): Point => [x, y + 26];

interface SectionFacts {
  parts: readonly Pick<PackPart, 'role' | 'sections'>[];
  buffered: boolean;
}

/** Sections of the comparator by what they do. */
export interface Sections {
  /** "U1", or "U1A" where the package has more than one. */
  timing: string;
  /** "U1B" where it drives the LED. */
  driver: string | null;
  idle: string[];
}

/** Names the sections of U1 by letters: A makes the beat, B drives the LED where one does. */
export function sectionsOf({ parts, buffered }: SectionFacts): Sections {
  const given = parts.find(({ role }) => role === 'U1')?.sections ?? 1;
  const held = parts.some(({ role }) => role === 'R5');
  const count = Math.max(given, 1 + Number(buffered) + Number(held));
  const all = Array.from({ length: count }, (_, k) => `U1${'ABCD'.charAt(k)}`);
  return {
    timing: count === 1 ? 'U1' : all[0]!,
    driver: buffered ? all[1]! : null,
    idle: held ? all.slice(buffered ? 2 : 1) : [],
  };
}

/** "U1B", "U1C and U1D", "U1B to U1D". */
export function sectionWords(names: readonly string[]): string {
  if (names.length < 3) return names.join(' and ');
  return `${names[0]} to ${names.at(-1)}`;
}
