import { createCircuit } from '../../server/engine/circuit.ts';
import { createRandom } from '../../server/engine/random.ts';
import { monteCarlo } from '../../server/engine/spread.ts';
import { printTable, quantile, timed } from './tables.ts';

const samples = 200_000;

/** A plain loop: one Math.log a sample over arrays of plain numbers, the ideal circuit's formula. */
function plainLoop(seed: number): number {
  const random = createRandom(seed);
  const rates: number[] = [];
  let inside = 0;
  for (let k = 0; k < samples; k += 1) {
    const deviate = (tolerance: number) => 1 + tolerance * (2 * random() - 1);
    const [r1, r2, r3] = [1e6 * deviate(0.01), 1e6 * deviate(0.01), 1e6 * deviate(0.01)];
    const [r4, c] = [880e3 * deviate(0.01), 8.2e-7 * deviate(0.05)];
    const rate = 1 / (r4 * c * Math.log((1 + r1 / r3) * (1 + r2 / r3)));
    rates.push(rate);
    if (Math.abs(rate - 1) <= 0.05) inside += 1;
  }
  return inside / samples;
}

/** Monte Carlo samples per second of the engine, with the full model, against the plain loop. */
export function monteCarloSpeed(): void {
  const circuit = createCircuit({
    supplyVolts: 5,
    r1Ohms: 1e6,
    r2Ohms: 1e6,
    r3Ohms: 1e6,
    timing: { kind: 'single', ohms: 880e3 },
    capacitor: { farads: 8.2e-7 },
  });
  const real = {
    ...circuit,
    comparator: {
      ...circuit.comparator,
      highOhms: 40,
      lowOhms: 36,
      delayHighLowSeconds: 1e-6,
      delayLowHighSeconds: 1e-6,
    },
  };
  const tolerances = { thresholds: 0.01, timing: 0.01, capacitor: 0.05 };
  const options = { distribution: 'uniform', targetHz: 1, band: 0.05, samples, seed: 7 } as const;
  const median = (work: () => unknown) => {
    work();
    return quantile(
      Array.from({ length: 5 }, () => timed(work)),
      0.5,
    );
  };
  const plain = median(() => plainLoop(7));
  const rows = [
    ['plain loop, ideal formula', plain],
    ['engine, ideal circuit', median(() => monteCarlo(circuit, tolerances, options))],
    ['engine, delays and output resistance', median(() => monteCarlo(real, tolerances, options))],
  ] as const;
  printTable(
    `Monte Carlo, ${samples.toLocaleString('en')} kits`,
    ['', 'million kits a second', 'of the plain loop'],
    rows.map(([name, ms]) => [name, (samples / ms / 1e3).toFixed(2), (plain / ms).toFixed(2)]),
  );
}
