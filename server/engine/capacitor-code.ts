import { decimalFigures, fromDecimal } from './decimal-figures.ts';
import {
  capacitorToleranceLetter,
  readCapacitorToleranceLetter,
  type ToleranceSpread,
} from './tolerance-letters.ts';

export interface CapacitorCodeReading {
  farads: number;
  /** What the tolerance letter allows, as fractions; null without a letter. */
  tolerance: ToleranceSpread | null;
}

/**
 * Reads the print of a small capacitor: two figures and a power of ten in picofarads (third digit
 * 9 is × 0.1, 8 is × 0.01), or one or two digits that are the picofarads themselves, with an
 * optional tolerance letter. Null when it is none of these, or the letter has no meaning at that
 * value. `100` is 10 pF. IEC 60062 clause 5 for the letters.
 */
export function readCapacitorCode(code: string): CapacitorCodeReading | null {
  const match = /^([1-9]\d|[1-9](?!\d))(\d?)([A-Z]?)$/.exec(code);
  if (!match) return null;
  const [, figures = '', power = '', letter = ''] = match;
  const exponent = power === '9' ? -1 : power === '8' ? -2 : Number(power);
  const farads = fromDecimal(figures, exponent - 12);
  if (letter === '') return { farads, tolerance: null };
  const tolerance = readCapacitorToleranceLetter(letter, farads);
  return tolerance === null ? null : { farads, tolerance };
}

/**
 * The three digits printed on a capacitor of `farads`, with the letter of a tolerance (one fraction
 * for ±, or two where the ends differ) when one is given: 100 nF ±10 % is 104K. Null when the value
 * needs more than two figures, is under 0.1 pF or 1 mF and more, or no letter stands for the
 * tolerance. Under 10 pF the letters count picofarads, so a tolerance given as a fraction must
 * equal one of those.
 */
export function capacitorCode(
  farads: number,
  tolerance: number | ToleranceSpread | null = null,
): string | null {
  const decimal = decimalFigures(farads, 2);
  if (!decimal) return null;
  const power = decimal.exponent + 12;
  if (power < -2 || power > 7) return null;
  const digits = `${decimal.mantissa}${power === -1 ? 9 : power === -2 ? 8 : power}`;
  if (tolerance === null) return digits;
  const letter = capacitorToleranceLetter(tolerance, farads);
  return letter === null ? null : `${digits}${letter}`;
}
