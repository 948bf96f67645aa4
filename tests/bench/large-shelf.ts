import { eSeriesMantissas } from '../../server/engine/e-series.ts';
import { createRandom } from '../../server/engine/random.ts';
import type {
  Shelf,
  StockedCapacitor,
  StockedComparator,
  StockedResistor,
} from '../../server/engine/search/shelf.ts';

/** Resistor families of a big stock: [series, tolerance, ppm, net price in cents]; invented. */
const resistorFamilies = [
  ['E24', 0.05, -350, 3],
  ['E96', 0.01, 50, 5],
  ['E96', 0.01, 100, 4],
  ['E192', 0.005, 25, 19],
  ['E192', 0.001, 15, 44],
  ['E96', 0.001, 25, 38],
] as const;

/** Capacitor families: [series, from farads, to farads, tolerance, ppm, spread, insulation s, kind, base price]; invented. */
const capacitorFamilies = [
  ['E12', 1e-10, 1e-7, 0.05, 0, 0.002, 1e4, 'C0G', 8],
  ['E12', 1e-10, 4.7e-8, 0.01, 0, 0.002, 1e4, 'C0G', 19],
  ['E12', 1e-9, 1e-6, 0.025, -200, 0.001, 1e5, 'film-pp', 22],
  ['E12', 1e-9, 1e-6, 0.01, -200, 0.001, 1e5, 'film-pp', 41],
  ['E12', 1e-9, 1e-5, 0.05, 400, 0.004, 1e4, 'film-pet', 12],
  ['E12', 1e-9, 1e-5, 0.1, 400, 0.004, 1e4, 'film-pet', 9],
] as const;

function valuesOf(series: 'E12' | 'E24' | 'E96' | 'E192', from: number, to: number): number[] {
  const mantissas = eSeriesMantissas(series);
  const scale = mantissas[0]! >= 100 ? 2 : 1;
  const values: number[] = [];
  for (let exponent = -13; exponent < 8; exponent += 1) {
    for (const mantissa of mantissas) {
      const value = Number(`${mantissa}e${exponent - scale}`);
      if (value >= from * (1 - 1e-9) && value <= to * (1 + 1e-9)) values.push(value);
    }
  }
  return values;
}

function* resistorLines(random: () => number): Generator<Omit<StockedResistor, 'id'>> {
  const families = resistorFamilies.map(([series, ...rest]) => ({
    values: valuesOf(series, 10, 1e7),
    rest,
  }));
  for (let round = 0; ; round += 1) {
    for (const { values, rest } of families) {
      const [tolerance, ppm, price] = rest;
      for (const ohms of values) {
        yield {
          ohms,
          tolerance,
          temperatureCoefficientPerKelvin: ppm * 1e-6,
          ratedWatts: 0.25,
          priceMinor: price + Math.floor(3 * random()) + round,
          available: Math.floor(400 * random() ** 2),
        };
      }
    }
  }
}

function* capacitorLines(random: () => number): Generator<Omit<StockedCapacitor, 'id'>> {
  for (let round = 0; ; round += 1) {
    for (const [
      series,
      from,
      to,
      tolerance,
      ppm,
      spread,
      seconds,
      dielectric,
      price,
    ] of capacitorFamilies) {
      for (const farads of valuesOf(series, from, to)) {
        yield {
          farads,
          tolerance,
          deviation: null,
          dielectric,
          ratedVolts: [50, 63, 100][round % 3]!,
          temperatureCoefficientPerKelvin: ppm * 1e-6,
          temperatureSpread: spread,
          insulationSeconds: seconds,
          leakageAmps: 0,
          priceMinor: price + Math.round(farads * 2e7) + Math.floor(4 * random()) + round,
          available: Math.floor(200 * random() ** 2),
        };
      }
    }
  }
}

function comparatorLine(k: number, random: () => number): StockedComparator {
  const fast = 10 ** (-7.5 + 2.5 * random());
  const openDrain = k % 4 === 3;
  return {
    id: k + 1,
    available: 20 + Math.floor(100 * random()),
    priceMinor: 60 + Math.floor(150 * random()),
    output: openDrain ? 'open-drain' : 'push-pull',
    sections: [1, 1, 2, 4][Math.floor(4 * random())]!,
    minSupplyVolts: 1.8,
    maxSupplyVolts: openDrain ? 16 : 5.5,
    delayLowHighSeconds: fast,
    delayHighLowSeconds: fast * 0.8,
    maxDelaySeconds: fast * 2.3,
    inputBiasAmps: openDrain ? -2e-8 : 2e-12,
    maxInputBiasAmps: openDrain ? -8e-8 : 6e-11,
    offsetVolts: 0,
    maxOffsetVolts: 0.002 + 0.003 * random(),
    hysteresisVolts: openDrain ? 0 : 0.0015,
    highOhms: openDrain ? 0 : 20 + 50 * random(),
    lowOhms: 20 + 50 * random(),
    maxOutputAmps: 0.015,
    quiescentAmps: 1e-5,
    maxQuiescentAmps: 2e-5,
  };
}

function take<Item>(lines: Generator<Item>, count: number): Item[] {
  return Array.from({ length: count }, () => lines.next().value as Item);
}

/**
 * An invented stock of `lines` lines for one mounting, the same every time: 88 of 100 lines are
 * resistors, the rest capacitors, with as many comparators as a shop of that size might keep (eleven
 * to nineteen). Beyond some thousands, further lines repeat values at other prices and quantities,
 * as bigger shops' lines do. A third of the lines is nearly sold out.
 */
export function largeShelf(lines: number): Shelf {
  const random = createRandom(lines);
  const comparators = Math.round(4 * Math.log10(lines));
  const capacitors = Math.round(0.12 * lines);
  const numbered = <Part>(parts: Part[]) => parts.map((part, k) => ({ ...part, id: k + 1 }));
  return {
    comparators: Array.from({ length: comparators }, (_, k) => comparatorLine(k, random)),
    capacitors: numbered(take(capacitorLines(random), capacitors)),
    resistors: numbered(take(resistorLines(random), lines - comparators - capacitors)),
    diodes: [],
    trimmers: [],
  };
}
