import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { capacitorCode, readCapacitorCode } from '../../server/engine/capacitor-code.ts';
import { chipCode, e96Code, readChipCode, readE96Code } from '../../server/engine/chip-code.ts';
import { preferredBetween } from '../../server/engine/e-series.ts';
import {
  faradCode,
  ohmCode,
  readFaradCode,
  readOhmCode,
  toleranceLetter,
} from '../../server/engine/letter-code.ts';
import {
  readResistorBands,
  resistorBands,
  type BandColour,
} from '../../server/engine/resistor-bands.ts';
import { referenceRows } from './reference-rows.ts';

function coloursOf(ohms: number, tolerance: number, ppm?: number): string {
  const code = resistorBands(ohms, tolerance, ppm);
  return code.kind === 'bands' ? code.colours.join(' ') : 'NOT CODABLE';
}

describe('resistorBands', () => {
  it.each(
    referenceRows('resistor_colour_examples.csv').map((row) => [
      row('ohms'),
      row('tolerance_pct'),
      row('bands_in_order'),
    ]),
  )('codes %s Ω ± %s %% as %s (IEC 60062:2016 via secondary sources)', (ohms, percent, bands) => {
    const colours = coloursOf(Number(ohms), Number(percent) / 100);
    expect(colours).toBe(bands.replace(/ none$/, ''));
  });

  it('takes every tolerance and temperature colour of the 2016 table', () => {
    for (const row of referenceRows('resistor_colour_code.csv')) {
      const percent = Number(row('tolerance_pct_2016'));
      const ppm = Number(row('tcr_ppm_per_K'));
      if (percent > 0 && row('colour') !== 'none') {
        expect(
          coloursOf(10_000, percent / 100)
            .split(' ')
            .at(-1),
        ).toBe(row('colour'));
      }
      if (ppm > 0) {
        const colours = coloursOf(10_000, 0.01, ppm);
        expect(colours).toBe(`brown black black red brown ${row('colour')}`);
      }
    }
  });

  it('takes three figures at 5 % where two cannot say the value', () => {
    expect(coloursOf(475, 0.05)).toBe('yellow violet green black gold');
  });

  it('codes a link as one black band', () => {
    expect(coloursOf(0, 0)).toBe('black');
  });

  it('refuses what no band says, and says why', () => {
    expect(resistorBands(4753, 0.01)).toMatchObject({ reason: /more than three figures/ });
    expect(resistorBands(1e-6, 0.01)).toMatchObject({ reason: /multiplier/ });
    expect(resistorBands(1e15, 0.01)).toMatchObject({ reason: /multiplier/ });
    expect(resistorBands(1000, 0.03)).toMatchObject({ reason: /tolerance/ });
    expect(resistorBands(1000, 0.01, 77)).toMatchObject({ reason: /coefficient/ });
    expect(resistorBands(1000, 0.2, 100)).toMatchObject({ kind: 'uncodable' });
    expect(resistorBands(NaN, 0.01)).toMatchObject({ kind: 'uncodable' });
  });
});

describe('readResistorBands', () => {
  it('reads back every value that can be coded', () => {
    for (const ohms of preferredBetween(1, 1e8, 'E24')) {
      for (const tolerance of [0.2, 0.05, 0.01, 0.001]) {
        const code = resistorBands(ohms, tolerance);
        if (code.kind !== 'bands') throw new Error(code.reason);
        expect(readResistorBands(code.colours)).toMatchObject({ ohms, tolerance });
      }
    }
  });

  it('reads the reversal hazard as the two values it stands for', () => {
    const bands: BandColour[] = ['brown', 'black', 'black', 'red', 'brown'];
    expect(readResistorBands(bands)?.ohms).toBe(10_000);
    expect(readResistorBands(bands.toReversed())?.ohms).toBe(120);
  });

  it('says what grey meant before 2016, and reads a sixth band', () => {
    expect(readResistorBands(['brown', 'black', 'black', 'red', 'grey', 'brown'])).toEqual({
      ohms: 10_000,
      tolerance: 0.0001,
      olderTolerance: 0.0005,
      partsPerMillionPerKelvin: 100,
    });
  });

  it('reads a link, and nothing from bands that are no code', () => {
    expect(readResistorBands(['black'])?.ohms).toBe(0);
    expect(readResistorBands(['brown', 'black'])).toBeNull();
    expect(readResistorBands(['gold', 'black', 'red'])).toBeNull();
    expect(readResistorBands(['brown', 'black', 'red', 'white'])).toBeNull();
    expect(readResistorBands(['brown', 'black', 'black', 'red', 'brown', 'gold'])).toBeNull();
    expect(readResistorBands(Array<BandColour>(7).fill('red'))).toBeNull();
  });
});

describe('letter-and-digit code', () => {
  it.each(
    referenceRows('rkm_examples.csv').map((row) => [
      row('marking'),
      row('kind'),
      row('expect'),
      row,
    ]),
  )('%s as a %s: %s (IEC 60062 via secondary sources)', (marking, kind, expected, row) => {
    const read = kind === 'resistor' ? readOhmCode(marking) : readFaradCode(marking);
    if (expected === 'reject') expect(read).toBeNull();
    else expect(read).toEqual({ value: Number(row('value_SI')), tolerance: null });
  });

  it('reads a tolerance letter after the value', () => {
    expect(readOhmCode('4K7J')).toEqual({ value: 4700, tolerance: 0.05 });
    expect(readOhmCode('47KK')).toEqual({ value: 47_000, tolerance: 0.1 });
    expect(readOhmCode('4M7M')).toEqual({ value: 4.7e6, tolerance: 0.2 });
    expect(readFaradCode('4n7K')).toEqual({ value: 4.7e-9, tolerance: 0.1 });
    expect(readOhmCode('4K7X')).toBeNull();
    expect(readOhmCode('K')).toBeNull();
  });

  it('writes the customary form', () => {
    const ohms = [0, 0.47, 1, 4.7, 470, 1000, 4700, 9530, 887_000, 1e7, 1e9];
    expect(ohms.map(ohmCode)).toEqual([
      '0R0',
      'R47',
      '1R0',
      '4R7',
      '470R',
      '1K0',
      '4K7',
      '9K53',
      '887K',
      '10M',
      '1G0',
    ]);
    const farads = [4.7e-13, 4.7e-12, 1e-10, 4.7e-9, 8.182e-7, 1e-6, 4.7e-4, 1e-3];
    expect(farads.map(faradCode)).toEqual([
      'p47',
      '4p7',
      '100p',
      '4n7',
      '818n2',
      '1µ0',
      '470µ',
      '1m0',
    ]);
  });

  it('writes nothing for what the code cannot say', () => {
    expect([1e-5, 1e12, -1, NaN, 1.2345678].map(ohmCode)).toEqual([null, null, null, null, null]);
    expect(faradCode(1e-17)).toBeNull();
  });

  it('reads back what it writes', () => {
    for (const value of preferredBetween(0.01, 9e11, 'E192')) {
      expect(readOhmCode(ohmCode(value) ?? '')?.value).toBe(value);
    }
    for (const value of preferredBetween(1e-13, 1, 'E96')) {
      expect(readFaradCode(faradCode(value) ?? '')?.value).toBeCloseTo(value, 20);
    }
  });

  it('knows the letters of symmetric tolerances', () => {
    for (const row of referenceRows('tolerance_letters.csv')) {
      const percent = /^±([\d.]+) %$/.exec(row('meaning_C>=10pF_or_R'))?.[1];
      if (percent && row('letter') !== 'A') {
        expect(toleranceLetter(Number(percent) / 100)).toBe(row('letter'));
      }
    }
    expect(toleranceLetter(0.03)).toBeNull();
  });
});

describe('chip resistor codes', () => {
  it.each([
    ['103', 10_000],
    ['1002', 10_000],
    ['220', 22],
    ['12R0', 12],
    ['4R7', 4.7],
    ['R47', 0.47],
    ['68R', 68],
    ['0', 0],
    ['000', 0],
  ])('reads %s as %d Ω (instrument manual; common practice)', (code, ohms) => {
    expect(readChipCode(code)).toBe(ohms);
  });

  it('writes three and four characters', () => {
    const values = [0, 0.47, 4.7, 22, 10_000, 4750, 887_000];
    expect(values.map((ohms) => chipCode(ohms, 2))).toEqual([
      '000',
      'R47',
      '4R7',
      '220',
      '103',
      null,
      null,
    ]);
    expect(values.map((ohms) => chipCode(ohms, 3))).toEqual([
      '0000',
      'R470',
      '4R70',
      '22R0',
      '1002',
      '4751',
      '8873',
    ]);
  });

  it('reads back what it writes', () => {
    for (const ohms of preferredBetween(0.1, 1e9, 'E24')) {
      expect(readChipCode(chipCode(ohms, 2) ?? '')).toBeCloseTo(ohms, 9);
      expect(readChipCode(chipCode(ohms, 3) ?? '')).toBeCloseTo(ohms, 9);
    }
  });

  it('gives nothing for what is no code', () => {
    expect(['00', '047', 'R', '97A', '12345', ''].map(readChipCode)).toEqual(Array(6).fill(null));
    expect(chipCode(0.01, 2)).toBeNull();
    expect(chipCode(1e12, 3)).toBeNull();
  });
});

describe('the three-character code of E96 values', () => {
  it.each(referenceRows('eia96_examples.csv').map((row) => [row('code'), row('ohms')]))(
    '%s is %s (IEC 60062:2016 Annex A via lookup)',
    (code, ohms) => {
      expect(readE96Code(code)).toBe(ohms === 'reject' ? null : Number(ohms));
      if (ohms !== 'reject') expect(e96Code(Number(ohms))).toBe(code);
    },
  );

  it('has the 96 numbers and the twelve letters of the table', () => {
    const letters = referenceRows('eia96_multipliers.csv');
    for (const row of referenceRows('eia96_codes.csv')) {
      for (const letter of letters) {
        const ohms = Number(row('significand')) * Number(letter('multiplier'));
        expect((readE96Code(row('code') + letter('letter')) ?? 0) / ohms).toBeCloseTo(1, 12);
      }
    }
  });

  it('gives nothing for a value outside E96 or its powers', () => {
    expect([4700, 1e9, 0.01, 4753].map(e96Code)).toEqual([null, null, null, null]);
  });
});

describe('readCapacitorCode', () => {
  it.each(referenceRows('cap_3digit_examples.csv').map((row) => [row('marking'), row('pF'), row]))(
    'reads %s as %s pF (IEC 60062 clause 5 via secondary sources)',
    (marking, picofarads, row) => {
      const expected = marking === '10' ? '10' : picofarads;
      const reading = readCapacitorCode(marking);
      if (expected === '') {
        expect(reading).toBeNull();
        return;
      }
      expect((reading?.farads ?? 0) / (Number(expected) * 1e-12)).toBeCloseTo(1, 12);
      if (row('min_pF') === '') expect(reading?.limits).toBeNull();
      else {
        expect((reading?.limits?.minFarads ?? 0) * 1e12).toBeCloseTo(Number(row('min_pF')), 6);
        expect((reading?.limits?.maxFarads ?? 0) * 1e12).toBeCloseTo(Number(row('max_pF')), 6);
      }
    },
  );

  it('counts the tight letters in picofarads below 10 pF and in per cent from there up', () => {
    expect(readCapacitorCode('479C')?.limits?.maxFarads).toBeCloseTo(4.95e-12, 18);
    expect(readCapacitorCode('101F')?.limits?.maxFarads).toBeCloseTo(101e-12, 18);
    expect(readCapacitorCode('5D')?.limits?.minFarads).toBeCloseTo(4.5e-12, 18);
  });

  it('does not guess at letters on which sources disagree', () => {
    expect(readCapacitorCode('104P')).toBeNull();
    expect(readCapacitorCode('104L')).toBeNull();
  });
});

describe('capacitorCode', () => {
  it('writes the digits, and the letter when a tolerance is given', () => {
    expect(capacitorCode(1e-7, 0.1)).toBe('104K');
    expect(capacitorCode(8.2e-7)).toBe('824');
    expect(capacitorCode(4.7e-12, 0.25 / 4.7)).toBe('479C');
    expect(capacitorCode(5e-13)).toBe('508');
    expect(capacitorCode(1e-11)).toBe('100');
  });

  it('gives nothing for what the code cannot say', () => {
    expect(capacitorCode(8.182e-7)).toBeNull();
    expect(capacitorCode(1)).toBeNull();
    expect(capacitorCode(1e-7, 0.03)).toBeNull();
    expect(capacitorCode(1e-7, 0.0001)).toBeNull();
    expect(capacitorCode(4.7e-12, 0.3)).toBeNull();
  });

  it('reads back what it writes', () => {
    fc.assert(
      fc.property(fc.constantFrom(...preferredBetween(1e-12, 1e-4, 'E24')), (farads) => {
        const reading = readCapacitorCode(capacitorCode(farads) ?? '');
        expect((reading?.farads ?? 0) / farads).toBeCloseTo(1, 12);
      }),
    );
  });
});
