import type { Drawing, DrawingItem } from '../contracts/drawing.ts';
import type { PackRole } from '../contracts/packs.ts';
import { layOut, type Layout } from './schematic-layout.ts';
import { drawDecoupling, drawDriver, drawIdle, drawLed, drawPullUp } from './schematic-output.ts';
import {
  above,
  dot,
  ground,
  label,
  names,
  part,
  sectionsOf,
  wire,
  type Point,
  type SchematicFacts,
} from './schematic-pieces.ts';
import { drawTiming } from './schematic-timing.ts';
import { describeSchematic } from './schematic-words.ts';

type ValueOf = (role: PackRole) => string;

/**
 * The schematic of a pack as plain geometry, x to the right, y down: R1 and R2 as a divider on the
 * left, R3 over the comparator, the timing resistors and C1 under it; on the right, where the pack
 * has them, a pull-up, the section that drives the LED, the LED with its resistor and the supply
 * decoupling; idle sections stand beneath. Supply pins are drawn once.
 */
export function drawSchematic(facts: SchematicFacts): Drawing {
  const values = new Map(facts.parts.map((one) => [one.role, one.value]));
  const has = (role: PackRole) => values.has(role);
  const valueOf: ValueOf = (role) => values.get(role) ?? '';
  const sections = sectionsOf(facts);
  const layout = layOut(facts, has);
  const items: DrawingItem[] = [
    ...drawRail(facts.supplyLabel, layout),
    ...drawDivider(valueOf, layout),
    ...drawComparator(valueOf, layout, sections.timing),
    ...drawTiming(facts, valueOf, has, layout),
    ...(has('RP') ? drawPullUp(valueOf, layout) : []),
    ...(sections.driver === null ? [] : drawDriver(layout, sections.driver)),
    ...(has('LED') ? drawLed(valueOf, layout) : []),
    ...(has('C2') ? drawDecoupling(valueOf, layout) : []),
    ...drawIdle(valueOf, layout, sections),
  ];
  const { width, height } = layout;
  return { width, height, items, description: describeSchematic(facts, has, sections) };
}

function drawRail(supplyLabel: string, { rail, railRight, reference }: Layout): DrawingItem[] {
  const start: Point = [reference[0], rail];
  return [
    wire([start, [railRight, rail]]),
    label(`+ ${supplyLabel}`, [start[0], rail - 12], 'start', 'strong'),
  ];
}

function drawDivider(valueOf: ValueOf, { rail, reference }: Layout): DrawingItem[] {
  const [x, y] = reference;
  return [
    dot([x, rail]),
    part('resistor', 'R1', [x, rail], [x, y]),
    ...names('R1', valueOf('R1'), [x - 20, (rail + y) / 2 - 4], 'end'),
    dot([x, y]),
    part('resistor', 'R2', [x, y], [x, y + 120]),
    ...names('R2', valueOf('R2'), [x - 20, y + 56], 'end'),
    ground([x, y + 120]),
  ];
}

const comparatorLeft = 280;
const comparatorSize = { width: 96, height: 100 };

function drawComparator(valueOf: ValueOf, layout: Layout, name: string): DrawingItem[] {
  const { reference, capacitor, output, feedback } = layout;
  const [px, py] = reference;
  const [ox, oy] = output;
  const left = comparatorLeft;
  const riser = px + 70;
  const { width, height } = comparatorSize;
  const inverting = oy + height / 4;
  return [
    wire([reference, [left, py]]),
    dot([riser, py]),
    wire([
      [riser, py],
      [riser, feedback],
    ]),
    part('resistor', 'R3', [riser, feedback], [ox, feedback]),
    ...names('R3', valueOf('R3'), above((riser + ox) / 2, feedback), 'middle'),
    wire([[ox, feedback], output]),
    ...drawPowerPins(layout),
    { kind: 'comparator', role: 'U1', at: [left, oy], width, height, invertingAbove: false },
    label(name, [left + 38, oy + 5], 'middle', 'strong', 'U1'),
    wire([[left + width, oy], output]),
    dot(output),
    wire([output, [ox + 40, oy]]),
    label('out', [ox + 46, oy - 8], 'start', 'strong'),
    wire([[left, inverting], [capacitor[0], inverting], capacitor]),
  ];
}

/** Supply and ground pin of the package, at its first section. */
function drawPowerPins({ output: [, oy] }: Layout): DrawingItem[] {
  const along = 34;
  const x = comparatorLeft + along;
  const { width, height } = comparatorSize;
  const edge = (height / 2) * (1 - along / width);
  return [
    wire([
      [x, oy - edge],
      [x, oy - edge - 16],
    ]),
    label('+', [x, oy - edge - 20], 'middle', 'strong'),
    wire([
      [x, oy + edge],
      [x, oy + edge + 14],
    ]),
    ground([x, oy + edge + 14]),
  ];
}
