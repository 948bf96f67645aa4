import { decimalFigures, fromDecimal } from './decimal-figures.ts';
import { toleranceLetter } from './letter-code.ts';

/** Per cent from 10 pF up, picofarads below (IEC 60062 clause 5). */
const tightLetters: Record<string, number> = { B: 0.1, C: 0.25, D: 0.5, F: 1, G: 2 };
const symmetricLetters: Record<string, number> = { J: 5, K: 10, M: 20, N: 30 };
const skewedLetters: Record<string, [number, number]> = {
  Z: [20, 80],
  S: [20, 50],
  T: [10, 50],
  Q: [10, 30],
};
const tightLimitPicofarads = 10;

export interface CapacitorCodeReading {
  farads: number;
  /** Least and greatest value the tolerance letter allows, in farads; null without a letter. */
  limits: { minFarads: number; maxFarads: number } | null;
}

/**
 * Reads the print of a small capacitor: two figures and a power of ten in picofarads (third digit
 * 9 is × 0.1, 8 is × 0.01), or one or two digits that are the picofarads themselves, with an
 * optional tolerance letter. Null when it is none of these. `100` is 10 pF. IEC 60062 clause 5 for
 * the letters; P, L and W, on which sources disagree for capacitors, are not read.
 */
export function readCapacitorCode(code: string): CapacitorCodeReading | null {
  const match = /^([1-9]\d|[1-9](?!\d))(\d?)([A-Z]?)$/.exec(code);
  if (!match) return null;
  const [, figures = '', power = '', letter = ''] = match;
  const exponent = power === '9' ? -1 : power === '8' ? -2 : Number(power);
  const picofarads = fromDecimal(figures, exponent);
  const farads = fromDecimal(figures, exponent - 12);
  if (letter === '') return { farads, limits: null };
  const spread = spreadOf(letter, picofarads);
  return spread === null
    ? null
    : {
        farads,
        limits: { minFarads: farads * (1 - spread[0]), maxFarads: farads * (1 + spread[1]) },
      };
}

/** What a letter allows below and above, as fractions. */
function spreadOf(letter: string, picofarads: number): [number, number] | null {
  const tight = tightLetters[letter];
  if (tight !== undefined) {
    const fraction = tight / (picofarads < tightLimitPicofarads ? picofarads : 100);
    return [fraction, fraction];
  }
  const symmetric = symmetricLetters[letter];
  if (symmetric !== undefined) return [symmetric / 100, symmetric / 100];
  const skewed = skewedLetters[letter];
  return skewed ? [skewed[0] / 100, skewed[1] / 100] : null;
}

/**
 * The three digits printed on a capacitor of `farads`, with the letter of a symmetric tolerance (a
 * fraction) when one is given: 100 nF ±10 % is 104K. Null when the value needs more than two
 * figures, is under 0.1 pF or 1 F and more, or no letter stands for the tolerance. Under 10 pF the
 * letters count picofarads, so a tolerance given as a fraction must equal one of those.
 */
export function capacitorCode(farads: number, tolerance: number | null = null): string | null {
  const decimal = decimalFigures(farads, 2);
  if (!decimal) return null;
  const power = decimal.exponent + 12;
  if (power < -2 || power > 7) return null;
  const digits = `${decimal.mantissa}${power === -1 ? 9 : power === -2 ? 8 : power}`;
  if (tolerance === null) return digits;
  const letter = letterFor(tolerance, farads * 1e12);
  return letter === null ? null : `${digits}${letter}`;
}

function letterFor(tolerance: number, picofarads: number): string | null {
  if (picofarads >= tightLimitPicofarads * (1 - 1e-9)) {
    const letter = toleranceLetter(tolerance);
    return letter !== null && spreadOf(letter, picofarads) ? letter : null;
  }
  const letters = Object.keys(tightLetters);
  return (
    letters.find((letter) => {
      const spread = spreadOf(letter, picofarads);
      return spread !== null && Math.abs(spread[0] / tolerance - 1) < 1e-9;
    }) ?? null
  );
}
