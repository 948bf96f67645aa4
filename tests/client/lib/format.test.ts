import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatMoney } from '../../../client/lib/format-money.ts';
import {
  formatPercent,
  formatQuantity,
  formatSignedPercent,
  readNumber,
} from '../../../client/lib/format-number.ts';
import { bindUnits, narrow } from '../../../client/lib/spaces.ts';

const plain = (text: string) => text.replaceAll(narrow, ' ');

describe('formatQuantity', () => {
  it('uses engineering prefixes and a narrow no-break space', () => {
    expect(formatQuantity(887_000, 'Ω')).toBe(`887${narrow}kΩ`);
    expect(plain(formatQuantity(5.6e-7, 'F'))).toBe('560 nF');
    expect(plain(formatQuantity(0.6667, 's'))).toBe('667 ms');
  });

  it('steps up a prefix when rounding reaches a thousand', () => {
    expect(plain(formatQuantity(999_960, 'Ω', 3))).toBe('1 MΩ');
  });

  it('always shows a number from 1 to below 1000 between pico and giga', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-11, max: 9e10, noNaN: true }), (value) => {
        const shown = Number(/^[\d.]+/.exec(formatQuantity(value, 'Hz', 3))?.[0]);
        return shown >= 1 && shown < 1000;
      }),
    );
  });
});

describe('percentages', () => {
  it('carry a true minus and a space before the sign', () => {
    expect(plain(formatSignedPercent(-0.0021))).toBe('− 0.21 %');
    expect(plain(formatPercent(0.046))).toBe('4.6 %');
  });
});

describe('formatMoney', () => {
  it('shows all minor digits and the sign in front', () => {
    expect(plain(formatMoney({ amount: 485, currency: 'EUR' }))).toBe('€ 4.85');
    expect(plain(formatMoney({ amount: -120_005, currency: 'EUR' }))).toBe('−€ 1 200.05');
  });

  it('takes the count of minor digits from ISO 4217: none for yen', () => {
    expect(plain(formatMoney({ amount: 485, currency: 'JPY' }))).toBe('JPY 485');
  });
});

describe('readNumber', () => {
  it('reads a point and a comma alike', () => {
    expect(readNumber('1,5')).toBe(1.5);
    expect(readNumber(' 1.5 ')).toBe(1.5);
    expect(readNumber('−10')).toBe(-10);
  });

  it.each(['', 'ninety', '1.2.3', '0x10', '--4'])('says that "%s" is not a number', (text) => {
    expect(readNumber(text)).toBeNaN();
  });
});

describe('bindUnits', () => {
  it('keeps a sign, its number and its unit on one line', () => {
    expect(bindUnits('within ± 5 %, 0 to 40 °C')).toBe(
      `within ±${narrow}5${narrow}%, 0 to 40${narrow}°C`,
    );
  });
});
