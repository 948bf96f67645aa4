import { fromDecimal } from './decimal-figures.ts';
import {
  capacitorToleranceLetter,
  readCapacitorToleranceLetter,
  readResistorToleranceLetter,
  resistorToleranceLetter,
  type ToleranceSpread,
} from './tolerance-letters.ts';

/** Letters that stand for the decimal point, with their power of ten, by IEC 60062 clause 4. */
const writtenOhmLetters: Record<string, number> = { R: 0, K: 3, M: 6, G: 9 };
const ohmLetters: Record<string, number> = { L: -3, ...writtenOhmLetters };
const faradLetters: Record<string, number> = { p: -12, n: -9, µ: -6, m: -3, F: 0 };

export interface OhmCodeReading {
  /** Ohms. */
  value: number;
  /** As a fraction, ±, or null when the code says nothing of it. */
  tolerance: number | null;
}

export interface FaradCodeReading {
  /** Farads. */
  value: number;
  /** As fractions, or null when the code says nothing of it. */
  tolerance: ToleranceSpread | null;
}

/**
 * Reads a resistance in letter-and-digit code (4K7, R47, 0R0, 4K7J), or null when it is none. The
 * letter stands for the decimal point, with up to six digits before it and eight behind; a
 * lower-case k or r passes, a lower-case m does not since it means milli. IEC 60062 clause 4.
 */
export function readOhmCode(code: string): OhmCodeReading | null {
  if (code === '0') return { value: 0, tolerance: null };
  const match = /^(\d{0,6})([LRKMGkr])(\d{0,8})([A-Z]?)$/.exec(code);
  if (!match) return null;
  const [, whole = '', letter = '', decimals = '', last = ''] = match;
  const value = valueOf(whole, ohmLetters[letter.toUpperCase()], decimals);
  if (value === null) return null;
  if (last === '') return { value, tolerance: null };
  const tolerance = readResistorToleranceLetter(last);
  return tolerance === null ? null : { value, tolerance };
}

/**
 * Reads a capacitance in letter-and-digit code (4n7, p47, 470µ, 4n7K, 4p7C), or null when it is
 * none. u and the Greek mu pass for µ; an upper-case N or P does not pass. The tolerance letter
 * means what it means on a capacitor of that value. IEC 60062 clause 4.
 */
export function readFaradCode(code: string): FaradCodeReading | null {
  const match = /^(\d{0,6})([pnµμumF])(\d{0,8})([A-Z]?)$/.exec(code);
  if (!match) return null;
  const [, whole = '', letter = '', decimals = '', last = ''] = match;
  const plain = letter === 'u' || letter === 'μ' ? 'µ' : letter;
  const value = valueOf(whole, faradLetters[plain], decimals);
  if (value === null) return null;
  if (last === '') return { value, tolerance: null };
  const tolerance = readCapacitorToleranceLetter(last, value);
  return tolerance === null ? null : { value, tolerance };
}

function valueOf(whole: string, exponent: number | undefined, decimals: string): number | null {
  if (exponent === undefined || whole + decimals === '') return null;
  return fromDecimal(`${whole || '0'}.${decimals || '0'}`, exponent);
}

/**
 * A resistance in letter-and-digit code, at least two figures: 4K7, 470R, R47, 1K0, 0R0 for a
 * link; with the letter of a tolerance (a fraction) when one is given: 4K7J. Never written with L.
 * Null when it needs more than six figures, is under 1 mΩ, or 1 TΩ and more, or no letter stands
 * for the tolerance. A link has no tolerance.
 */
export function ohmCode(ohms: number, tolerance: number | null = null): string | null {
  if (ohms === 0) return '0R0';
  const letter = tolerance === null ? '' : resistorToleranceLetter(tolerance);
  return withLetter(letterCode(ohms, writtenOhmLetters, 'R'), letter);
}

/**
 * A capacitance in letter-and-digit code: 4n7, 100n, p47, 1µ0; with the letter of a tolerance (one
 * fraction for ±, or two) when one is given: 100nK. Null when it needs more than six figures, is
 * under 0.001 pF, or 1000 F and more, or no letter stands for the tolerance.
 */
export function faradCode(
  farads: number,
  tolerance: number | ToleranceSpread | null = null,
): string | null {
  const letter = tolerance === null ? '' : capacitorToleranceLetter(tolerance, farads);
  return withLetter(letterCode(farads, faradLetters, 'p'), letter);
}

function withLetter(code: string | null, letter: string | null): string | null {
  return code === null || letter === null ? null : code + letter;
}

function letterCode(value: number, letters: Record<string, number>, lowest: string): string | null {
  if (!(value > 0 && value < Infinity)) return null;
  const [digits = '', power = '0'] = value.toExponential(8).split('e');
  const figures = digits.replace('.', '').replace(/0+$/, '');
  const largest = Object.entries(letters).filter(([, exponent]) => exponent <= Number(power));
  const [letter, exponent] = largest.at(-1) ?? [lowest, letters[lowest] ?? 0];
  const places = Number(power) - exponent;
  if (figures.length > 6 || places < -3 || places > 2) return null;
  if (places < 0) return `${letter}${'0'.repeat(-places - 1)}${figures.padEnd(2, '0')}`;
  const padded = figures.padEnd(Math.max(places + 1, 2), '0');
  return `${padded.slice(0, places + 1)}${letter}${padded.slice(places + 1)}`;
}
