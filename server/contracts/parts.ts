import { z } from 'zod';
import { moneySchema, mountingSchema, pageOf, pageQuerySchema } from './common.ts';

export const partKinds = [
  'resistor',
  'capacitor',
  'comparator',
  'led',
  'diode',
  'board',
  'battery',
  'holder',
  'trimmer',
] as const;
export const partKindSchema = z.enum(partKinds, {
  error: `The kind must be one of ${partKinds.join(', ')}.`,
});
export type PartKind = z.infer<typeof partKindSchema>;

export const dielectrics = ['C0G', 'X7R', 'film-pp', 'film-pet', 'electrolytic'] as const;
export type Dielectric = (typeof dielectrics)[number];

const common = {
  sku: z.string(),
  name: z.string(),
  mounting: mountingSchema,
  available: z.int(),
  unitPrice: moneySchema,
};

export const resistorSchema = z.object({
  ...common,
  kind: z.literal('resistor'),
  ohms: z.number(),
  tolerance: z.number(),
  temperatureCoefficientPerKelvin: z.number(),
  ratedWatts: z.number(),
});

export const capacitorSchema = z.object({
  ...common,
  kind: z.literal('capacitor'),
  farads: z.number(),
  tolerance: z.number(),
  dielectric: z.enum(dielectrics),
  ratedVolts: z.number(),
  temperatureCoefficientPerKelvin: z.number(),
  /** Largest change of capacitance over −55…125 °C beyond the linear coefficient, as a fraction. */
  temperatureSpread: z.number(),
  /** Insulation resistance times capacitance (ohm·farad = s); null where leakage is given as a current. */
  insulationSeconds: z.number().nullable(),
  leakageAmps: z.number(),
  /** v in C(V) = C/(1+(V/v)²); null where bias does not matter. */
  biasHalvingVolts: z.number().nullable(),
  polarised: z.boolean(),
});

export const comparatorSchema = z.object({
  ...common,
  kind: z.literal('comparator'),
  output: z.enum(['push-pull', 'open-drain']),
  sections: z.int(),
  supplyVolts: z.object({ min: z.number(), max: z.number() }),
  delayLowHighSeconds: z.number(),
  delayHighLowSeconds: z.number(),
  maxDelaySeconds: z.number(),
  inputBiasAmps: z.number(),
  maxInputBiasAmps: z.number(),
  offsetVolts: z.number(),
  maxOffsetVolts: z.number(),
  hysteresisVolts: z.number(),
  highOhms: z.number(),
  lowOhms: z.number(),
  maxOutputAmps: z.number(),
  quiescentAmps: z.number(),
  maxQuiescentAmps: z.number(),
});

export const ledSchema = z.object({
  ...common,
  kind: z.literal('led'),
  colour: z.string(),
  forwardVolts: z.number(),
  minForwardVolts: z.number(),
  maxForwardVolts: z.number(),
  maxAmps: z.number(),
});

export const diodeSchema = z.object({
  ...common,
  kind: z.literal('diode'),
  saturationAmps: z.number(),
  emissionCoefficient: z.number(),
  energyGapElectronVolts: z.number(),
  saturationTemperatureExponent: z.number(),
});

export const boardSchema = z.object({ ...common, kind: z.literal('board'), sections: z.int() });

/** A set of cells sold as one supply, with the holder that takes it. */
export const batterySchema = z.object({
  ...common,
  kind: z.literal('battery'),
  cellSize: z.enum(['AA', 'AAA']),
  cells: z.int(),
  nominalVolts: z.number(),
  freshVolts: z.number(),
  emptyVolts: z.number(),
  capacityAmpHours: z.number(),
});
export const holderSchema = z.object({
  ...common,
  kind: z.literal('holder'),
  cellSize: z.enum(['AA', 'AAA']),
  cells: z.int(),
});
export const trimmerSchema = z.object({
  ...common,
  kind: z.literal('trimmer'),
  ohms: z.number(),
  tolerance: z.number(),
  temperatureCoefficientPerKelvin: z.number(),
});

export const partSchema = z.discriminatedUnion('kind', [
  resistorSchema,
  capacitorSchema,
  comparatorSchema,
  ledSchema,
  diodeSchema,
  boardSchema,
  batterySchema,
  holderSchema,
  trimmerSchema,
]);
export type Part = z.infer<typeof partSchema>;
export type PublicResistor = z.infer<typeof resistorSchema>;
export type PublicCapacitor = z.infer<typeof capacitorSchema>;
export type PublicComparator = z.infer<typeof comparatorSchema>;
export type PublicLed = z.infer<typeof ledSchema>;
export type PublicBattery = z.infer<typeof batterySchema>;

export const partsQuerySchema = pageQuerySchema.extend({
  kind: partKindSchema.optional(),
  mounting: mountingSchema.optional(),
});
export const partsPageSchema = pageOf(partSchema);
export type PartsPage = z.infer<typeof partsPageSchema>;
