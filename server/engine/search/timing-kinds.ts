import type { Offers } from './timing-choice.ts';

/** A way a timing resistance can spread and drift. */
export interface TimingKind {
  tolerance: number;
  coefficientPerKelvin: number;
}

const mixSteps = 4;

/**
 * The kinds of timing resistance that the shelf's resistors can form, singly or mixed by twos in
 * steps of a quarter; what lies between steps hardly differs. Kept with the offers.
 */
export function mixedKinds(offers: Offers): readonly TimingKind[] {
  let mixed = known.get(offers);
  if (!mixed) {
    mixed = mixKinds(offers);
    known.set(offers, mixed);
  }
  return mixed;
}

const known = new WeakMap<Offers, readonly TimingKind[]>();

function mixKinds(offers: Offers): TimingKind[] {
  const kinds = new Map<string, TimingKind>();
  for (const part of offers.flat()) {
    const { tolerance, temperatureCoefficientPerKelvin: coefficientPerKelvin } = part;
    kinds.set(`${tolerance} ${coefficientPerKelvin}`, { tolerance, coefficientPerKelvin });
  }
  const all = [...kinds.values()];
  return all.flatMap((one, k) => [
    one,
    ...all.slice(k + 1).flatMap((other) =>
      Array.from({ length: mixSteps - 1 }, (_, step): TimingKind => {
        const share = (step + 1) / mixSteps;
        const mix = (a: number, b: number) => share * a + (1 - share) * b;
        return {
          tolerance: mix(one.tolerance, other.tolerance),
          coefficientPerKelvin: mix(one.coefficientPerKelvin, other.coefficientPerKelvin),
        };
      }),
    ),
  ]);
}
