import type { DrawingItem } from '../contracts/drawing.ts';
import type { PackRole } from '../contracts/packs.ts';
import { formatOhms } from '../engine/si-format.ts';
import type { Layout } from './schematic-layout.ts';
import {
  above,
  below,
  dot,
  ground,
  label,
  names,
  part,
  wire,
  type Point,
  type SchematicFacts,
} from './schematic-pieces.ts';

type ValueOf = (role: PackRole) => string;

/** C1 and, from the output to it, whatever sets the time. */
export function drawTiming(
  facts: SchematicFacts,
  valueOf: ValueOf,
  has: (role: PackRole) => boolean,
  layout: Layout,
): DrawingItem[] {
  const [nx, ny] = layout.capacitor;
  const [ox, oy] = layout.output;
  const polarised = facts.parts.some(
    (one) => one.role === 'C1' && one.dielectric === 'electrolytic',
  );
  return [
    dot([nx, ny]),
    part(polarised ? 'polarised-capacitor' : 'capacitor', 'C1', [nx, ny], [nx, layout.ground]),
    ...names('C1', valueOf('C1'), [nx - 24, ny + 36], 'end'),
    ground([nx, layout.ground]),
    wire([
      [ox, oy],
      [ox, ny],
    ]),
    ...(has('RC') ? steeredPaths(valueOf, layout) : singlePath(facts, valueOf, has, layout)),
  ];
}

function singlePath(
  { join, timingOhms }: SchematicFacts,
  valueOf: ValueOf,
  has: (role: PackRole) => boolean,
  layout: Layout,
): DrawingItem[] {
  const [nx, ny] = layout.capacitor;
  const ox = layout.output[0];
  if (has('RV')) {
    const together = timingOhms === null ? [] : setTo(timingOhms, below((nx + ox) / 2, ny + 8));
    return [...inRow(['R4', 'resistor'], ['RV', 'trimmer'], valueOf, layout), ...together];
  }
  if (join === 'series') {
    return inRow(['R4A', 'resistor'], ['R4B', 'resistor'], valueOf, layout);
  }
  const role = join === null ? 'R4' : 'R4A';
  const upper = [
    part('resistor', role, [nx, ny], [ox, ny]),
    ...names(role, valueOf(role), above((nx + ox) / 2, ny), 'middle'),
  ];
  if (join === null) return upper;
  const { left, right, wires } = lowerPath(layout, ox - 36);
  return [
    ...upper,
    dot([right[0], ny]),
    ...wires,
    part('resistor', 'R4B', left, right),
    ...names('R4B', valueOf('R4B'), below((left[0] + right[0]) / 2, left[1]), 'middle'),
  ];
}

function setTo(ohms: number, at: Point): DrawingItem[] {
  return [label(`together ${formatOhms(ohms, 3)}`, at, 'middle', 'plain')];
}

type InRow = readonly [role: PackRole, symbol: 'resistor' | 'trimmer'];

function inRow(first: InRow, second: InRow, valueOf: ValueOf, layout: Layout): DrawingItem[] {
  const [nx, ny] = layout.capacitor;
  const ox = layout.output[0];
  const middle = (nx + ox) / 2;
  // The slant through a trimmer's symbol stands taller than a resistor.
  const top = second[1] === 'trimmer' ? ny - 12 : ny;
  return [
    part(first[1], first[0], [nx, ny], [middle, ny]),
    part(second[1], second[0], [middle, ny], [ox, ny]),
    dot([middle, ny]),
    ...names(first[0], valueOf(first[0]), above((nx + middle) / 2, top), 'middle'),
    ...names(second[0], valueOf(second[0]), above((middle + ox) / 2, top), 'middle'),
  ];
}

/** The wires down to a path under the first one, clear of C1. */
function lowerPath(
  { capacitor: [nx, ny], lowerPath: low }: Layout,
  rightX: number,
): { left: Point; right: Point; wires: DrawingItem[] } {
  const left: Point = [nx + 36, low];
  const right: Point = [rightX, low];
  const wires = [dot([left[0], ny]), wire([[left[0], ny], left]), wire([[rightX, ny], right])];
  return { left, right, wires };
}

/** Charging over RC and DC, discharging under them over RD and DD. */
function steeredPaths(valueOf: ValueOf, layout: Layout): DrawingItem[] {
  const [nx, ny] = layout.capacitor;
  const ox = layout.output[0];
  const { left, right, wires } = lowerPath(layout, ox);
  const middle = (left[0] + ox) / 2;
  const low = layout.lowerPath;
  const resistorX = (left[0] + middle) / 2;
  const diodeX = (middle + ox) / 2;
  return [
    wire([
      [nx, ny],
      [left[0], ny],
    ]),
    part('resistor', 'RC', [left[0], ny], [middle, ny]),
    part('diode', 'DC', [ox, ny], [middle, ny]),
    ...names('RC', valueOf('RC'), above(resistorX, ny), 'middle'),
    ...names('DC', valueOf('DC'), above(diodeX, ny), 'middle'),
    dot([ox, ny]),
    ...wires,
    part('resistor', 'RD', left, [middle, low]),
    part('diode', 'DD', [middle, low], right),
    ...names('RD', valueOf('RD'), below(resistorX, low), 'middle'),
    ...names('DD', valueOf('DD'), below(diodeX, low), 'middle'),
  ];
}
