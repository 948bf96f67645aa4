import type {
  SearchBrief,
  Shelf,
  StockedCapacitor,
  StockedComparator,
  StockedDiode,
  StockedResistor,
  StockedTrimmer,
} from '../../../server/engine/search/shelf.ts';

const e24 = [
  10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30, 33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91,
];

function resistors(): StockedResistor[] {
  const decades = [100, 1e3, 1e4];
  const family = (tolerance: number, perKelvin: number, priceMinor: number, values: number[]) =>
    values.map((ohms) => ({
      id: 0,
      available: 60,
      priceMinor,
      ohms,
      tolerance,
      temperatureCoefficientPerKelvin: perKelvin,
      ratedWatts: 0.25,
    }));
  const all = decades.flatMap((decade) => e24.map((mantissa) => mantissa * decade));
  const precise = [10, 15, 22, 33, 47, 68].flatMap((mantissa) => [mantissa * 1e3, mantissa * 1e4]);
  return [
    ...family(0.05, 2e-4, 4, all),
    ...family(0.01, 5e-5, 6, [...all, 1e6]),
    ...family(0.001, 1.5e-5, 48, [...precise, 1e6]),
  ].map((part, k) => ({ ...part, id: k + 1 }));
}

function capacitors(): StockedCapacitor[] {
  const common = { available: 40, deviation: null, ratedVolts: 63, leakageAmps: 0 };
  const list: Omit<StockedCapacitor, 'id'>[] = [1e-9, 1e-8, 1e-7, 4.7e-7, 1e-6, 4.7e-6].flatMap(
    (farads, k): Omit<StockedCapacitor, 'id'>[] => [
      {
        ...common,
        farads,
        tolerance: 0.05,
        dielectric: 'film-pet',
        temperatureCoefficientPerKelvin: 4e-4,
        temperatureSpread: 0.004,
        insulationSeconds: 1e4,
        priceMinor: 9 + 4 * k,
      },
      {
        ...common,
        farads,
        tolerance: 0.01,
        dielectric: 'film-pp',
        temperatureCoefficientPerKelvin: -2e-4,
        temperatureSpread: 0.001,
        insulationSeconds: 1e5,
        priceMinor: 40 + 15 * k,
      },
    ],
  );
  const electrolytic: Omit<StockedCapacitor, 'id'> = {
    ...common,
    farads: 4.7e-5,
    tolerance: 0.2,
    dielectric: 'electrolytic',
    temperatureCoefficientPerKelvin: 1e-3,
    temperatureSpread: 0.1,
    insulationSeconds: null,
    leakageAmps: 5e-7,
    priceMinor: 8,
  };
  return [...list, electrolytic].map((part, k) => ({ ...part, id: k + 1 }));
}

const pushPull: StockedComparator = {
  id: 1,
  available: 50,
  priceMinor: 90,
  output: 'push-pull',
  sections: 1,
  minSupplyVolts: 1.8,
  maxSupplyVolts: 5.5,
  delayLowHighSeconds: 4.5e-7,
  delayHighLowSeconds: 4e-7,
  maxDelaySeconds: 1e-6,
  inputBiasAmps: 2e-12,
  maxInputBiasAmps: 6e-11,
  offsetVolts: 4e-4,
  maxOffsetVolts: 4e-3,
  hysteresisVolts: 1.5e-3,
  highOhms: 40,
  lowOhms: 36,
  maxOutputAmps: 0.015,
  quiescentAmps: 9e-6,
  maxQuiescentAmps: 2e-5,
};
const openDrain: StockedComparator = {
  ...pushPull,
  id: 2,
  priceMinor: 58,
  output: 'open-drain',
  maxSupplyVolts: 16,
  delayLowHighSeconds: 1.3e-6,
  delayHighLowSeconds: 6e-7,
  maxDelaySeconds: 2.6e-6,
  inputBiasAmps: -2.5e-8,
  maxInputBiasAmps: -1e-7,
  maxOffsetVolts: 5e-3,
  hysteresisVolts: 0,
  highOhms: 0,
  lowOhms: 60,
};

const dual: StockedComparator = { ...pushPull, id: 3, priceMinor: 130, sections: 2 };
const quad: StockedComparator = { ...dual, id: 4, priceMinor: 170, sections: 4, lowOhms: 50 };

const diode: StockedDiode = {
  id: 1,
  available: 100,
  priceMinor: 3,
  saturationAmps: 2.5e-9,
  emissionCoefficient: 1.75,
  energyGapElectronVolts: 1.11,
  saturationTemperatureExponent: 3,
};

const trimmers = [1e3, 1e4, 1e5, 1e6].map((ohms, k): StockedTrimmer => ({
  id: k + 1,
  available: 20,
  priceMinor: 70,
  ohms,
  tolerance: 0.1,
  temperatureCoefficientPerKelvin: 1e-4,
}));

/**
 * A workshop's shelf: E24 in three tolerances, two films, an electrolytic, two single comparators, a
 * dual and a quad, a diode and four trimmers.
 */
export const workshop: Shelf = {
  resistors: resistors(),
  capacitors: capacitors(),
  comparators: [pushPull, openDrain, dual, quad],
  diodes: [diode],
  trimmers,
};

/** The workshop with some comparators only, by id. */
export function workshopWith(...comparatorIds: number[]): Shelf {
  const comparators = workshop.comparators.filter(({ id }) => comparatorIds.includes(id));
  return { ...workshop, comparators };
}

/** The workshop after its lots were measured: the films' means are off and their windows narrow. */
export const lotChecked: Shelf = {
  ...workshop,
  capacitors: workshop.capacitors.map((part) =>
    part.dielectric === 'electrolytic'
      ? part
      : {
          ...part,
          farads: part.farads * 1.013,
          tolerance: 0.4 * part.tolerance,
          deviation: 0.15 * part.tolerance,
        },
  ),
};

/** A logic clock at 5 V regulated to 5 %, one kit, within 5 % between 0 and 40 °C. */
export function briefAt(targetHz: number, change: Partial<SearchBrief> = {}): SearchBrief {
  return {
    targetHz,
    duty: 0.5,
    supplyVolts: 5,
    minSupplyVolts: 4.75,
    maxSupplyVolts: 5.25,
    band: 0.05,
    minCelsius: 0,
    maxCelsius: 40,
    quantity: 1,
    load: null,
    care: 'as-stocked',
    meterUncertainty: 0.005,
    ...change,
  };
}

export const redLed = {
  amps: 0.002,
  forwardVolts: 1.9,
  minForwardVolts: 1.7,
  maxForwardVolts: 2.2,
};
