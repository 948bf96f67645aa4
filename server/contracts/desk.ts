import { z } from 'zod';
import {
  line,
  moneySchema,
  mountingSchema,
  pageOf,
  pageQuerySchema,
  timestampSchema,
} from './common.ts';
import { orderSchema, orderStatusSchema } from './orders.ts';
import { partKindSchema, partSchema } from './parts.ts';

export const deskPartSorts = ['sku', 'value', 'price', 'onHand', 'available', 'name'] as const;
export const deskPartsQuerySchema = pageQuerySchema.extend({
  search: z.string().trim().max(100, 'The search is longer than 100 characters.').optional(),
  kind: partKindSchema.optional(),
  mounting: mountingSchema.optional(),
  stock: z.enum(['all', 'in', 'low', 'out']).default('all'),
  sort: z.enum(deskPartSorts).default('sku'),
  direction: z.enum(['up', 'down']).default('up'),
});
export type DeskPartsQuery = z.input<typeof deskPartsQuerySchema>;

export const deskPartSchema = z.object({
  id: z.string(),
  part: partSchema,
  cost: moneySchema,
  onHand: z.int(),
  reserved: z.int(),
  active: z.boolean(),
  lots: z.array(
    z.object({
      id: z.string(),
      code: z.string(),
      bin: z.string(),
      onHand: z.int(),
      reserved: z.int(),
      receivedOn: z.string(),
    }),
  ),
});
export type DeskPart = z.infer<typeof deskPartSchema>;
export const deskPartsPageSchema = pageOf(deskPartSchema);
export type DeskPartsPage = z.infer<typeof deskPartsPageSchema>;

export const stockReasons = [
  'counted',
  'received',
  'damaged',
  'lost',
  'found',
  'returned',
] as const;

export const changePriceSchema = z.object({
  /** Net price of one piece in minor units. */
  unitPrice: z.object({
    amount: z
      .int('The price must be a whole number of cents.')
      .min(0, 'A price cannot be negative.')
      .max(100_000_00, 'The price is above 100,000.'),
    currency: z.literal('EUR', { error: 'Prices are in EUR.' }),
  }),
  reason: line('The reason', 200, 3),
});

export const changeStockSchema = z.object({
  lotId: line('The lot', 40),
  /** What is in the bin now. */
  onHand: z
    .int('The count must be a whole number.')
    .min(0, 'A bin cannot hold fewer than none.')
    .max(10_000_000, 'The count is too large.'),
  reason: z.enum(stockReasons, { error: `The reason must be one of ${stockReasons.join(', ')}.` }),
  note: line('The note', 200, 3),
});

export const ledgerEntrySchema = z.object({
  at: timestampSchema,
  who: z.string(),
  what: z.string(),
  lot: z.string(),
  bin: z.string(),
  from: z.int(),
  to: z.int(),
});
export const partHistorySchema = z.object({
  ledger: z.array(ledgerEntrySchema),
  audit: z.array(
    z.object({
      at: timestampSchema,
      who: z.string(),
      what: z.string(),
      from: z.string().nullable(),
      to: z.string().nullable(),
    }),
  ),
});
export type PartHistory = z.infer<typeof partHistorySchema>;

export const deskOrdersQuerySchema = pageQuerySchema.extend({
  search: z.string().trim().max(100, 'The search is longer than 100 characters.').optional(),
  status: orderStatusSchema.optional(),
});
export const deskOrderRowSchema = z.object({
  ref: z.string(),
  status: orderStatusSchema,
  placedAt: timestampSchema,
  email: z.string(),
  name: z.string(),
  kits: z.int(),
  total: moneySchema,
  sentence: z.string(),
});
export type DeskOrderRow = z.infer<typeof deskOrderRowSchema>;
export const deskOrdersPageSchema = pageOf(deskOrderRowSchema);
export type DeskOrdersPage = z.infer<typeof deskOrdersPageSchema>;

export const deskOrderSchema = orderSchema.extend({
  payments: z.array(
    z.object({
      at: timestampSchema,
      what: z.string(),
      amount: moneySchema,
      status: z.string(),
      reference: z.string(),
    }),
  ),
  refundable: moneySchema,
  /** Where a refund leaves the parts: still on the shelf or gone with the parcel. */
  stockNote: z.string(),
});
export type DeskOrder = z.infer<typeof deskOrderSchema>;

export const refundRequestSchema = z.object({ reason: line('The reason', 200, 3) });

export const auditQuerySchema = pageQuerySchema.extend({
  search: z.string().trim().max(100).optional(),
});
export const auditEntrySchema = z.object({
  at: timestampSchema,
  who: z.string(),
  what: z.string(),
  subject: z.string(),
  from: z.string().nullable(),
  to: z.string().nullable(),
  note: z.string().nullable(),
});
export const auditPageSchema = pageOf(auditEntrySchema);
export type AuditPage = z.infer<typeof auditPageSchema>;

export const deskTodaySchema = z.object({
  waiting: z.int(),
  late: z.int(),
  soldToday: moneySchema,
  outOfStock: z.int(),
  lowStock: z.array(
    z.object({ id: z.string(), sku: z.string(), name: z.string(), available: z.int() }),
  ),
  /** What needs the owner today, in sentences, each with where to go. */
  decisions: z.array(
    z.object({ when: z.string(), text: z.string(), path: z.string(), action: z.string() }),
  ),
  ledger: z.array(ledgerEntrySchema),
});
export type DeskToday = z.infer<typeof deskTodaySchema>;

/** What today's shelves hold over a log-spaced range of rates, for a logic clock at 5 V. */
export const coverageSchema = z.object({
  band: z.number(),
  /** Best guaranteed half-band as a fraction of the rate; null where no pack comes within 1 % of it. */
  points: z.array(z.object({ frequencyHz: z.number(), halfBand: z.number().nullable() })),
  /** Share of the points whose guaranteed band lies within `band`. */
  covered: z.number(),
});
export type Coverage = z.infer<typeof coverageSchema>;
