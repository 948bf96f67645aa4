import { describe, expect, it } from 'vitest';
import { drawingSchema, type Drawing, type DrawingItem } from '../../server/contracts/drawing.ts';
import type { PackRole } from '../../server/contracts/packs.ts';
import { drawSchematic } from '../../server/domain/schematic.ts';
import type { SchematicFacts } from '../../server/domain/schematic-pieces.ts';
import { blinker, find, rolesOf } from './found-packs.ts';

type Point = readonly [number, number];
type Drawn = SchematicFacts['parts'][number];

const values: Partial<Record<PackRole, string>> = {
  U1: 'TW-C9',
  LED: 'orange',
  DC: 'TW-D1S',
  DD: 'TW-D1S',
  C1: '680 nF',
  C2: '100 nF',
};

function partsOf(roles: readonly PackRole[], sections = 1): Drawn[] {
  return roles.map((role) => ({
    role,
    value: values[role] ?? '97.6 kΩ',
    kind: 'resistor',
    ...(role === 'U1' ? { sections } : {}),
  }));
}

const core = ['U1', 'R1', 'R2', 'R3', 'C1', 'C2'] as const;
const light = ['LED', 'RL'] as const;
const held = ['R5', 'R6'] as const;
const steering = ['RC', 'RD', 'DC', 'DD'] as const;
const plain = { join: null, timingOhms: 1e6, buffered: false, supplyLabel: 'four AAA cells' };

const kits: Record<string, SchematicFacts> = {
  'one timing resistor': { ...plain, parts: partsOf([...core, ...light, 'R4']) },
  'two in series': {
    ...plain,
    join: 'series',
    parts: partsOf([...core, ...light, 'R4A', 'R4B']),
  },
  'two in parallel and a pull-up': {
    ...plain,
    join: 'parallel',
    parts: partsOf([...core, 'R4A', 'R4B', 'RP', ...held], 2),
  },
  'steered timing': {
    ...plain,
    timingOhms: null,
    parts: partsOf([...core, ...light, ...steering]),
  },
  'a trimmer': { ...plain, parts: partsOf([...core, ...light, 'R4', 'RV']) },
  'the LED on a second section': {
    ...plain,
    buffered: true,
    parts: partsOf([...core, ...light, 'R4'], 2),
  },
  'steered timing, four sections, the LED on one': {
    ...plain,
    timingOhms: null,
    buffered: true,
    parts: partsOf([...core, ...light, ...steering, ...held], 4),
  },
};
const cases = Object.entries(kits);

const flash = { target: { value: 90, unit: 'per_minute' } } as const;
const clock = { target: { value: 50, unit: 'Hz' }, load: { kind: 'logic' } } as const;

const ofKind = <Kind extends DrawingItem['kind']>(drawing: Drawing, kind: Kind) =>
  drawing.items.filter((item): item is Extract<DrawingItem, { kind: Kind }> => item.kind === kind);
const drawnRoles = (drawing: Drawing) => ofKind(drawing, 'part').map(({ role }) => role);
const placed = (drawing: Drawing, role: PackRole) =>
  ofKind(drawing, 'part').find((item) => item.role === role)!;
const words = (drawing: Drawing) => drawing.description.join(' ');

/** Every straight run of a wire, and every part from end to end. */
function runs(drawing: Drawing): [Point, Point][] {
  return [
    ...ofKind(drawing, 'part').map(({ from, to }): [Point, Point] => [from, to]),
    ...ofKind(drawing, 'wire').flatMap(({ points }) =>
      points.slice(1).map((end, k): [Point, Point] => [points[k]!, end]),
    ),
  ];
}

/** Points that are joined: by a wire, by the zero length between ends, or where a dot sits on a run. */
function nets(drawing: Drawing) {
  const key = ([x, y]: Point) => `${x},${y}`;
  const parent = new Map<string, string>();
  const rootOf = (name: string): string => {
    const up = parent.get(name) ?? name;
    return up === name ? name : rootOf(up);
  };
  const joinUp = (a: Point, b: Point) => parent.set(rootOf(key(a)), rootOf(key(b)));
  const wires = ofKind(drawing, 'wire');
  for (const { points } of wires) points.slice(1).forEach((point, k) => joinUp(points[k]!, point));
  for (const { at } of ofKind(drawing, 'dot')) {
    for (const { points } of wires)
      points.slice(1).forEach((end, k) => {
        if (isOn(at, points[k]!, end)) joinUp(at, end);
      });
  }
  return (a: Point, b: Point) => rootOf(key(a)) === rootOf(key(b));
}

function isOn([x, y]: Point, [ax, ay]: Point, [bx, by]: Point): boolean {
  const between = (value: number, one: number, other: number) =>
    value >= Math.min(one, other) - 1e-9 && value <= Math.max(one, other) + 1e-9;
  const cross = (bx - ax) * (y - ay) - (by - ay) * (x - ax);
  return Math.abs(cross) < 1e-6 && between(x, ax, bx) && between(y, ay, by);
}

interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** Where lettering of 15 units stands; 0.58 of it is a generous mean advance of Nunito. */
function letterBox({ at: [x, y], text, anchor }: Extract<DrawingItem, { kind: 'label' }>): Box {
  const width = text.length * 15 * 0.58;
  const left = { start: x, middle: x - width / 2, end: x - width }[anchor];
  return { left, right: left + width, top: y - 11, bottom: y + 1 };
}

const meets = (a: Box, b: Box) =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

/** What a run covers: half a line's width, or a symbol's half height about the middle of a part. */
function inkBoxes(drawing: Drawing): Box[] {
  const around = ([ax, ay]: Point, [bx, by]: Point, half: number): Box => ({
    left: Math.min(ax, bx) - half,
    right: Math.max(ax, bx) + half,
    top: Math.min(ay, by) - half,
    bottom: Math.max(ay, by) + half,
  });
  const bodies = ofKind(drawing, 'part').map(({ from, to, symbol }) => {
    const middle: Point = [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2];
    const tall = { trimmer: 17, capacitor: 14, 'polarised-capacitor': 14 }[symbol as string] ?? 10;
    return around(middle, middle, tall);
  });
  const grounds = ofKind(drawing, 'ground').map(({ at: [x, y] }) =>
    around([x - 13, y], [x + 13, y + 16], 1),
  );
  return [...runs(drawing).map(([a, b]) => around(a, b, 1)), ...bodies, ...grounds];
}

describe('drawSchematic', () => {
  describe.each(cases)('of a kit with %s', (_, facts) => {
    const drawing = drawingSchema.parse(drawSchematic(facts));

    it('draws every part once, with its value, and names it in the words too', () => {
      const electric = rolesOf(facts.parts).filter((role) => role !== 'U1');
      expect(drawnRoles(drawing).sort()).toEqual([...electric].sort());
      const labels = ofKind(drawing, 'label').map(({ text }) => text);
      for (const { role, value } of facts.parts.filter((one) => one.role !== 'U1')) {
        expect(labels).toContain(role);
        expect(labels).toContain(value);
        expect(words(drawing)).toMatch(new RegExp(`\\b${role}\\b`));
      }
    });

    it('sets no lettering on a line, a symbol or other lettering, and none off the sheet', () => {
      const letters = ofKind(drawing, 'label');
      const ink = inkBoxes(drawing);
      letters.forEach((one, k) => {
        const box = letterBox(one);
        const struck = ink.filter((other) => meets(box, other));
        expect({ text: one.text, struck }).toEqual({ text: one.text, struck: [] });
        const over = letters.slice(k + 1).filter((other) => meets(box, letterBox(other)));
        expect({ text: one.text, over }).toEqual({ text: one.text, over: [] });
        expect(box.left).toBeGreaterThanOrEqual(0);
        expect(box.right).toBeLessThanOrEqual(drawing.width);
        expect(box.top).toBeGreaterThanOrEqual(0);
        expect(box.bottom).toBeLessThanOrEqual(drawing.height);
      });
    });

    it('joins the capacitor to the inverting input, and R3 to the output and the reference', () => {
      const joined = nets(drawing);
      const main = ofKind(drawing, 'comparator')[0]!;
      const [x, y] = main.at;
      const pin = (share: number): Point => [x, y + share * main.height];
      const tip: Point = [x + main.width, y];
      expect(joined(placed(drawing, 'C1').from, pin(0.25))).toBe(true);
      expect(joined(placed(drawing, 'R1').to, pin(-0.25))).toBe(true);
      expect(joined(placed(drawing, 'R3').from, pin(-0.25))).toBe(true);
      expect(joined(placed(drawing, 'R3').to, tip)).toBe(true);
      expect(joined(pin(0.25), pin(-0.25))).toBe(false);
      expect(joined(pin(0.25), tip)).toBe(false);
    });
  });

  describe('with steered timing', () => {
    const drawing = drawSchematic(kits['steered timing']!);
    const joined = nets(drawing);
    const output = placed(drawing, 'R3').to;
    const node = placed(drawing, 'C1').from;

    it('charges over DC, its anode at the output, and discharges over DD, its anode at C1’s side', () => {
      const [charge, discharge] = [placed(drawing, 'DC'), placed(drawing, 'DD')];
      expect(joined(charge.from, output)).toBe(true);
      expect(charge.to).toEqual(placed(drawing, 'RC').to);
      expect(joined(placed(drawing, 'RC').from, node)).toBe(true);
      expect(joined(discharge.to, output)).toBe(true);
      expect(discharge.from).toEqual(placed(drawing, 'RD').to);
      expect(joined(placed(drawing, 'RD').from, node)).toBe(true);
      expect(words(drawing)).toContain('DC’s anode is on the output’s side');
      expect(words(drawing)).toContain('DD’s anode is towards C1');
    });
  });

  describe('when a second section drives the LED', () => {
    const drawing = drawSchematic(kits['the LED on a second section']!);
    const joined = nets(drawing);
    const [main, driver] = ofKind(drawing, 'comparator');

    it('feeds it the output and the reference node, and takes the LED off the output', () => {
      const [x, y] = driver!.at;
      expect(driver!.invertingAbove).toBe(true);
      const inverting: Point = [x, y - driver!.height / 4];
      const other: Point = [x, y + driver!.height / 4];
      const output: Point = [main!.at[0] + main!.width, main!.at[1]];
      expect(joined(inverting, placed(drawing, 'R1').to)).toBe(true);
      expect(joined(other, output)).toBe(true);
      expect(joined([x + driver!.width, y], placed(drawing, 'RL').from)).toBe(true);
      expect(joined(placed(drawing, 'RL').from, output)).toBe(false);
      expect(words(drawing)).toMatch(/RL and the LED run from the output of U1B to ground/);
    });
  });

  describe('with idle sections', () => {
    const drawing = drawSchematic(kits['steered timing, four sections, the LED on one']!);

    it('holds their inputs apart, the inverting ones at the supply, and leaves the outputs open', () => {
      const idle = ofKind(drawing, 'comparator')[2]!;
      const upper: Point = [idle.at[0], idle.at[1] - idle.height / 4];
      expect(idle.invertingAbove).toBe(true);
      expect(placed(drawing, 'R5').to).toEqual(upper);
      expect(ofKind(drawing, 'ground').map(({ at }) => at)).toContainEqual(
        placed(drawing, 'R6').from,
      );
      expect(words(drawing)).toContain('U1C and U1D are idle');
      const single = drawSchematic(kits['two in parallel and a pull-up']!);
      expect(words(single)).toContain('U1B is idle');
    });
  });

  describe('with two timing resistors', () => {
    it('sets them in a row for series and one under the other for parallel', () => {
      const heights = (kit: string) =>
        (['R4A', 'R4B'] as const).map((role) => placed(drawSchematic(kits[kit]!), role).from[1]);
      const [a, b] = heights('two in series');
      const [c, d] = heights('two in parallel and a pull-up');
      expect(a).toBe(b);
      expect(c).not.toBe(d);
    });
  });

  describe('with a trimmer', () => {
    it('says what it and R4 are set to together', () => {
      const drawing = drawSchematic(kits['a trimmer']!);
      expect(placed(drawing, 'RV').symbol).toBe('trimmer');
      expect(ofKind(drawing, 'label').map(({ text }) => text)).toContain('together 1\u202fMΩ');
    });
  });

  describe('of packs the search finds', () => {
    it.each([
      ['a blinker', blinker],
      ['a slow clock on four sections', find(clock, 4)],
      ['a short flash', find({ ...flash, duty: 0.1 }, 1, 'steadiest')],
      ['a set blinker', find({ ...flash, careLevel: 'trimmer-fitted' })],
    ])('draws %s with all its parts', (_, found) => {
      const [pack] = found.packs;
      const drawing = drawSchematic({
        parts: found.parts,
        join: found.join,
        timingOhms: pack!.timing.kind === 'steered' ? null : pack!.timing.ohms,
        buffered: pack!.frame.head.buffered,
        supplyLabel: found.inHand.brief.supply.label,
      });
      const electric = rolesOf(found.parts).filter(
        (role) => !['U1', 'PCB', 'BH', 'BAT'].includes(role),
      );
      expect(drawnRoles(drawing).sort()).toEqual([...electric].sort());
    });
  });
});
