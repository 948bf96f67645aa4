import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cautionsFor, mayTriggerSeizures } from '../../server/domain/cautions.ts';
import {
  celsiusRange,
  countWords,
  dutyWords,
  figuresFor,
  percent,
  plusMinus,
  rateWords,
  significant,
  targetHertz,
} from '../../server/domain/wording.ts';
import { targetUnits } from '../../server/contracts/brief.ts';

/** How many figures a shown number has, leading zeros not counted. */
const figuresOf = (text: string) =>
  text
    .replace(/[^\d.]/g, '')
    .replace(/^0+\.?0*/, '')
    .replace('.', '').length;

describe('significant', () => {
  it.each([
    [89.97, 3, '90.0'],
    [0.0012345, 2, '0.0012'],
    [999.6, 3, '1000'],
    [123456, 3, '123000'],
    [-4.56, 2, '−4.6'],
    [0, 4, '0'],
  ])('shows %s to %s figures as %s', (value, digits, text) => {
    expect(significant(value, digits)).toBe(text);
  });

  it('rounds down or up where it is told to, and never to the other side', () => {
    const values = fc.double({ min: 1e-4, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(values, fc.integer({ min: 2, max: 6 }), (value, digits) => {
        const down = Number(significant(value, digits, 'down'));
        const up = Number(significant(value, digits, 'up'));
        expect(down).toBeLessThanOrEqual(value * (1 + 1e-8));
        expect(up).toBeGreaterThanOrEqual(value * (1 - 1e-8));
        expect(up / down).toBeLessThanOrEqual(1 + 1.1 * 10 ** (1 - digits));
      }),
    );
  });
});

describe('figuresFor', () => {
  it('grants one figure more than the band leaves certain', () => {
    expect(figuresFor(0.05)).toBe(3);
    expect(figuresFor(0.009)).toBe(4);
    expect(figuresFor(0.2)).toBe(2);
    expect(figuresFor(0.9)).toBe(2);
    expect(figuresFor(1e-12)).toBe(6);
  });

  it('never lets a shown rate claim more than a tenth of its half-band', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-3, max: 1e5, noNaN: true }),
        fc.double({ min: 1e-4, max: 0.5, noNaN: true }),
        fc.constantFrom(...targetUnits),
        (hertz, half, unit) => {
          const { rate } = rateWords(hertz, unit, figuresFor(half));
          const shown = Number(rate);
          expect(Math.abs(shown / targetOf(hertz, unit) - 1)).toBeLessThan(half);
          const decimals = rate.includes('.') ? rate.split('.')[1]!.length : 0;
          if (decimals > 0) expect(10 ** -decimals / shown).toBeGreaterThan(half / 1000);
          expect(figuresOf(rate)).toBeLessThanOrEqual(Math.max(6, 7));
        },
      ),
    );
  });
});

const targetOf = (hertz: number, unit: (typeof targetUnits)[number]) =>
  ({ per_minute: hertz * 60, Hz: hertz, kHz: hertz / 1e3, s: 1 / hertz, ms: 1e3 / hertz })[unit];

describe('targetHertz', () => {
  it('turns each unit into hertz, periods over', () => {
    for (const unit of targetUnits) {
      expect(targetHertz({ value: targetOf(2.5, unit), unit })).toBeCloseTo(2.5, 12);
    }
  });
});

describe('plusMinus', () => {
  it('is never narrower than the truth, and by less than a tenth wider', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-5, max: 2, noNaN: true }), (fraction) => {
        const shown = Number(plusMinus(fraction).replace(/[^\d.]/g, '')) / 100;
        expect(shown).toBeGreaterThanOrEqual(fraction * (1 - 1e-9));
        expect(shown).toBeLessThan(fraction * 1.11);
      }),
    );
    expect(plusMinus(0.0461)).toBe('±\u00a04.7\u202f%');
    expect(plusMinus(0.05)).toBe('±\u00a05\u202f%');
  });
});

describe('small words', () => {
  it('say shares, temperatures, duties and counts', () => {
    expect(percent(0.046)).toBe('4.6\u202f%');
    expect(percent(-0.1)).toBe('−10\u202f%');
    expect(celsiusRange(-20, 70)).toBe('−20 and 70\u202f°C');
    expect([0.5, 1 / 3, 0.25, 0.8, 0.37].map(dutyWords)).toEqual([
      'half',
      'a third',
      'a quarter',
      'four fifths',
      '37\u202f%',
    ]);
    expect([0, 1, 8, 9].map(countWords)).toEqual(['no', 'one', 'eight', '9']);
  });
});

describe('the flash caution', () => {
  const around = (hertz: number, share: number) => ({
    minHz: hertz * (1 - share),
    maxHz: hertz * (1 + share),
  });

  // Edges of the 3 to 60 Hz range as charities and WCAG 2.2 SC 2.3.1 give it.
  it.each([
    [3.0, 0, false],
    [3.0001, 0, true],
    [3.0, 0.05, true],
    [2.9, 0.05, true],
    [2.8, 0.05, false],
    [60, 0, true],
    [60.1, 0, false],
    [63, 0.05, true],
    [63.2, 0.05, false],
    [0, 0, false],
    [1000, 0.05, false],
    [NaN, 0, false],
  ])('at %s Hz ± %s: %s', (hertz, share, shown) => {
    expect(mayTriggerSeizures(around(hertz, share))).toBe(shown);
    const facts = { frequencyHz: hertz, ...around(hertz, share) };
    const cautions = cautionsFor({
      ...facts,
      hasLed: true,
      hasBattery: false,
      darkBelowVolts: null,
      hasPolarised: false,
    });
    const flash = cautions.find(({ code }) => code === 'flash');
    expect(flash !== undefined).toBe(shown);
    if (flash) expect(flash.mustAcknowledge).toBe(true);
  });

  it('names the rate and what to do, for a light of the maker’s own too', () => {
    const facts = {
      frequencyHz: 10,
      minHz: 9,
      maxHz: 11,
      hasBattery: false,
      darkBelowVolts: null,
      hasPolarised: false,
    };
    const text = (hasLed: boolean) => cautionsFor({ ...facts, hasLed })[0]!.text;
    expect(text(true)).toMatch(/^This kit flashes 10\.0 times a second/);
    expect(text(false)).toMatch(/^A light driven by this kit/);
    expect(text(true)).toMatch(/photosensitive epilepsy.*Do not stare.*children.*stop at once/);
  });
});

describe('the other cautions', () => {
  const codes = (change: object) =>
    cautionsFor({
      frequencyHz: 1,
      minHz: 0.9,
      maxHz: 1.1,
      hasLed: false,
      hasBattery: false,
      darkBelowVolts: null,
      hasPolarised: false,
      ...change,
    }).map(({ code }) => code);

  it('go with every kit, and with what is in it', () => {
    expect(codes({})).toEqual(['low-voltage-only', 'not-for-safety', 'soldering', 'small-parts']);
    expect(codes({ hasLed: true })).toContain('polarity');
    expect(codes({ hasPolarised: true })).toContain('polarity');
    expect(codes({ hasBattery: true })).toContain('battery');
  });
});
