import fc from 'fast-check';
import type { SearchBrief, Shelf, StockedResistor } from '../../../server/engine/search/shelf.ts';

/** A shelf with a brief that it may or may not serve. */
export interface Case {
  shelf: Shelf;
  brief: SearchBrief;
}

/** Preferred numbers of a few decades; repeated picks give several parts of one value. */
const ohmValues = [1, 10, 100].flatMap((decade) =>
  [1e3, 1.5e3, 2.2e3, 3.3e3, 4.7e3, 6.8e3, 1e4].map((ohms) => ohms * decade),
);

const resistor = fc.record({
  available: fc.constantFrom(0, 1, 2, 3, 4, 5, 6, 9, 12, 40, 40, 40, 40, 40, 40),
  priceMinor: fc.constantFrom(3, 4, 6, 48),
  ohms: fc.constantFrom(...ohmValues),
  tolerance: fc.constantFrom(0.05, 0.01, 0.01, 0.01, 0.01, 0.001),
  temperatureCoefficientPerKelvin: fc.constantFrom(1.5e-5, 5e-5, 2e-4, -3e-4, 4e-4),
  ratedWatts: fc.constantFrom(0.1, 0.25, 0.25, 0.25),
});

const capacitor = fc.record({
  available: fc.constantFrom(0, 1, 3, 30, 30, 30, 30),
  priceMinor: fc.constantFrom(9, 20, 60),
  farads: fc.constantFrom(8.2e-11, 1e-10, 4.7e-10, 1e-9, 1e-8, 1e-8, 1e-7, 8.2e-7, 1e-5),
  tolerance: fc.constantFrom(0.01, 0.025, 0.05, 0.2),
  deviation: fc.constantFrom(null, null, 0.004),
  dielectric: fc.constantFrom(
    'C0G',
    'C0G',
    'film-pp',
    'film-pp',
    'film-pet',
    'film-pet',
    'X7R',
    'electrolytic',
  ),
  ratedVolts: fc.constantFrom(6.3, 16, 63, 63, 63),
  temperatureCoefficientPerKelvin: fc.constantFrom(0, -2e-4, 4e-4),
  temperatureSpread: fc.constantFrom(0, 0.004),
  insulationSeconds: fc.constantFrom(null, 500, 1e4),
  leakageAmps: fc.constantFrom(0, 0, 1e-9, 2e-7),
});

/** Typical bias with its maximum, as makers state them; of either sign. */
const bias = fc.constantFrom([0, 1e-11], [2e-12, 1e-11], [-2.5e-8, -1e-7], [1e-7, 2e-7]);
/** Typical delays, rising and falling, with their maximum. */
const delay = fc.constantFrom([0, 0, 1e-6], [4.5e-7, 3e-7, 1e-6], [9e-6, 7e-6, 2e-5]);

const comparatorFigures = fc.record({
  available: fc.constantFrom(0, 1, 3, 20, 20, 20, 20),
  priceMinor: fc.constantFrom(58, 130),
  output: fc.constantFrom('push-pull', 'push-pull', 'open-drain'),
  sections: fc.constantFrom(1, 1, 1, 2, 4),
  minSupplyVolts: fc.constantFrom(1.8, 1.8, 1.8, 2.9),
  maxSupplyVolts: fc.constantFrom(5.5, 16, 16),
  offsetVolts: fc.constant(1e-3),
  maxOffsetVolts: fc.constantFrom(2e-3, 5e-3),
  hysteresisVolts: fc.constantFrom(0, 2e-3),
  highOhms: fc.constantFrom(0, 40, 200),
  lowOhms: fc.constantFrom(0, 36, 150),
  maxOutputAmps: fc.constantFrom(0.001, 0.02, 0.02),
  quiescentAmps: fc.constant(1e-5),
  maxQuiescentAmps: fc.constant(2e-5),
});

const comparator = fc
  .record({ figures: comparatorFigures, bias, delay })
  .map(({ figures, bias: [typical, most], delay: [rising, falling, slowest] }) => ({
    ...figures,
    inputBiasAmps: typical,
    maxInputBiasAmps: most,
    delayLowHighSeconds: rising,
    delayHighLowSeconds: falling,
    maxDelaySeconds: slowest,
  }));

const diode = fc.record({
  available: fc.constantFrom(1, 2, 30, 30),
  priceMinor: fc.constantFrom(3, 5),
  saturationAmps: fc.constantFrom(1e-10, 1e-9, 1e-8),
  emissionCoefficient: fc.constantFrom(1.6, 1.9),
  energyGapElectronVolts: fc.constantFrom(0.69, 1.11),
  saturationTemperatureExponent: fc.constantFrom(2, 3),
});

const trimmer = fc.record({
  available: fc.constantFrom(0, 1, 30, 30),
  priceMinor: fc.constantFrom(70, 90),
  ohms: fc.constantFrom(1e3, 1e4, 1e5, 1e6),
  tolerance: fc.constantFrom(0.1, 0.2),
  temperatureCoefficientPerKelvin: fc.constantFrom(1e-4, -2e-4),
});

const numbered = <Part>(parts: Part[]) => parts.map((part, k) => ({ ...part, id: k + 1 }));

/** A small shelf of mixed parts, some sold out, some of one value. */
const smallShelf: fc.Arbitrary<Shelf> = fc
  .record({
    resistors: fc.array(resistor, { minLength: 4, maxLength: 11 }),
    capacitors: fc.array(capacitor, { minLength: 2, maxLength: 4 }),
    comparators: fc.array(comparator, { minLength: 2, maxLength: 4 }),
    diodes: fc.array(diode, { minLength: 1, maxLength: 2 }),
    trimmers: fc.array(trimmer, { maxLength: 3 }),
  })
  .map(({ resistors, capacitors, comparators, diodes, trimmers }) => ({
    resistors: numbered(resistors),
    capacitors: numbered(capacitors),
    comparators: numbered(comparators),
    diodes: numbered(diodes),
    trimmers: numbered(trimmers),
  }));

const led = fc.record({
  amps: fc.constantFrom(0.0005, 0.002),
  forwardVolts: fc.constant(1.9),
  minForwardVolts: fc.constant(1.75),
  maxForwardVolts: fc.constant(2.1),
});

const wishes = fc.record({
  duty: fc.constantFrom(0.5, 0.5, 0.5, 0.5, 0.503, 0.04, 0.05, 0.1, 0.25, 0.4, 0.7, 0.85, 0.95),
  supplyVolts: fc.constantFrom(3, 3.3, 5, 5, 9),
  band: fc.constantFrom(0.01, 0.03, 0.07, 0.25),
  quantity: fc.constantFrom(1, 1, 1, 2, 3),
  load: fc.oneof({ weight: 2, arbitrary: fc.constant(null) }, { weight: 1, arbitrary: led }),
  maxCelsius: fc.constantFrom(25, 40, 70),
  care: fc.constantFrom('as-stocked' as const, 'lot-checked' as const),
});

/** How the rate is chosen: anywhere, at what some parts make, or at what a steered circuit makes. */
const plans = fc.record({
  aim: fc.constantFrom('anywhere', 'made', 'made', 'steered', 'steered'),
  first: fc.nat(),
  second: fc.nat(),
  capacitor: fc.nat(),
  near: fc.double({ min: -0.1, max: 0.1, noNaN: true }),
  decade: fc.double({ min: Math.log(0.02), max: Math.log(1e5), noNaN: true }),
  /** Value of R3 whose set for the duty is added to the shelf; 0 for none. */
  r3Ohms: fc.constantFrom(0, 1.2e4, 3.3e4, 1e5, 6.8e5),
});
type Plan = typeof plans extends fc.Arbitrary<infer One> ? One : never;

/** Three well-stocked resistors that make a duty, as R1/R3 = 4^(1−D) − 1 and R2/R3 = 4^D − 1. */
function thresholdsFor(duty: number, r3Ohms: number): Omit<StockedResistor, 'id'>[] {
  if (r3Ohms === 0) return [];
  const ratios = Math.abs(duty - 0.5) < 0.01 ? [1] : [1, 4 ** (1 - duty) - 1, 4 ** duty - 1];
  return ratios.map((ratio) => ({
    available: 40,
    priceMinor: 5,
    ohms: Number((r3Ohms * ratio).toPrecision(2)),
    tolerance: 0.01,
    temperatureCoefficientPerKelvin: 5e-5,
    ratedWatts: 0.25,
  }));
}

/** The asked duty; for a steered circuit that of two resistors on the shelf. */
function dutyOf(plan: Plan, one: number, other: number, asked: number): number {
  return plan.aim === 'steered' ? Math.min(0.95, Math.max(0.05, one / (one + other))) : asked;
}

function targetOf(plan: Plan, one: number, other: number, farads: number): number {
  if (plan.aim === 'anywhere') return Math.exp(plan.decade);
  const ohms = plan.aim === 'steered' ? 1.15 * (one + other) : 2 * one;
  return Math.min(1e5, Math.exp(plan.near) / (farads * Math.LN2 * ohms));
}

/** A small shelf and a brief up to 100 kHz, four times of five near what its parts make. */
export const anyCase: fc.Arbitrary<Case> = fc
  .record({ shelf: smallShelf, wish: wishes, plan: plans })
  .map(({ shelf, wish, plan }): Case => {
    const { resistors, capacitors } = shelf;
    const one = resistors[plan.first % resistors.length]!.ohms;
    const other = resistors[plan.second % resistors.length]!.ohms;
    const { farads } = capacitors[plan.capacitor % capacitors.length]!;
    const { supplyVolts, ...rest } = wish;
    const duty = dutyOf(plan, one, other, wish.duty);
    const brief: SearchBrief = {
      ...rest,
      supplyVolts,
      duty,
      targetHz: targetOf(plan, one, other, farads),
      minSupplyVolts: supplyVolts * 0.95,
      maxSupplyVolts: supplyVolts * 1.05,
      minCelsius: 0,
      meterUncertainty: 0.005,
    };
    const added = plan.aim === 'steered' ? 0.5 : duty;
    const more = [...resistors, ...thresholdsFor(added, plan.r3Ohms)];
    return { shelf: { ...shelf, resistors: numbered(more) }, brief };
  });
