import fc from 'fast-check';
import type { SearchBrief, Shelf } from '../../../server/engine/search/shelf.ts';

/** Preferred numbers of a few decades; repeated picks give several parts of one value. */
const ohmValues = [1, 10, 100].flatMap((decade) =>
  [1e3, 1.5e3, 2.2e3, 3.3e3, 4.7e3, 6.8e3, 1e4].map((ohms) => ohms * decade),
);

const resistor = fc.record({
  available: fc.constantFrom(0, 1, 2, 3, 4, 5, 6, 9, 12, 40, 40, 40, 40),
  priceMinor: fc.constantFrom(3, 4, 6, 48),
  ohms: fc.constantFrom(...ohmValues),
  tolerance: fc.constantFrom(0.05, 0.01, 0.01, 0.01, 0.001),
  temperatureCoefficientPerKelvin: fc.constantFrom(1.5e-5, 5e-5, 2e-4),
});

const capacitor = fc.record({
  available: fc.constantFrom(0, 1, 3, 30, 30),
  priceMinor: fc.constantFrom(9, 20, 60),
  farads: fc.constantFrom(4.7e-10, 1e-9, 1e-8, 1e-7, 8.2e-7, 1e-5),
  tolerance: fc.constantFrom(0.025, 0.05, 0.2),
  dielectric: fc.constantFrom('C0G', 'film-pp', 'film-pet', 'X7R', 'electrolytic'),
  ratedVolts: fc.constantFrom(6.3, 16, 63, 63),
  temperatureCoefficientPerKelvin: fc.constantFrom(0, -2e-4, 4e-4),
  temperatureSpread: fc.constantFrom(0, 0.004),
  insulationSeconds: fc.constantFrom(null, 500, 1e4),
  leakageAmps: fc.constantFrom(0, 1e-9, 2e-7),
});

const comparator = fc.record({
  available: fc.constantFrom(0, 1, 3, 20, 20),
  priceMinor: fc.constantFrom(58, 130),
  output: fc.constantFrom('push-pull', 'push-pull', 'open-drain'),
  sections: fc.constantFrom(1, 2, 4),
  minSupplyVolts: fc.constantFrom(1.8, 1.8, 2.9),
  maxSupplyVolts: fc.constantFrom(5.5, 16),
  delayLowHighSeconds: fc.constantFrom(0, 4.5e-7, 9e-6),
  delayHighLowSeconds: fc.constantFrom(0, 3e-7, 7e-6),
  maxDelaySeconds: fc.constant(2e-5),
  inputBiasAmps: fc.constantFrom(0, 2e-12, -2.5e-8, 1e-7),
  maxInputBiasAmps: fc.constantFrom(1e-11, -1e-7, 2e-7),
  offsetVolts: fc.constant(1e-3),
  maxOffsetVolts: fc.constant(5e-3),
  hysteresisVolts: fc.constantFrom(0, 2e-3),
  highOhms: fc.constantFrom(0, 40, 200),
  lowOhms: fc.constantFrom(0, 36, 150),
  maxOutputAmps: fc.constantFrom(0.001, 0.02, 0.02),
  quiescentAmps: fc.constant(1e-5),
  maxQuiescentAmps: fc.constant(2e-5),
});

const numbered = <Part>(parts: Part[]) => parts.map((part, k) => ({ ...part, id: k + 1 }));

/** A small shelf of mixed parts, some sold out, some of one value. */
export const smallShelf: fc.Arbitrary<Shelf> = fc
  .record({
    resistors: fc.array(resistor, { minLength: 5, maxLength: 12 }),
    capacitors: fc.array(capacitor, { minLength: 2, maxLength: 4 }),
    comparators: fc.array(comparator, { minLength: 1, maxLength: 3 }),
  })
  .map(({ resistors, capacitors, comparators }) => ({
    resistors: numbered(resistors),
    capacitors: numbered(capacitors),
    comparators: numbered(comparators),
  }));

const led = fc.record({
  amps: fc.constantFrom(0.0005, 0.002),
  forwardVolts: fc.constant(1.9),
  minForwardVolts: fc.constant(1.75),
  maxForwardVolts: fc.constant(2.1),
});

/** A brief at a log-uniform rate from 0.02 Hz to 100 kHz. */
export const anyBrief: fc.Arbitrary<SearchBrief> = fc
  .record({
    decade: fc.double({ min: Math.log(0.02), max: Math.log(1e5), noNaN: true }),
    duty: fc.constantFrom(0.5, 0.5, 0.5, 0.503, 0.25, 0.4, 0.7, 0.85),
    supplyVolts: fc.constantFrom(3, 3.3, 5, 5, 9),
    band: fc.constantFrom(0.01, 0.05, 0.25),
    quantity: fc.constantFrom(1, 1, 1, 2, 3),
    load: fc.option(led, { nil: null, freq: 3 }),
  })
  .map(({ decade, supplyVolts, ...rest }) => ({
    ...rest,
    supplyVolts,
    targetHz: Math.exp(decade),
    minSupplyVolts: supplyVolts * 0.95,
    maxSupplyVolts: supplyVolts * 1.05,
    minCelsius: 0,
    maxCelsius: 40,
  }));
