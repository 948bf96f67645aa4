import type { Target } from '../contracts/brief.ts';

/** No-break space, and the narrow one that joins a value to its unit. */
export const nbsp = '\u00a0';
export const thin = '\u202f';

export type Rounding = 'nearest' | 'down' | 'up';

/** A number in plain decimals with `digits` significant figures; trailing zeros stay. */
export function significant(value: number, digits: number, rounding: Rounding = 'nearest'): string {
  if (value === 0) return '0';
  const exponent = Math.floor(Math.log10(Math.abs(value)));
  const decimals = Math.max(0, digits - 1 - exponent);
  const rounded = roundedTo(value, digits, exponent, rounding);
  return rounded.toFixed(Math.min(decimals, 12)).replace('-', '−');
}

function roundedTo(value: number, digits: number, exponent: number, rounding: Rounding): number {
  if (rounding === 'nearest') return Number(value.toPrecision(digits));
  const places = digits - 1 - exponent;
  const scaled = value * 10 ** places;
  const whole = rounding === 'down' ? Math.floor(scaled + 1e-9) : Math.ceil(scaled - 1e-9);
  return whole / 10 ** places;
}

/**
 * How many figures a rate may show for its half-band: one more than the band leaves certain.
 * ± 5 % shows three, ± 0.9 % four, never more than six.
 */
export function figuresFor(halfBand: number): number {
  const certain = Math.floor(-Math.log10(Math.max(halfBand, 1e-9)));
  return Math.min(6, Math.max(2, certain + 2));
}

/** A fraction as per cent with up to `digits` figures: 0.046 → "4.6 %". */
export function percent(fraction: number, digits = 2): string {
  const value = Number((fraction * 100).toPrecision(digits));
  return `${String(value).replace('-', '−')}${thin}%`;
}

/** A half-band as "± 4.6 %", rounded away from zero so that it never promises more than is true. */
export function plusMinus(fraction: number): string {
  const value = fraction * 100;
  const step = 10 ** (Math.floor(Math.log10(Math.max(value, 1e-9))) - 1);
  const up = Number((Math.ceil(value / step - 1e-9) * step).toPrecision(2));
  return `±${nbsp}${up}${thin}%`;
}

/** Celsius range: "0 and 40 °C". */
export function celsiusRange(min: number, max: number): string {
  const text = (value: number) => String(value).replace('-', '−');
  return `${text(min)} and ${text(max)}${thin}°C`;
}

export interface RateWords {
  /** The number alone. */
  rate: string;
  /** What follows it: "a minute", "Hz", "s for each beat". */
  unit: string;
}

/** A frequency in the unit the maker asked in, with the given number of figures. */
export function rateWords(
  hertz: number,
  unit: Target['unit'],
  figures: number,
  rounding: Rounding = 'nearest',
): RateWords {
  switch (unit) {
    case 'per_minute':
      return { rate: significant(hertz * 60, figures, rounding), unit: 'a minute' };
    case 'Hz':
      return { rate: significant(hertz, figures, rounding), unit: 'Hz' };
    case 'kHz':
      return { rate: significant(hertz / 1e3, figures, rounding), unit: 'kHz' };
    case 's':
      return { rate: significant(1 / hertz, figures, rounding), unit: 's a beat' };
    case 'ms':
      return { rate: significant(1e3 / hertz, figures, rounding), unit: 'ms a beat' };
  }
}

/** The target in hertz; a period is turned over. */
export function targetHertz(target: Target): number {
  switch (target.unit) {
    case 'per_minute':
      return target.value / 60;
    case 'Hz':
      return target.value;
    case 'kHz':
      return target.value * 1e3;
    case 's':
      return 1 / target.value;
    case 'ms':
      return 1e3 / target.value;
  }
}

const fractions: readonly (readonly [number, string])[] = [
  [0.5, 'half'],
  [1 / 3, 'a third'],
  [2 / 3, 'two thirds'],
  [0.25, 'a quarter'],
  [0.75, 'three quarters'],
  [0.2, 'a fifth'],
  [0.8, 'four fifths'],
];

/** A duty in words: "half", "a third", else "37 %". */
export function dutyWords(duty: number): string {
  return fractions.find(([value]) => Math.abs(value - duty) < 0.004)?.[1] ?? percent(duty, 3);
}

const numbers = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight'];

/** A small count in words, a larger one in figures. */
export function countWords(count: number): string {
  return numbers[count] ?? String(count);
}
