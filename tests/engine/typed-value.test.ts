import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { preferredBetween } from '../../server/engine/e-series.ts';
import { faradCode, ohmCode } from '../../server/engine/letter-code.ts';
import {
  digitsForUncertainty,
  formatFarads,
  formatOhms,
  formatSi,
} from '../../server/engine/si-format.ts';
import { readTypedFarads, readTypedOhms } from '../../server/engine/typed-value.ts';

describe('readTypedOhms', () => {
  it.each([
    ['4k7', 4700],
    ['887k', 887_000],
    ['887 kΩ', 887_000],
    ['887\u202fk\u2126', 887_000],
    ['4.7 kohm', 4700],
    ['1,5M', 1.5e6],
    ['0R47', 0.47],
    ['470', 470],
    ['470 R', 470],
    ['100 ohms', 100],
    ['1e5', 1e5],
    ['.5', 0.5],
    ['10 mΩ', 0.01],
    ['2.2meg', 2.2e6],
    ['4k7Ω', 4700],
  ])('understands %s', (text, ohms) => {
    expect(readTypedOhms(text)).toBe(ohms);
  });

  it.each(['', 'k', '4m7', '10m', '47u', '4k7k7', '-5', '1.2.3', '10 F', '1e999', '1e-999', 'abc'])(
    'does not guess at "%s"',
    (text) => {
      expect(readTypedOhms(text)).toBeNull();
    },
  );
});

describe('readTypedFarads', () => {
  it.each([
    ['0.82 uF', 8.2e-7],
    ['0,82 µF', 8.2e-7],
    ['818n2', 8.182e-7],
    ['818n2F', 8.182e-7],
    ['100 nF', 1e-7],
    ['100n', 1e-7],
    ['4p7', 4.7e-12],
    ['1μ0', 1e-6],
    ['8.2e-7 F', 8.2e-7],
    ['8.2e-7', 8.2e-7],
    ['1 farad', 1],
  ])('understands %s', (text, farads) => {
    expect(readTypedFarads(text)).toBe(farads);
  });

  it.each(['', '104', '0.82', '10N', '4k7', '-1n', '10 nΩ', '1e999F', '1e-330F', '4p7C'])(
    'does not guess at "%s"',
    (text) => {
      expect(readTypedFarads(text)).toBeNull();
    },
  );
});

describe('typed values and formats', () => {
  const ohms = ['E24', 'E192'] as const;
  const allOhms = ohms.flatMap((series) => preferredBetween(1e-3, 9.9e11, series));
  const allFarads = ohms.flatMap((series) => preferredBetween(1e-12, 9.9, series));

  it('read back every preferred value as the shop itself writes it', () => {
    expect(allOhms.filter((value) => readTypedOhms(formatOhms(value)) !== value)).toEqual([]);
    expect(allOhms.filter((value) => readTypedOhms(ohmCode(value) ?? '') !== value)).toEqual([]);
    expect(allFarads.filter((value) => readTypedFarads(formatFarads(value)) !== value)).toEqual([]);
    expect(allFarads.filter((value) => readTypedFarads(faradCode(value) ?? '') !== value)).toEqual(
      [],
    );
  });

  it('read a decimal comma as a point', () => {
    const withComma = (value: number) => formatOhms(value).replace('.', ',');
    expect(allOhms.filter((value) => readTypedOhms(withComma(value)) !== value)).toEqual([]);
  });

  it('read any text as nothing or as a number that is not negative', () => {
    const signs = fc.constantFrom(...'0123456789.,eE+- kKMGmunpµRrΩFohfmeg');
    const anyText = fc.oneof(
      fc.string({ unit: signs, maxLength: 9 }),
      fc.string({ unit: 'grapheme', maxLength: 6 }),
      fc.string({ unit: fc.constantFrom(...'0123456789kRp'), minLength: 300, maxLength: 400 }),
    );
    fc.assert(
      fc.property(anyText, (text) => {
        for (const value of [readTypedOhms(text), readTypedFarads(text)]) {
          if (value === null) continue;
          expect(Number.isFinite(value)).toBe(true);
          expect(value).toBeGreaterThanOrEqual(0);
          if (value === 0) expect(text.replace(/e[+-]?\d+/, '')).not.toMatch(/[1-9]/);
        }
      }),
      { numRuns: 5000 },
    );
    expect(readTypedOhms(`${'9'.repeat(400)}k`)).toBeNull();
  });
});

describe('formatSi', () => {
  it('joins value and unit by a narrow no-break space', () => {
    expect(formatOhms(887_000)).toBe('887\u202fkΩ');
    expect(formatFarads(8.2e-7)).toBe('820\u202fnF');
  });

  it.each([
    [0, 4, '0 Hz'],
    [999.96, 4, '1 kHz'],
    [0.00100887, 3, '1.01 mHz'],
    [123456, 2, '120 kHz'],
    [-1.5e-9, 4, '−1.5 nHz'],
    [1e18, 3, '1000000 THz'],
    [1e-18, 3, '0.001 fHz'],
    [NaN, 3, '– Hz'],
  ])('writes %d with %d figures as %s', (value, digits, text) => {
    expect(formatSi(value, 'Hz', digits).replace('\u202f', ' ')).toBe(text);
  });

  it('keeps zeros that carry meaning when asked', () => {
    expect(formatSi(1, 'Hz', 3, 'keep')).toBe('1.00\u202fHz');
    expect(formatSi(100, 'Hz', 3, 'keep')).toBe('100\u202fHz');
  });
});

describe('digitsForUncertainty', () => {
  it('stops at the digit the uncertainty reaches', () => {
    const fractions = [0.2, 0.05, 0.02, 0.001, 1e-9, 0];
    expect(fractions.map(digitsForUncertainty)).toEqual([2, 3, 3, 4, 6, 6]);
  });
});
