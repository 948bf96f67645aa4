import { readFaradCode, readOhmCode } from './letter-code.ts';
import { fromDecimal } from './decimal-figures.ts';

const number = String.raw`(\d+(?:[.,]\d*)?|[.,]\d+)(?:e([+-]?\d{1,3}))?`;
const ohmPattern = new RegExp(
  String.raw`^${number}\s*(k|meg|[KMG]|m(?=\s*(?:Ω|ohm)))?\s*(Ω|R|r|ohms?|Ohms?)?$`,
);
const faradPattern = new RegExp(String.raw`^${number}\s*([pnμum]?)\s*(F|f|farads?)?$`);

const prefixes: Record<string, number> = {
  '': 0,
  p: -12,
  n: -9,
  μ: -6,
  u: -6,
  m: -3,
  k: 3,
  K: 3,
  M: 6,
  meg: 6,
  G: 9,
};

/**
 * Ohms that somebody typed: 4k7, 887k, 4.7 kΩ, 470, 1,5M, 0R47, 1e5; null when it cannot be
 * understood, is ambiguous (4m7: milli or mega) or beyond what a number can hold. A comma counts as the decimal point.
 */
export function readTypedOhms(text: string): number | null {
  const trimmed = plainText(text);
  const coded = readOhmCode(trimmed.replace(/\s*(?:Ω|ohms?)$/i, ''));
  if (coded && coded.tolerance === null) return coded.value;
  const match = ohmPattern.exec(trimmed);
  return match ? valueOf(match[1], match[2], match[3]) : null;
}

/**
 * Farads that somebody typed or a meter sent: 0.82 uF, 818n2, 100 nF, 4p7, 8.2e-7 F; null when it
 * cannot be understood, is beyond what a number can hold, or is a plain number without a unit (104 might be
 * a printed code). A number in exponent form needs no unit. A comma counts as the decimal point.
 */
export function readTypedFarads(text: string): number | null {
  const trimmed = plainText(text);
  const coded = readFaradCode(trimmed.replace(/(?<=[pnμum]\d*)\s*F$/, ''));
  if (coded && coded.tolerance === null) return coded.value;
  const match = faradPattern.exec(trimmed);
  if (!match) return null;
  const saysUnit = match[2] !== undefined || match[3] !== '' || match[4] !== undefined;
  return saysUnit ? valueOf(match[1], match[2], match[3]) : null;
}

/** One sign each for ohm and micro, whichever of the look-alikes was typed, and plain spaces. */
function plainText(text: string): string {
  return text.normalize('NFKC').trim();
}

function valueOf(digits = '', power = '0', prefix = ''): number | null {
  const plain = `0${digits.replace(',', '.')}`.replace(/\.$/, '');
  const value = fromDecimal(plain, Number(power) + (prefixes[prefix] ?? 0));
  const isLost = value === 0 && /[1-9]/.test(plain);
  return Number.isFinite(value) && !isLost ? value : null;
}
