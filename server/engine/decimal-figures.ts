/** A value as a whole mantissa of a fixed number of figures times a power of ten. */
export interface DecimalFigures {
  mantissa: number;
  exponent: number;
}

/**
 * `value` as `figures` significant figures, or null when it needs more of them (to nine figures)
 * or is not positive and finite. 4700 with two figures is 47 × 10².
 */
export function decimalFigures(value: number, figures: number): DecimalFigures | null {
  if (!(value > 0 && value < Infinity)) return null;
  const [digits = '', power = '0'] = value.toExponential(8).split('e');
  const exponent = Number(power) - (figures - 1);
  const all = digits.replace('.', '');
  return /^0*$/.test(all.slice(figures))
    ? { mantissa: Number(all.slice(0, figures)), exponent }
    : null;
}

/** mantissa × 10^exponent as the double nearest to that decimal number. */
export function fromDecimal(mantissa: number | string, exponent: number): number {
  return Number(`${mantissa}e${exponent}`);
}
