import { z } from 'zod';
import { emailSchema, line, moneySchema, pageOf, timestampSchema } from './common.ts';
import { packPartSchema, promiseSchema, cautionSchema } from './packs.ts';
import { drawingSchema, pulseStripSchema } from './drawing.ts';

export const orderStatuses = [
  'awaiting_payment',
  'paid',
  'picking',
  'packed',
  'shipped',
  'on_hold',
  'cancelled',
  'refunded',
] as const;
export const orderStatusSchema = z.enum(orderStatuses);
export type OrderStatus = z.infer<typeof orderStatusSchema>;

/** Free lines, post code as text, ISO 3166-1 alpha-2 country: no country's form is forced on another's. */
export const addressSchema = z.object({
  name: line('The name', 120),
  line1: line('The first address line', 120),
  line2: line('The second address line', 120, 0).optional(),
  city: line('The town', 120),
  region: line('The region', 120, 0).optional(),
  postalCode: line('The post code', 20, 0).default(''),
  country: z
    .string({ error: 'The country must be a two-letter code.' })
    .trim()
    .toUpperCase()
    .regex(/^[A-Z]{2}$/, 'Give the country as two letters (ISO 3166-1), like IE.'),
});
export type Address = z.infer<typeof addressSchema>;

export const checkoutSchema = z.object({
  email: emailSchema,
  shippingAddress: addressSchema,
  shippingMethod: line('The shipping method', 40),
  acknowledgements: z.array(line('The acknowledgement', 60)).max(50).default([]),
});
export type CheckoutInput = z.input<typeof checkoutSchema>;
export type Checkout = z.output<typeof checkoutSchema>;

export const checkoutResponseSchema = z.object({ orderRef: z.string(), paymentUrl: z.string() });
export type CheckoutResponse = z.infer<typeof checkoutResponseSchema>;

/** What checkout would come to for a country: shown before anybody pays. */
export const quoteQuerySchema = z.object({
  country: addressSchema.shape.country.default('IE'),
  shippingMethod: line('The shipping method', 40).optional(),
});
export const quoteSchema = z.object({
  country: z.string(),
  /** The basket's lines at this country's prices; they add up to the goods. */
  lines: z.array(
    z.object({
      id: z.string(),
      sentence: z.string(),
      quantity: z.int(),
      unitPrice: moneySchema,
      total: moneySchema,
    }),
  ),
  goods: moneySchema,
  shipping: moneySchema,
  tax: moneySchema,
  taxRate: z.number(),
  total: moneySchema,
  methods: z.array(
    z.object({ code: z.string(), name: z.string(), price: moneySchema, days: z.string() }),
  ),
  countries: z.array(z.object({ code: z.string(), name: z.string() })),
});
export type Quote = z.infer<typeof quoteSchema>;

export const orderSummarySchema = z.object({
  ref: z.string(),
  status: orderStatusSchema,
  placedAt: timestampSchema,
  total: moneySchema,
  kits: z.int(),
  sentence: z.string(),
  strip: pulseStripSchema.nullable(),
});
export type OrderSummary = z.infer<typeof orderSummarySchema>;
export const ordersPageSchema = pageOf(orderSummarySchema);

/** One line of the ledger that an order keeps of itself. */
export const orderEventSchema = z.object({
  at: timestampSchema,
  who: z.string(),
  what: z.string(),
  from: z.string().nullable(),
  to: z.string().nullable(),
});

export const orderSchema = z.object({
  ref: z.string(),
  status: orderStatusSchema,
  email: z.string(),
  placedAt: timestampSchema,
  reservedUntil: timestampSchema.nullable(),
  shipBy: timestampSchema.nullable(),
  shippingAddress: addressSchema,
  shippingMethod: z.object({ code: z.string(), name: z.string() }),
  lines: z.array(
    z.object({
      id: z.string(),
      sentence: z.string(),
      quantity: z.int(),
      unitPrice: moneySchema,
      total: moneySchema,
      parts: z.array(packPartSchema),
      promise: promiseSchema,
      cautions: z.array(cautionSchema),
      strip: pulseStripSchema,
      identifier: z.string(),
      buildSheetPath: z.string(),
    }),
  ),
  goods: moneySchema,
  shipping: moneySchema,
  tax: moneySchema,
  total: moneySchema,
  refunded: moneySchema,
  /** Where to pay while the order waits for payment; null otherwise. */
  paymentUrl: z.string().nullable(),
  shipment: z
    .object({ carrier: z.string(), tracking: z.string(), shippedAt: timestampSchema })
    .nullable(),
  events: z.array(orderEventSchema),
});
export type Order = z.infer<typeof orderSchema>;

/** Everything a build sheet says, for the page and for the PDF alike. */
export const buildSheetSchema = z.object({
  ref: z.string(),
  lineId: z.string(),
  kits: z.int(),
  identifier: z.string(),
  sentence: z.string(),
  promise: promiseSchema,
  strip: pulseStripSchema,
  parts: z.array(packPartSchema),
  drawing: drawingSchema,
  steps: z.array(z.object({ title: z.string(), text: z.string(), roles: z.array(z.string()) })),
  readings: z.array(z.object({ point: z.string(), expect: z.string(), how: z.string() })),
  cautions: z.array(cautionSchema),
});
export type BuildSheet = z.infer<typeof buildSheetSchema>;
