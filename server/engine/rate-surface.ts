import { nominalKit, type KitFactors } from './kit-rate.ts';
import { createRandom } from './random.ts';

type Rate = (kit: Readonly<KitFactors>) => number;

const parts: readonly (keyof KitFactors)[] = ['r1', 'r2', 'r3', 'timing', 'discharge', 'capacitor'];
const trials = 24;
const trialSeed = 20_260;

interface Term {
  one: keyof KitFactors;
  other: keyof KitFactors;
  coefficient: number;
}

/**
 * A quick stand-in for a slow rate: ln f as a quadratic in the logarithms of the kit's factors,
 * fitted by central differences with steps of 0.6 of each part's tolerance. Null when it misses
 * the rate by more than `allowed` (relative) at any of 24 kits spread over the tolerances, or a
 * kit needed for the fit does not oscillate. `spans` are the parts' tolerances as fractions.
 */
export function rateSurface(rate: Rate, spans: Readonly<KitFactors>, allowed: number): Rate | null {
  const surface = fit(rate, spans);
  const random = createRandom(trialSeed);
  const kit = { ...nominalKit };
  for (let trial = 0; trial < trials; trial++) {
    for (const part of parts) kit[part] = 1 + spans[part] * (2 * random() - 1);
    if (!(Math.abs(surface(kit) / rate(kit) - 1) <= allowed)) return null;
  }
  return surface;
}

function fit(rate: Rate, spans: Readonly<KitFactors>): Rate {
  const varying = parts.filter((part) => spans[part] > 0);
  const stepOf = (part: keyof KitFactors) => Math.log1p(0.6 * spans[part]);
  const logAt = (moves: Partial<KitFactors>) => {
    const kit = { ...nominalKit };
    for (const part of varying) kit[part] = Math.exp(moves[part] ?? 0);
    return Math.log(rate(kit));
  };
  const centre = logAt({});
  const slopes = varying.map((part) => {
    const step = stepOf(part);
    return { part, slope: (logAt({ [part]: step }) - logAt({ [part]: -step })) / (2 * step) };
  });
  const terms = varying.flatMap((one, index): Term[] =>
    varying.slice(index).map((other) => {
      const [a, b] = [stepOf(one), stepOf(other)];
      if (one === other) {
        const bend = logAt({ [one]: a }) + logAt({ [one]: -a }) - 2 * centre;
        return { one, other, coefficient: bend / (2 * a * a) };
      }
      const twist =
        logAt({ [one]: a, [other]: b }) +
        logAt({ [one]: -a, [other]: -b }) -
        logAt({ [one]: a, [other]: -b }) -
        logAt({ [one]: -a, [other]: b });
      return { one, other, coefficient: twist / (4 * a * b) };
    }),
  );
  const logs = { ...nominalKit };
  return (kit) => {
    for (const part of varying) logs[part] = Math.log(kit[part]);
    let sum = centre;
    for (const { part, slope } of slopes) sum += slope * logs[part];
    for (const { one, other, coefficient } of terms) sum += coefficient * logs[one] * logs[other];
    return Math.exp(sum);
  };
}
