import { z } from 'zod';
import { line, mountingSchema, quantity } from './common.ts';

export const targetUnits = ['Hz', 'kHz', 'per_minute', 's', 'ms'] as const;
export const ledColours = ['red', 'orange', 'yellow', 'green', 'blue'] as const;
export const careLevels = ['as-stocked', 'lot-checked', 'bench-tuned', 'trimmer-fitted'] as const;
export const ranks = ['best-value', 'closest', 'steadiest'] as const;

const rateSentence = 'The rate must be a number above zero and not above a thousand million.';

export const targetSchema = z.object({
  value: z.number({ error: rateSentence }).min(1e-9, rateSentence).max(1e9, rateSentence),
  unit: z.enum(targetUnits, { error: `The unit must be one of ${targetUnits.join(', ')}.` }),
});
export type Target = z.infer<typeof targetSchema>;

const supplyForms = 'Give the supply as { "volts": 5 } or { "battery": "<sku>" }, one of the two.';

/** A regulated voltage, or a battery of the shop's. */
export const supplySchema = z
  .strictObject(
    {
      volts: quantity('The supply', 0.5, 60, 'V').optional(),
      battery: line('The battery', 40).optional(),
    },
    { error: supplyForms },
  )
  .transform((supply, context): { volts: number } | { battery: string } => {
    const { volts, battery } = supply;
    if (volts !== undefined && battery === undefined) return { volts };
    if (battery !== undefined && volts === undefined) return { battery };
    context.addIssue({ code: 'custom', message: supplyForms });
    return z.NEVER;
  });

export const loadSchema = z.discriminatedUnion(
  'kind',
  [
    z.object({
      kind: z.literal('led'),
      colour: z.enum(ledColours, { error: `The colour must be one of ${ledColours.join(', ')}.` }),
      amps: quantity('The LED current', 0.0002, 0.03, 'A').default(0.002),
    }),
    z.object({ kind: z.literal('logic') }),
  ],
  { error: 'The load must be { "kind": "led", … } or { "kind": "logic" }.' },
);
export type Load = z.infer<typeof loadSchema>;

export const ambientSchema = z
  .object({
    minCelsius: quantity('The lowest temperature', -55, 125, '°C'),
    maxCelsius: quantity('The highest temperature', -55, 125, '°C'),
  })
  .refine((range) => range.minCelsius <= range.maxCelsius, {
    message: 'The lowest temperature is above the highest; swap the two.',
    path: ['minCelsius'],
  });

/** What the maker asks for. Only the target is compulsory; defaults are filled in by the server. */
export const briefSchema = z.object({
  target: targetSchema,
  duty: quantity('The duty', 0.05, 0.95, '').default(0.5),
  supply: supplySchema.default({ volts: 5 }),
  load: loadSchema.optional(),
  band: quantity('The band', 0.0005, 0.5, '').default(0.05),
  ambient: ambientSchema.default({ minCelsius: 0, maxCelsius: 40 }),
  mounting: mountingSchema.default('through-hole'),
  careLevel: z
    .enum(careLevels, { error: `The care level must be one of ${careLevels.join(', ')}.` })
    .default('as-stocked'),
  quantity: quantity('The quantity', 1, 500, '')
    .int('The quantity must be a whole number.')
    .default(1),
});
export type BriefInput = z.input<typeof briefSchema>;
export type ParsedBrief = z.output<typeof briefSchema>;

export const solveRequestSchema = briefSchema.extend({
  rank: z
    .enum(ranks, { error: `The rank must be one of ${ranks.join(', ')}.` })
    .default('best-value'),
  limit: quantity('The limit', 1, 50, '').int('The limit must be a whole number.').default(10),
});
export type SolveRequestInput = z.input<typeof solveRequestSchema>;
export type SolveRequest = z.output<typeof solveRequestSchema>;
export type Rank = (typeof ranks)[number];
export type CareLevel = (typeof careLevels)[number];
export type LedColour = (typeof ledColours)[number];

/** The brief as the shop understood it: everything filled in, in SI units. */
export const resolvedBriefSchema = z.object({
  target: targetSchema,
  targetHz: z.number(),
  duty: z.number(),
  supply: z.object({
    volts: z.number(),
    minVolts: z.number(),
    maxVolts: z.number(),
    batterySku: z.string().nullable(),
    label: z.string(),
  }),
  load: loadSchema,
  band: z.number(),
  ambient: z.object({ minCelsius: z.number(), maxCelsius: z.number() }),
  mounting: mountingSchema,
  careLevel: z.enum(careLevels),
  quantity: z.int(),
  sentence: z.string(),
});
export type ResolvedBrief = z.infer<typeof resolvedBriefSchema>;
