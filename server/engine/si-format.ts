const prefixes: Record<number, string> = {
  [-15]: 'f',
  [-12]: 'p',
  [-9]: 'n',
  [-6]: 'µ',
  [-3]: 'm',
  0: '',
  3: 'k',
  6: 'M',
  9: 'G',
  12: 'T',
};
const leastPower = -15;
const greatestPower = 12;
/** Narrow no-break space: joins value and unit, and never parts at a line's end. */
const joint = '\u202f';
const minus = '\u2212';

/** Whether zeros at the end of the decimals go or stay. */
export type TrailingZeros = 'trim' | 'keep';

/**
 * A value with its engineering prefix and unit, joined by a narrow no-break space: 887 kΩ. Rounded
 * to `significantDigits` (1…15); zeros after the last figure are trimmed unless kept. A real minus
 * sign; an en dash where there is no finite value.
 */
export function formatSi(
  value: number,
  unit: string,
  significantDigits: number = 4,
  trailingZeros: TrailingZeros = 'trim',
): string {
  if (!Number.isFinite(value)) return `–${joint}${unit}`;
  const [digits = '0', exponent = '0'] = Math.abs(value)
    .toExponential(significantDigits - 1)
    .split('e');
  const power = Math.min(Math.max(3 * Math.floor(Number(exponent) / 3), leastPower), greatestPower);
  const places = Math.max(significantDigits - 1 - (Number(exponent) - power), 0);
  const scaled = Number(`${digits}e${Number(exponent) - power}`).toFixed(Math.min(places, 100));
  const shown =
    trailingZeros === 'keep' ? scaled : scaled.replace(/(\.\d*?)0+$/, '$1').replace(/\.$/, '');
  const sign = value < 0 && Number(shown) !== 0 ? minus : '';
  return `${sign}${shown}${joint}${prefixes[power] ?? ''}${unit}`;
}

/** Ohms with prefix: 887 kΩ. See `formatSi`. */
export function formatOhms(ohms: number, significantDigits: number = 4): string {
  return formatSi(ohms, 'Ω', significantDigits);
}

/** Farads with prefix: 820 nF. See `formatSi`. */
export function formatFarads(farads: number, significantDigits: number = 4): string {
  return formatSi(farads, 'F', significantDigits);
}

/**
 * How many significant digits a value deserves whose relative uncertainty is `fraction` (0.02 for
 * ±2 %): the digit that the uncertainty reaches and none behind it, 2 to 6 of them.
 */
export function digitsForUncertainty(fraction: number): number {
  if (!(fraction > 0)) return 6;
  return Math.min(Math.max(Math.ceil(-Math.log10(fraction)) + 1, 2), 6);
}
