import { fromDecimal } from './decimal-figures.ts';

/** Letters that stand for the decimal point, with their power of ten, by IEC 60062 clause 4. */
const writtenOhmLetters: Record<string, number> = { R: 0, K: 3, M: 6, G: 9 };
const ohmLetters: Record<string, number> = { L: -3, ...writtenOhmLetters };
const faradLetters: Record<string, number> = { p: -12, n: -9, µ: -6, m: -3, F: 0 };

/** Symmetric tolerances by letter, as fractions (IEC 60062 clause 5). */
const toleranceLetters: Record<string, number> = {
  L: 0.0001,
  P: 0.0002,
  W: 0.0005,
  B: 0.001,
  C: 0.0025,
  D: 0.005,
  F: 0.01,
  G: 0.02,
  J: 0.05,
  K: 0.1,
  M: 0.2,
  N: 0.3,
};

export interface LetterCodeReading {
  /** Ohms or farads. */
  value: number;
  /** As a fraction, or null when the code says nothing of it. */
  tolerance: number | null;
}

/**
 * Reads a resistance in letter-and-digit code (4K7, R47, 0R0, 4K7J), or null when it is none. The
 * letter stands for the decimal point; a lower-case k or r passes, a lower-case m does not since
 * it means milli. IEC 60062 clause 4.
 */
export function readOhmCode(code: string): LetterCodeReading | null {
  if (/^0+$/.test(code)) return { value: 0, tolerance: null };
  const match = /^(\d*)([LRKMGkr])(\d*)([A-Z]?)$/.exec(code);
  if (!match) return null;
  const [, whole = '', letter = '', decimals = '', tolerance = ''] = match;
  return reading(whole, ohmLetters[letter.toUpperCase()], decimals, tolerance);
}

/**
 * Reads a capacitance in letter-and-digit code (4n7, p47, 470µ, 4n7K), or null when it is none. u
 * and the Greek mu pass for µ; an upper-case N or P does not pass. IEC 60062 clause 4.
 */
export function readFaradCode(code: string): LetterCodeReading | null {
  const match = /^(\d*)([pnµμumF])(\d*)([A-Z]?)$/.exec(code);
  if (!match) return null;
  const [, whole = '', letter = '', decimals = '', tolerance = ''] = match;
  const plain = letter === 'u' || letter === 'μ' ? 'µ' : letter;
  return reading(whole, faradLetters[plain], decimals, tolerance);
}

function reading(
  whole: string,
  exponent: number | undefined,
  decimals: string,
  letter: string,
): LetterCodeReading | null {
  const tolerance = letter === '' ? null : toleranceLetters[letter];
  if (exponent === undefined || tolerance === undefined || whole + decimals === '') return null;
  return { value: fromDecimal(`${whole || '0'}.${decimals || '0'}`, exponent), tolerance };
}

/**
 * A resistance in letter-and-digit code, at least two figures: 4K7, 470R, R47, 1K0, 0R0 for a
 * link. Never written with L. Null when it needs more than six figures, is under 1 mΩ, or 1 TΩ
 * and more.
 */
export function ohmCode(ohms: number): string | null {
  return ohms === 0 ? '0R0' : letterCode(ohms, writtenOhmLetters, 'R');
}

/** A capacitance in letter-and-digit code: 4n7, 100n, p47, 1µ0. Null where `ohmCode` would be. */
export function faradCode(farads: number): string | null {
  return letterCode(farads, faradLetters, 'p');
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

/** The letter that stands for a symmetric tolerance (a fraction), or null when none does. */
export function toleranceLetter(tolerance: number): string | null {
  const found = Object.entries(toleranceLetters).find(
    ([, value]) => Math.abs(value - tolerance) < 1e-9 * value,
  );
  return found ? found[0] : null;
}
