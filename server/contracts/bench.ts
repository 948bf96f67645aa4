import { z } from 'zod';
import { line, pageOf, timestampSchema } from './common.ts';
import { orderStatusSchema } from './orders.ts';
import { packPartSchema, promiseSchema } from './packs.ts';

export const queueItemSchema = z.object({
  ref: z.string(),
  status: orderStatusSchema,
  shipBy: timestampSchema,
  late: z.boolean(),
  kits: z.int(),
  stops: z.int(),
  sentence: z.string(),
  shippingMethod: z.string(),
  claimedBy: z.string().nullable(),
  mine: z.boolean(),
});
export type QueueItem = z.infer<typeof queueItemSchema>;
export const queuePageSchema = pageOf(queueItemSchema);
export type QueuePage = z.infer<typeof queuePageSchema>;

export const pickSchema = z.object({
  id: z.string(),
  bin: z.string(),
  sku: z.string(),
  lot: z.string(),
  /** What the packer reads: "887 kΩ ± 1 %". */
  label: z.string(),
  marking: packPartSchema.shape.marking,
  kind: packPartSchema.shape.kind,
  roles: z.array(z.string()),
  quantity: z.int(),
  picked: z.int(),
});
export type Pick = z.infer<typeof pickSchema>;

/** A part with the bins where this order's pieces of it lie. */
const takeSchema = packPartSchema.extend({ bins: z.array(z.string()) });
export type Take = z.infer<typeof takeSchema>;

const join = z.enum(['series', 'parallel']).nullable();

export const tunedUnitSchema = z.object({
  /** Number of the kit in its line, from 1. */
  unit: z.int(),
  /** What its capacitor reads. */
  farads: z.number(),
  reading: z.string(),
  /** R4, or R4A and R4B. */
  take: z.array(takeSchema),
  join,
  /** Of this very kit; its band lies inside the sold one. */
  promise: promiseSchema,
});
export type TunedUnit = z.infer<typeof tunedUnitSchema>;

export const lineTuningSchema = z.object({
  /** The capacitor to measure: "820 nF ± 5 % film (PET)". */
  capacitor: z.string(),
  /** What the meter may show of it. */
  from: z.string(),
  to: z.string(),
  sold: promiseSchema,
  units: z.array(z.union([tunedUnitSchema, z.object({ unit: z.int(), farads: z.null() })])),
});
export type LineTuning = z.infer<typeof lineTuningSchema>;

export const benchOrderSchema = z.object({
  ref: z.string(),
  status: orderStatusSchema,
  shipBy: timestampSchema,
  claimedBy: z.string().nullable(),
  mine: z.boolean(),
  shippingMethod: z.string(),
  /** The address as it stands on the label, line by line. */
  address: z.array(z.string()),
  lines: z.array(
    z.object({
      id: z.string(),
      sentence: z.string(),
      quantity: z.int(),
      parts: z.array(packPartSchema),
      cautions: z.array(z.string()),
      /** The readings so far; null where the line is not bench-tuned. */
      tuning: lineTuningSchema.nullable(),
    }),
  ),
  picks: z.array(pickSchema),
  shipment: z.object({ carrier: z.string(), tracking: z.string() }).nullable(),
});
export type BenchOrder = z.infer<typeof benchOrderSchema>;

export const pickRequestSchema = z.object({
  id: line('The pick', 40),
  /** How many of this pick are in the tray now (not how many more). */
  quantity: z
    .int('The picked quantity must be a whole number.')
    .min(0, 'The picked quantity cannot be negative.')
    .max(100_000, 'The picked quantity is too large.'),
});

export const readingRequestSchema = z
  .object({
    lineId: line('The order line', 40),
    unit: z
      .int('The kit must be a whole number from 1.')
      .min(1, 'The kits of a line are counted from 1.')
      .max(500, 'A line has at most 500 kits.'),
    farads: z
      .number('The reading must be a number of farads.')
      .positive('A capacitor reads more than 0 F.')
      .max(1, 'A reading above 1 F is no timing capacitor; check the unit.')
      .optional(),
    /** As the meter shows it or somebody types it: "818.2n", "0.8182 uF", "818n2". */
    reading: line('The reading', 40).optional(),
  })
  .refine(({ farads, reading }) => (farads === undefined) !== (reading === undefined), {
    path: ['farads'],
    error: 'Give the reading once: as a number of farads, or as text in "reading".',
  });
export type ReadingRequest = z.infer<typeof readingRequestSchema>;

export const readingResponseSchema = tunedUnitSchema.extend({
  lineId: z.string(),
  /** Pieces that were in the tray for this kit and go back to their bins. */
  putBack: z.array(takeSchema),
  order: benchOrderSchema,
});
export type ReadingResponse = z.infer<typeof readingResponseSchema>;

export const shipRequestSchema = z.object({
  carrier: line('The carrier', 60),
  tracking: line('The tracking number', 80),
});
export type ShipRequest = z.infer<typeof shipRequestSchema>;
