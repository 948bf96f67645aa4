import type { PackRole } from '../contracts/packs.ts';
import type { Point, SchematicFacts } from './schematic-pieces.ts';

/** Where the nodes of a schematic lie, in drawing units, x to the right and y down. */
export interface Layout {
  width: number;
  height: number;
  rail: number;
  railRight: number;
  /** The reference node, where R1, R2 and R3 meet. */
  reference: Point;
  /** The node of the capacitor, at the inverting input. */
  capacitor: Point;
  output: Point;
  feedback: number;
  /** Height of the second timing path, under the first. */
  lowerPath: number;
  ground: number;
  load: Point;
  decouplingX: number;
  /** Height of the reference wire to the LED's driver; null without one. */
  driverReference: number | null;
  /** Middle of the idle sections' symbol; null without idle sections. */
  idle: number | null;
}

/**
 * Lays a schematic out: 640 × 440 units, wider where a second section drives the LED, higher where
 * idle sections stand beneath.
 */
export function layOut(facts: SchematicFacts, has: (role: PackRole) => boolean): Layout {
  // The reference wire to the driver runs between the supply and R3.
  const top = facts.buffered ? 28 : 0;
  const hasIdle = has('R5');
  const railEnds = facts.buffered ? 706 : 560;
  return {
    width: facts.buffered ? 790 : 640,
    height: 440 + top + (hasIdle ? 140 : 0),
    rail: 44,
    railRight: has('C2') ? railEnds : railEnds - 110,
    reference: [120, 160 + top],
    capacitor: [236, 330 + top],
    output: [430, 185 + top],
    feedback: 96 + top,
    lowerPath: 374 + top,
    ground: 404 + top,
    load: facts.buffered ? [640, 160 + top] : [500, 185 + top],
    decouplingX: railEnds,
    driverReference: facts.buffered ? 72 : null,
    idle: hasIdle ? 506 + top : null,
  };
}
