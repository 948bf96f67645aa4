import { z } from 'zod';
import { quantity } from './common.ts';

const ohms = (what: string) => quantity(what, 1e-3, 1e12, 'Ω');
const parasiticOhms = (what: string) => quantity(what, 0, 1e9, 'Ω');
const amps = (what: string) => quantity(what, -1, 1, 'A');
const seconds = (what: string) => quantity(what, 0, 10, 's');
const perKelvin = (what: string) => quantity(what, -0.004, 0.004, 'per kelvin');

const diodeModelSchema = z.object({
  saturationAmps: quantity('The saturation current', 1e-20, 1e-2, 'A'),
  emissionCoefficient: quantity('The emission coefficient', 0.5, 10, ''),
  energyGapElectronVolts: quantity('The energy gap', 0.1, 5, 'eV').default(1.11),
  saturationTemperatureExponent: quantity('The saturation temperature exponent', 0, 10, '').default(
    3,
  ),
});

export const timingSchema = z.discriminatedUnion(
  'kind',
  [
    z.object({ kind: z.literal('single'), ohms: ohms('The timing resistance') }),
    z.object({
      kind: z.literal('steered'),
      chargeOhms: ohms('The charging resistance'),
      dischargeOhms: ohms('The discharging resistance'),
      diode: diodeModelSchema,
    }),
  ],
  { error: 'timing must be { "kind": "single", … } or { "kind": "steered", … }.' },
);

export const analyseRequestSchema = z.object({
  supplyVolts: quantity('The supply', 0.1, 1000, 'V'),
  celsius: quantity('The temperature', -100, 300, '°C').default(25),
  referenceCelsius: quantity('The reference temperature', -100, 300, '°C').default(25),
  thresholds: z.object({ r1Ohms: ohms('R1'), r2Ohms: ohms('R2'), r3Ohms: ohms('R3') }),
  timing: timingSchema,
  resistorTemperatureCoefficientPerKelvin: perKelvin(
    'The resistor temperature coefficient',
  ).default(0),
  capacitor: z.object({
    farads: quantity('The capacitance', 1e-15, 100, 'F'),
    leakageOhms: quantity('The leakage resistance', 1, 1e18, 'Ω').nullable().default(null),
    leakageAmps: amps('The leakage current').default(0),
    biasHalvingVolts: quantity('The halving voltage', 1e-3, 1e6, 'V').nullable().default(null),
    temperatureCoefficientPerKelvin: perKelvin('The capacitor temperature coefficient').default(0),
  }),
  comparator: z
    .object({
      output: z
        .enum(['push-pull', 'open-drain'], {
          error: 'The output must be "push-pull" or "open-drain".',
        })
        .default('push-pull'),
      highVolts: quantity('The high output', -1000, 1000, 'V').nullable().default(null),
      lowVolts: quantity('The low output', -1000, 1000, 'V').default(0),
      highOhms: parasiticOhms('The high output resistance').default(0),
      lowOhms: parasiticOhms('The low output resistance').default(0),
      pullUpOhms: ohms('The pull-up').nullable().default(null),
      delayLowHighSeconds: seconds('The rising delay').default(0),
      delayHighLowSeconds: seconds('The falling delay').default(0),
      invertingBiasAmps: amps('The inverting bias').default(0),
      nonInvertingBiasAmps: amps('The non-inverting bias').default(0),
      offsetVolts: quantity('The offset', -1000, 1000, 'V').default(0),
      hysteresisVolts: quantity('The hysteresis', 0, 1000, 'V').default(0),
    })
    .refine((part) => part.output === 'push-pull' || part.pullUpOhms !== null, {
      message: 'An open-drain output needs a pull-up; give pullUpOhms.',
      path: ['pullUpOhms'],
    })
    .prefault({}),
  tolerances: z
    .object({
      thresholds: quantity('The threshold tolerance', 0, 0.5, '').default(0),
      timing: quantity('The timing tolerance', 0, 0.5, '').default(0),
      capacitor: quantity('The capacitor tolerance', 0, 0.5, '').default(0),
      distribution: z.enum(['uniform', 'normal']).default('uniform'),
      targetHz: quantity('The target', 1e-12, 1e12, 'Hz').optional(),
      band: quantity('The band', 1e-6, 10, '').default(0.05),
      samples: quantity('The number of samples', 1, 1_000_000, '').int().default(100_000),
      seed: quantity('The seed', 0, 4294967295, '').int().default(7),
    })
    .optional(),
});
export type AnalyseRequest = z.output<typeof analyseRequestSchema>;

export const analyseResponseSchema = z.object({
  frequencyHz: z.number(),
  periodSeconds: z.number(),
  highSeconds: z.number(),
  lowSeconds: z.number(),
  duty: z.number(),
  firstHighSeconds: z.number(),
  thresholdLowVolts: z.number(),
  thresholdHighVolts: z.number(),
  averageSupplyAmps: z.number(),
  spread: z
    .object({
      worstCase: z.object({ minHz: z.number(), maxHz: z.number() }),
      rssFraction: z.number(),
      yieldWithinBand: z.number(),
      yieldStandardError: z.number(),
    })
    .optional(),
});
export type AnalyseResponse = z.infer<typeof analyseResponseSchema>;
