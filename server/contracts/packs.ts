import { z } from 'zod';
import { careLevels, resolvedBriefSchema } from './brief.ts';
import { moneySchema, mountingSchema } from './common.ts';
import { drawingSchema, pulseStripSchema } from './drawing.ts';
import { partKindSchema } from './parts.ts';

export const packRoles = [
  'U1',
  'R1',
  'R2',
  'R3',
  'R4',
  'R4A',
  'R4B',
  'RP',
  'C1',
  'C2',
  'LED',
  'RL',
  'PCB',
  'BAT',
  'BH',
  'R5',
  'R6',
  'RC',
  'RD',
  'DC',
  'DD',
  'RV',
] as const;
export const packRoleSchema = z.enum(packRoles);
export type PackRole = z.infer<typeof packRoleSchema>;

/** How a part is marked: colour bands, a printed code, or both; words for those who cannot see colour. */
export const markingSchema = z.object({
  bands: z.array(z.string()).nullable(),
  code: z.string().nullable(),
  text: z.string(),
});
export type Marking = z.infer<typeof markingSchema>;

export const packPartSchema = z.object({
  role: packRoleSchema,
  sku: z.string(),
  kind: partKindSchema,
  quantity: z.int(),
  /** What it is, in words: "887 kΩ ± 1 %", "560 nF ± 5 % film". */
  label: z.string(),
  /** Value alone: "887 kΩ". Empty where the part has no value. */
  value: z.string(),
  mounting: mountingSchema,
  marking: markingSchema,
  ohms: z.number().optional(),
  farads: z.number().optional(),
  tolerance: z.number().optional(),
  dielectric: z.string().optional(),
  colour: z.string().optional(),
  /** Comparators in the package; R5 and R6 hold the idle ones' inputs apart. */
  sections: z.int().optional(),
});
export type PackPart = z.infer<typeof packPartSchema>;

export const cautionCodes = [
  'flash',
  'low-voltage-only',
  'soldering',
  'polarity',
  'not-for-safety',
  'small-parts',
  'battery',
] as const;
export const cautionSchema = z.object({
  code: z.enum(cautionCodes),
  text: z.string(),
  /** True where an order needs the buyer's explicit acknowledgement. */
  mustAcknowledge: z.boolean(),
});
export type Caution = z.infer<typeof cautionSchema>;

export const promiseSchema = z.object({
  frequencyHz: z.number(),
  error: z.number(),
  /** Every kit stays inside: tolerances, temperature range and supply range at their worst together. */
  band: z.object({ minHz: z.number(), maxHz: z.number() }),
  yieldWithinBand: z.number(),
  yieldStandardError: z.number(),
  duty: z.number(),
  averageSupplyAmps: z.number(),
  /** The promise in the unit the maker asked in, with no more digits than it supports. */
  text: z.object({
    rate: z.string(),
    unit: z.string(),
    band: z.string(),
    from: z.string(),
    to: z.string(),
    error: z.string(),
    yield: z.string(),
    supply: z.string(),
  }),
});
export type PackPromise = z.infer<typeof promiseSchema>;

export const topologies = ['equal-thresholds', 'shifted-thresholds', 'steered'] as const;
export type Topology = (typeof topologies)[number];

export const wins = ['best-value', 'closest', 'steadiest'] as const;

export const packSchema = z.object({
  token: z.string(),
  topology: z.enum(topologies),
  /** Why the pack is built this way, in a sentence or two. */
  why: z.string(),
  careLevel: z.enum(careLevels),
  /** How R4A and R4B are joined; null with a single R4 and with steered timing. */
  join: z.enum(['series', 'parallel']).nullable(),
  /** The whole timing resistance; with a trimmer, what it is set to; null with steered timing. */
  timingOhms: z.number().nullable(),
  /** True where a spare section of the comparator drives the LED. */
  buffered: z.boolean(),
  parts: z.array(packPartSchema),
  promise: promiseSchema,
  price: z.object({ unit: moneySchema, total: moneySchema }),
  makeable: z.int(),
  cautions: z.array(cautionSchema),
  strip: pulseStripSchema,
  /** Where the pack comes near a limit of the trade, and what that means. */
  notes: z.array(z.object({ code: z.string(), text: z.string() })),
  /** The ranks for which this pack is the first of all. */
  wins: z.array(z.enum(wins)),
});
export type Pack = z.infer<typeof packSchema>;

/** A change of the brief that would help, as a patch that the form can apply in one tap. */
export const adviceSchema = z.object({
  code: z.string(),
  text: z.string(),
  change: z.record(z.string(), z.unknown()).nullable(),
  /** The worse end of the steadiest pack's guaranteed band with that change, as a fraction; null where it is not about that. */
  worseEnd: z.number().nullable(),
});
export type Advice = z.infer<typeof adviceSchema>;

export const solveResponseSchema = z.object({
  brief: resolvedBriefSchema,
  packs: z.array(packSchema),
  considered: z.int(),
  elapsedMs: z.number(),
  advice: z.array(adviceSchema),
});
export type SolveResponse = z.infer<typeof solveResponseSchema>;

const seriesSchema = z.array(z.tuple([z.number(), z.number()]));

export const packPageSchema = z.object({
  brief: resolvedBriefSchema,
  pack: packSchema,
  circuit: drawingSchema,
  /** From power-on, [seconds, volts]. */
  waveform: z.object({
    output: seriesSchema,
    capacitor: seriesSchema,
    thresholdLowVolts: z.number(),
    thresholdHighVolts: z.number(),
    supplyVolts: z.number(),
    firstHighSeconds: z.number(),
    periodSeconds: z.number(),
  }),
  /** What causes the spread: half-width of each cause alone, as a fraction of the rate, largest first. */
  causes: z.array(z.object({ role: z.string(), label: z.string(), fraction: z.number() })),
  causesText: z.string(),
  /** Average current by where it goes, largest first, and how long the cells last; null without cells. */
  supply: z.object({
    causes: z.array(z.object({ code: z.string(), label: z.string(), amps: z.number() })),
    totalAmps: z.number(),
    batteryHours: z.number().nullable(),
    text: z.string(),
  }),
  /** What the price is made of; adds up to the unit price. */
  priceLines: z.array(z.object({ label: z.string(), amount: moneySchema })),
  /** Maker's address and identifier as product-safety law wants them on the offer. */
  identifier: z.string(),
  maker: z.object({ name: z.string(), address: z.array(z.string()), email: z.string() }),
});
export type PackPage = z.infer<typeof packPageSchema>;
