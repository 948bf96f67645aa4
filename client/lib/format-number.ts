import { minus, narrow } from './spaces.ts';

const prefixes = [
  { symbol: 'G', factor: 1e9 },
  { symbol: 'M', factor: 1e6 },
  { symbol: 'k', factor: 1e3 },
  { symbol: '', factor: 1 },
  { symbol: 'm', factor: 1e-3 },
  { symbol: 'µ', factor: 1e-6 },
  { symbol: 'n', factor: 1e-9 },
  { symbol: 'p', factor: 1e-12 },
] as const;

/** A number with so many significant digits, no exponent, no trailing zeros, and a true minus. */
export function formatDigits(value: number, digits = 3): string {
  if (value === 0) return '0';
  const rounded = Number(value.toPrecision(digits));
  const text = Math.abs(rounded).toLocaleString('en-GB', {
    maximumSignificantDigits: digits,
    // Four digits read well as they are; 994,000 does not without its comma.
    useGrouping: 'min2',
  });
  return rounded < 0 ? `${minus}${text}` : text;
}

/** A quantity with its engineering prefix: 887000, "Ω" reads 887 kΩ. */
export function formatQuantity(value: number, unit: string, digits = 3): string {
  if (value === 0) return `0${narrow}${unit}`;
  const rounded = Math.abs(Number(value.toPrecision(digits)));
  const prefix = prefixes.find((each) => rounded >= each.factor * 0.9999999) ?? prefixes.at(-1);
  if (prefix === undefined) return `${formatDigits(value, digits)}${narrow}${unit}`;
  return `${formatDigits(value / prefix.factor, digits)}${narrow}${prefix.symbol}${unit}`;
}

/** Volts beside volts, always in one unit: 0.98 V under 2.04 V, never 980 mV. */
export function formatVolts(volts: number, digits = 3): string {
  return `${formatDigits(volts, digits)}${narrow}V`;
}

/** A fraction as a percentage: 0.046 reads 4.6 %. */
export function formatPercent(fraction: number, digits = 2): string {
  return `${formatDigits(fraction * 100, digits)}${narrow}%`;
}

/** A signed fraction as a percentage: −0.0021 reads − 0.21 %. */
export function formatSignedPercent(fraction: number, digits = 2): string {
  const sign = fraction < 0 ? minus : '+';
  return `${sign}${narrow}${formatPercent(Math.abs(fraction), digits)}`;
}

/** The number somebody typed, with a point or a comma; NaN for anything else. */
export function readNumber(text: string): number {
  const plain = text
    .trim()
    .replaceAll(/[\s\u202f\u00a0]/g, '')
    .replace(',', '.')
    .replace(minus, '-');
  return plain === '' || !/^[-+]?(\d+\.?\d*|\.\d+)(e[-+]?\d+)?$/i.test(plain) ? NaN : Number(plain);
}
