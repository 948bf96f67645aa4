import type { Drawing, DrawingItem } from '../contracts/drawing.ts';
import type { PackPart, PackRole } from '../contracts/packs.ts';

type Point = [number, number];

/** What a schematic is drawn from. */
export interface SchematicFacts {
  parts: readonly Pick<PackPart, 'role' | 'value' | 'dielectric' | 'kind'>[];
  join: 'series' | 'parallel' | null;
  supplyLabel: string;
}

const rail = 44;
const grid = {
  nodeP: [120, 160] as Point,
  nodeN: [236, 330] as Point,
  output: [430, 185] as Point,
  feedbackTop: 96,
  timingLow: 376,
  loadX: 500,
  decouplingX: 560,
  ground: 404,
};

/**
 * The schematic of a pack as plain geometry, 620 × 440 units, x to the right, y down: R1 and R2 as a
 * divider on the left, R3 over the comparator, R4 (or R4A and R4B) and C1 under it, and, where the
 * pack has them, a pull-up, an LED with its resistor and the supply decoupling on the right.
 */
export function drawSchematic(facts: SchematicFacts): Drawing {
  const values = new Map(facts.parts.map((part) => [part.role, part.value]));
  const has = (role: PackRole) => values.has(role);
  const items: DrawingItem[] = [
    ...drawRail(facts.supplyLabel, has('C2') ? grid.decouplingX : grid.loadX - 70),
    ...drawDivider(values),
    ...drawComparator(values),
    ...drawTiming(values, facts),
    ...(has('RP') ? drawPullUp(values) : []),
    ...(has('LED') ? drawLed(values) : []),
    ...(has('C2') ? drawDecoupling(values) : []),
  ];
  return { width: 620, height: 440, items, description: describe(facts, has) };
}

const wire = (points: Point[], role?: string): DrawingItem => ({ kind: 'wire', points, role });
const dot = (at: Point): DrawingItem => ({ kind: 'dot', at });

function part(
  symbol: 'resistor' | 'capacitor' | 'polarised-capacitor' | 'led',
  role: PackRole,
  from: Point,
  to: Point,
): DrawingItem {
  return { kind: 'part', symbol, role, from, to };
}

/** Name and value beside a part, or above and below a lying one. */
function names(
  role: PackRole,
  value: string,
  at: Point,
  anchor: 'start' | 'middle' | 'end',
): DrawingItem[] {
  const [x, y] = at;
  return [
    { kind: 'label', at: [x, y], text: role, anchor, weight: 'strong', role },
    { kind: 'label', at: [x, y + 17], text: value, anchor, weight: 'plain', role },
  ];
}

type Values = ReadonlyMap<PackRole, string>;
const valueOf = (values: Values, role: PackRole) => values.get(role) ?? '';

function drawRail(supplyLabel: string, right: number): DrawingItem[] {
  return [
    wire([
      [grid.nodeP[0], rail],
      [right, rail],
    ]),
    {
      kind: 'label',
      at: [right + 10, rail + 5],
      text: `+ ${supplyLabel}`,
      anchor: 'start',
      weight: 'strong',
    },
  ];
}

function drawDivider(values: Values): DrawingItem[] {
  const [x, y] = grid.nodeP;
  return [
    dot([x, rail]),
    part('resistor', 'R1', [x, rail], [x, y]),
    ...names('R1', valueOf(values, 'R1'), [x - 20, (rail + y) / 2 - 4], 'end'),
    dot([x, y]),
    part('resistor', 'R2', [x, y], [x, y + 120]),
    ...names('R2', valueOf(values, 'R2'), [x - 20, y + 56], 'end'),
    { kind: 'ground', at: [x, y + 120] },
  ];
}

function drawComparator(values: Values): DrawingItem[] {
  const [px, py] = grid.nodeP;
  const [ox, oy] = grid.output;
  const left = 280;
  return [
    wire([grid.nodeP, [left, py]]),
    dot([px + 70, py]),
    wire([
      [px + 70, py],
      [px + 70, grid.feedbackTop],
    ]),
    part('resistor', 'R3', [px + 70, grid.feedbackTop], [ox, grid.feedbackTop]),
    ...names('R3', valueOf(values, 'R3'), [(px + 70 + ox) / 2, grid.feedbackTop - 32], 'middle'),
    wire([[ox, grid.feedbackTop], grid.output]),
    {
      kind: 'comparator',
      role: 'U1',
      at: [left, oy],
      width: 96,
      height: 100,
      invertingAbove: false,
    },
    {
      kind: 'label',
      at: [left + 36, oy + 5],
      text: 'U1',
      anchor: 'middle',
      weight: 'strong',
      role: 'U1',
    },
    wire([[left + 96, oy], grid.output]),
    dot(grid.output),
    wire([grid.output, [ox + 40, oy]]),
    { kind: 'label', at: [ox + 46, oy - 8], text: 'out', anchor: 'start', weight: 'strong' },
    wire([[left, oy + 25], [grid.nodeN[0], oy + 25], grid.nodeN]),
  ];
}

function drawTiming(values: Values, { join, parts }: SchematicFacts): DrawingItem[] {
  const [nx, ny] = grid.nodeN;
  const [ox, oy] = grid.output;
  const middle = (nx + ox) / 2;
  const polarised = parts.some((one) => one.role === 'C1' && one.dielectric === 'electrolytic');
  const capacitor: DrawingItem[] = [
    dot([nx, ny]),
    part(polarised ? 'polarised-capacitor' : 'capacitor', 'C1', [nx, ny], [nx, grid.ground]),
    ...names('C1', valueOf(values, 'C1'), [nx - 24, ny + 36], 'end'),
    { kind: 'ground', at: [nx, grid.ground] },
  ];
  const down = wire([
    [ox, oy],
    [ox, ny],
  ]);
  if (join === null) {
    return [
      ...capacitor,
      down,
      part('resistor', 'R4', [nx, ny], [ox, ny]),
      ...names('R4', valueOf(values, 'R4'), [middle, ny - 32], 'middle'),
    ];
  }
  if (join === 'series') {
    return [
      ...capacitor,
      down,
      part('resistor', 'R4A', [nx, ny], [middle, ny]),
      part('resistor', 'R4B', [middle, ny], [ox, ny]),
      dot([middle, ny]),
      ...names('R4A', valueOf(values, 'R4A'), [(nx + middle) / 2, ny - 32], 'middle'),
      ...names('R4B', valueOf(values, 'R4B'), [(middle + ox) / 2, ny - 32], 'middle'),
    ];
  }
  const low = grid.timingLow;
  return [
    ...capacitor,
    down,
    part('resistor', 'R4A', [nx, ny], [ox, ny]),
    ...names('R4A', valueOf(values, 'R4A'), [middle, ny - 32], 'middle'),
    dot([nx + 36, ny]),
    dot([ox - 36, ny]),
    wire([
      [nx + 36, ny],
      [nx + 36, low],
    ]),
    wire([
      [ox - 36, ny],
      [ox - 36, low],
    ]),
    part('resistor', 'R4B', [nx + 36, low], [ox - 36, low]),
    ...names('R4B', valueOf(values, 'R4B'), [middle, low + 26], 'middle'),
  ];
}

function drawPullUp(values: Values): DrawingItem[] {
  const [ox, oy] = grid.output;
  return [
    dot([ox + 20, rail]),
    part('resistor', 'RP', [ox + 20, rail], [ox + 20, oy]),
    dot([ox + 20, oy]),
    ...names('RP', valueOf(values, 'RP'), [ox + 36, (rail + oy) / 2 - 4], 'start'),
  ];
}

function drawLed(values: Values): DrawingItem[] {
  const x = grid.loadX;
  const y = grid.output[1];
  return [
    wire([
      [grid.output[0] + 40, y],
      [x, y],
    ]),
    part('resistor', 'RL', [x, y], [x, y + 96]),
    ...names('RL', valueOf(values, 'RL'), [x + 18, y + 42], 'start'),
    part('led', 'LED', [x, y + 96], [x, y + 180]),
    ...names('LED', valueOf(values, 'LED'), [x + 34, y + 136], 'start'),
    { kind: 'ground', at: [x, y + 180] },
  ];
}

function drawDecoupling(values: Values): DrawingItem[] {
  const x = grid.decouplingX;
  return [
    part('capacitor', 'C2', [x, rail], [x, rail + 84]),
    ...names('C2', valueOf(values, 'C2'), [x + 18, rail + 40], 'start'),
    { kind: 'ground', at: [x, rail + 84] },
  ];
}

function describe(facts: SchematicFacts, has: (role: PackRole) => boolean): string[] {
  const timing =
    facts.join === null
      ? 'R4 runs from the output to the inverting input.'
      : `R4A and R4B, ${facts.join === 'series' ? 'one after the other' : 'side by side'}, run from the output to the inverting input.`;
  return [
    `The supply is ${facts.supplyLabel}.`,
    'R1 runs from the supply to the non-inverting input of U1, R2 from there to ground.',
    'R3 runs from the output of U1 back to the non-inverting input.',
    timing,
    'C1 runs from the inverting input to ground.',
    ...(has('RP') ? ['RP runs from the supply to the output.'] : []),
    ...(has('LED')
      ? ['RL and the LED run from the output to ground; the LED’s cathode is at ground.']
      : []),
    ...(has('C2') ? ['C2 runs from the supply to ground, close to U1.'] : []),
    'U1 takes the supply at its supply pin and ground at its ground pin.',
  ];
}
