import { z } from 'zod';
import { line, pageOf, timestampSchema } from './common.ts';
import { orderStatusSchema } from './orders.ts';
import { packPartSchema } from './packs.ts';

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

export const shipRequestSchema = z.object({
  carrier: line('The carrier', 60),
  tracking: line('The tracking number', 80),
});
export type ShipRequest = z.infer<typeof shipRequestSchema>;
