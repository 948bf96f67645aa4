import { keptByName, keptWith } from './kept-with.ts';
import type { ResistorValues } from './resistor-values.ts';
import type { Offers } from './timing-choice.ts';

/** A way a timing resistance can spread and drift. */
export interface TimingKind {
  tolerance: number;
  coefficientPerKelvin: number;
}

/** Shares of the other part in a mixture of two kinds that are looked at. */
const shares = [0.25, 0.5, 0.75] as const;
const smallShares = [0.125, 0.25] as const;
/** A part outside this factor of the whole resistance makes less than a quarter of it. */
const nearFactor = 4;

/** The different kinds among some offers. */
function kindsOf(offers: Offers): TimingKind[] {
  const kinds = new Map<string, TimingKind>();
  for (const parts of offers) {
    for (const { tolerance, temperatureCoefficientPerKelvin: coefficientPerKelvin } of parts) {
      kinds.set(`${tolerance} ${coefficientPerKelvin}`, { tolerance, coefficientPerKelvin });
    }
  }
  return [...kinds.values()];
}

function mix(one: TimingKind, other: TimingKind, share: number): TimingKind {
  const between = (a: number, b: number) => (1 - share) * a + share * b;
  return {
    tolerance: between(one.tolerance, other.tolerance),
    coefficientPerKelvin: between(one.coefficientPerKelvin, other.coefficientPerKelvin),
  };
}

/** All kinds singly, and every two mixed in quarters; what lies between hardly differs. */
function mixAll(kinds: readonly TimingKind[]): TimingKind[] {
  return kinds.flatMap((one, k) => [
    one,
    ...kinds.slice(k + 1).flatMap((other) => shares.map((share) => mix(one, other, share))),
  ]);
}

/** The kinds of timing resistance that all offers can form, singly or two mixed. Kept with the offers. */
export const mixedKinds = keptWith((offers: Offers): readonly TimingKind[] =>
  mixAll(kindsOf(offers)),
);

/**
 * The kinds that a timing resistance of about `ohms` can be of: singly or mixed by parts within a
 * factor of four, which make a quarter of it or more, with a little of any other. Kept with the offers.
 */
export function kindsNear(
  values: ResistorValues,
  offers: Offers,
  ohms: number,
): readonly TimingKind[] {
  return kindsOfOctave(offers, Math.floor(Math.log2(ohms)), values);
}

const kindsOfOctave = keptByName(
  (offers: Offers, octave: number, { ohms }: ResistorValues): readonly TimingKind[] => {
    // The rate may be off by half as much again, and so the resistance.
    const [from, to] = [2 ** octave / nearFactor / 1.6, 2 ** (octave + 1) * nearFactor * 1.6];
    const near = kindsOf(offers.filter((_, k) => ohms[k]! >= from && ohms[k]! <= to));
    if (near.length === 0) return mixedKinds(offers);
    const isNear = (kind: TimingKind) =>
      near.some(
        (one) =>
          one.tolerance === kind.tolerance &&
          one.coefficientPerKelvin === kind.coefficientPerKelvin,
      );
    const far = kindsOf(offers).filter((kind) => !isNear(kind));
    return [
      ...mixAll(near),
      ...near.flatMap((one) =>
        far.flatMap((other) => smallShares.map((share) => mix(one, other, share))),
      ),
    ];
  },
);
