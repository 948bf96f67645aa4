import { decimalFigures, fromDecimal } from './decimal-figures.ts';
import { eSeriesMantissas } from './e-series.ts';

/** Preferred letters first; R, S and H are accepted when read (IEC 60062:2016, Annex A). */
const e96Letters: Record<string, number> = {
  Z: -3,
  Y: -2,
  X: -1,
  A: 0,
  B: 1,
  C: 2,
  D: 3,
  E: 4,
  F: 5,
  R: -2,
  S: -1,
  H: 1,
};

/**
 * The three- or four-character code of a chip resistor: `figures` (2 or 3) significant digits and
 * a power of ten, or R for the decimal point where that power would be negative. 10 kΩ is 103 or
 * 1002, 4.7 Ω is 4R7, a link is all zeros. Null when the value needs more figures, is under 0.1 Ω,
 * or is too large for one digit of power. Common practice beside IEC 60062.
 */
export function chipCode(ohms: number, figures: 2 | 3): string | null {
  if (ohms === 0) return '0'.repeat(figures + 1);
  const decimal = decimalFigures(ohms, figures);
  if (!decimal || decimal.exponent > 9 || decimal.exponent < -figures) return null;
  if (decimal.exponent >= 0) return `${decimal.mantissa}${decimal.exponent}`;
  const digits = String(decimal.mantissa);
  const point = figures + decimal.exponent;
  return `${digits.slice(0, point)}R${digits.slice(point)}`;
}

/** The three-character code of an E96 value (39D is 249 kΩ), or null when it is not one. */
export function e96Code(ohms: number): string | null {
  const decimal = decimalFigures(ohms, 3);
  if (!decimal) return null;
  const index = eSeriesMantissas('E96').indexOf(decimal.mantissa);
  const letter = Object.entries(e96Letters).find(([, power]) => power === decimal.exponent)?.[0];
  return index < 0 || !letter ? null : `${String(index + 1).padStart(2, '0')}${letter}`;
}

/**
 * Ohms of a chip resistor's print: three or four digits, R for the decimal point, zeros for a
 * link, or the three-character E96 code. Null when it is none of these, a leading zero included.
 * R is always the decimal point here (68R is 68 Ω), though the E96 code accepts it as a
 * multiplier: see `readE96Code`.
 */
export function readChipCode(code: string): number | null {
  if (/^(?:0|000|0000)$/.test(code)) return 0;
  const powered = /^([1-9]\d{1,2})(\d)$/.exec(code);
  if (powered) return fromDecimal(powered[1] ?? '', Number(powered[2]));
  if (/^(?=.{3,4}$)(?:0|[1-9]\d{0,2})?R\d{0,3}$/.test(code)) {
    return fromDecimal(`0${code.replace('R', '.')}0`, 0);
  }
  return code.includes('R') ? null : readE96Code(code);
}

/** Ohms of a three-character E96 code, or null when its number or letter is not in the table. */
export function readE96Code(code: string): number | null {
  const match = /^(\d{2})([A-Z])$/.exec(code);
  if (!match) return null;
  const mantissa = eSeriesMantissas('E96')[Number(match[1]) - 1];
  const power = e96Letters[match[2] ?? ''];
  return mantissa === undefined || power === undefined ? null : fromDecimal(mantissa, power);
}
