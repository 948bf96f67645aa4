import { z } from 'zod';

const pointSchema = z.tuple([z.number(), z.number()]);

/** One piece of a line drawing in the drawing's own units (x to the right, y down). */
export const drawingItemSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('wire'), points: z.array(pointSchema), role: z.string().optional() }),
  z.object({ kind: z.literal('dot'), at: pointSchema, role: z.string().optional() }),
  /** A two-ended symbol from one end to the other, diodes from anode to cathode; `role` names the part. */
  z.object({
    kind: z.literal('part'),
    symbol: z.enum(['resistor', 'trimmer', 'capacitor', 'polarised-capacitor', 'diode', 'led']),
    role: z.string(),
    from: pointSchema,
    to: pointSchema,
  }),
  /** A comparator triangle: tip at `at` + (width, 0), inputs on the left edge. */
  z.object({
    kind: z.literal('comparator'),
    role: z.string(),
    at: pointSchema,
    width: z.number(),
    height: z.number(),
    invertingAbove: z.boolean(),
  }),
  z.object({ kind: z.literal('ground'), at: pointSchema }),
  z.object({
    kind: z.literal('label'),
    at: pointSchema,
    text: z.string(),
    anchor: z.enum(['start', 'middle', 'end']),
    weight: z.enum(['strong', 'plain']),
    role: z.string().optional(),
  }),
]);
export type DrawingItem = z.infer<typeof drawingItemSchema>;
export type PartSymbol = Extract<DrawingItem, { kind: 'part' }>['symbol'];

/** A schematic as data, drawn alike on the screen and on paper. */
export const drawingSchema = z.object({
  width: z.number(),
  height: z.number(),
  items: z.array(drawingItemSchema),
  /** The same connections in words, for those who cannot see the drawing. */
  description: z.array(z.string()),
});
export type Drawing = z.infer<typeof drawingSchema>;

export const pulseStripSchema = z.object({
  /** Output, two periods, unit box: x 0…1, y 0…1 with 1 = supply. */
  output: z.array(pointSchema),
  capacitor: z.array(pointSchema),
  thresholds: pointSchema,
  periodSeconds: z.number(),
  duty: z.number(),
});
export type PulseStripData = z.infer<typeof pulseStripSchema>;
