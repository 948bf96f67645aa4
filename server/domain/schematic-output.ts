import type { DrawingItem } from '../contracts/drawing.ts';
import type { PackRole } from '../contracts/packs.ts';
import type { Layout } from './schematic-layout.ts';
import {
  above,
  below,
  dot,
  ground,
  label,
  names,
  part,
  sectionWords,
  wire,
  type Point,
  type Sections,
} from './schematic-pieces.ts';

type ValueOf = (role: PackRole) => string;

export function drawPullUp(valueOf: ValueOf, { output, rail }: Layout): DrawingItem[] {
  const [ox, y] = output;
  const x = ox + 20;
  return [
    dot([x, rail]),
    part('resistor', 'RP', [x, rail], [x, y]),
    dot([x, y]),
    ...names('RP', valueOf('RP'), [x + 16, (rail + y) / 2 - 4], 'start'),
  ];
}

/** The LED and its resistor, from where it is driven down to ground. */
export function drawLed(valueOf: ValueOf, layout: Layout): DrawingItem[] {
  const [x, y] = layout.load;
  const driven: DrawingItem[] =
    layout.driverReference === null
      ? [
          wire([
            [layout.output[0] + 40, y],
            [x, y],
          ]),
        ]
      : [];
  return [
    ...driven,
    part('resistor', 'RL', [x, y], [x, y + 96]),
    ...names('RL', valueOf('RL'), [x + 18, y + 42], 'start'),
    part('led', 'LED', [x, y + 96], [x, y + 180]),
    ...names('LED', valueOf('LED'), [x + 34, y + 136], 'start'),
    ground([x, y + 180]),
  ];
}

const driverSize = { width: 84, height: 100 };

/** The second section: output of the first to one input, the reference node to the other. */
export function drawDriver(layout: Layout, name: string): DrawingItem[] {
  const { output, reference, driverReference, load } = layout;
  if (driverReference === null) return [];
  const left = 524;
  const tap: Point = [reference[0] + 34, reference[1]];
  const middle = load[1];
  const inverting = middle - driverSize.height / 4;
  return [
    wire([
      [output[0] + 40, output[1]],
      [left, output[1]],
    ]),
    dot(tap),
    wire([
      tap,
      [tap[0], driverReference],
      [left - 20, driverReference],
      [left - 20, inverting],
      [left, inverting],
    ]),
    { kind: 'comparator', role: 'U1', at: [left, middle], ...driverSize, invertingAbove: true },
    label(name, [left + 36, middle + 5], 'middle', 'strong', 'U1'),
    wire([[left + driverSize.width, middle], load]),
  ];
}

export function drawDecoupling(valueOf: ValueOf, { rail, decouplingX: x }: Layout): DrawingItem[] {
  return [
    part('capacitor', 'C2', [x, rail], [x, rail + 84]),
    ...names('C2', valueOf('C2'), [x + 18, rail + 40], 'start'),
    ground([x, rail + 84]),
  ];
}

const idleSize = { width: 64, height: 72 };

/** Sections that nothing uses, once for all: inputs held apart by R5 and R6, outputs left open. */
export function drawIdle(
  valueOf: ValueOf,
  { idle: middle, reference }: Layout,
  sections: Sections,
): DrawingItem[] {
  if (middle === null) return [];
  const start = reference[0] + 12;
  const left = start + 122;
  const [upper, lower] = [middle - idleSize.height / 4, middle + idleSize.height / 4];
  const tip = left + idleSize.width;
  const name = sectionWords(sections.idle);
  return [
    label('+', [start - 6, upper + 5], 'end', 'strong'),
    part('resistor', 'R5', [start, upper], [left, upper]),
    ...names('R5', valueOf('R5'), above((start + left) / 2, upper), 'middle'),
    ground([start, lower]),
    part('resistor', 'R6', [start, lower], [left, lower]),
    ...names('R6', valueOf('R6'), below((start + left) / 2, lower), 'middle'),
    { kind: 'comparator', role: 'U1', at: [left, middle], ...idleSize, invertingAbove: true },
    wire([
      [tip, middle],
      [tip + 24, middle],
    ]),
    label(name, [tip + 34, middle - 3], 'start', 'strong', 'U1'),
    label(
      sections.idle.length > 1 ? 'idle, outputs left open' : 'idle, output left open',
      [tip + 34, middle + 14],
      'start',
      'plain',
    ),
  ];
}
