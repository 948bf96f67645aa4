import { describe, expect, it } from 'vitest';
import { capacitorCode, readCapacitorCode } from '../../server/engine/capacitor-code.ts';
import { chipCode, e96Code, readChipCode, readE96Code } from '../../server/engine/chip-code.ts';
import { faradCode, ohmCode, readFaradCode, readOhmCode } from '../../server/engine/letter-code.ts';
import {
  readResistorBands,
  resistorBands,
  type BandColour,
} from '../../server/engine/resistor-bands.ts';
import {
  capacitorToleranceLetter,
  readCapacitorToleranceLetter,
  readResistorToleranceLetter,
  resistorToleranceLetter,
} from '../../server/engine/tolerance-letters.ts';
import { referenceRows } from './reference-rows.ts';

const colourNames: readonly BandColour[] = [
  'pink',
  'silver',
  'gold',
  'black',
  'brown',
  'red',
  'orange',
  'yellow',
  'green',
  'blue',
  'violet',
  'grey',
  'white',
];

function coloursOf(ohms: number, tolerance: number, ppm?: number): string {
  const code = resistorBands(ohms, tolerance, ppm);
  return code.kind === 'bands' ? code.colours.join(' ') : 'NOT CODABLE';
}

const plusMinus = (fraction: number) => ({ below: fraction, above: fraction });

/** The one customary way of writing what may be marked in several. */
function customary(marking: string): string {
  const spellings = new Map([
    ['0', '0R0'],
    ['0R47', 'R47'],
    ['1K', '1K0'],
    ['1K00', '1K0'],
    ['4k7', '4K7'],
    ['K47', '470R'],
    ['1n', '1n0'],
    ['n10', '100p'],
    ['1u0', '1µ0'],
  ]);
  return spellings.get(marking) ?? marking;
}

function bandColour(name: string): BandColour {
  const colour = colourNames.find((one) => one === name);
  if (!colour) throw new Error(`${name} is no band colour.`);
  return colour;
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

  it('writes the digit and the multiplier of every colour of the table', () => {
    for (const row of referenceRows('resistor_colour_code.csv')) {
      if (row('digit') !== '') {
        const ohms = Number(`1${row('digit')}7`);
        expect(coloursOf(ohms, 0.01)).toBe(`brown ${row('colour')} violet black brown`);
      }
      if (row('multiplier_exp10') !== '') {
        const ohms = Number(`47e${row('multiplier_exp10')}`);
        expect(coloursOf(ohms, 0.05)).toBe(`yellow violet ${row('colour')} gold`);
      }
    }
  });

  it('takes three figures at 5 % where two cannot say the value', () => {
    expect(coloursOf(475, 0.05)).toBe('yellow violet green black gold');
    expect(coloursOf(1e11, 0.05)).toBe('brown black black white gold');
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
    for (const ohms of [NaN, Infinity, -4700]) {
      expect(resistorBands(ohms, 0.01)).toMatchObject({ reason: /above zero/ });
    }
  });

  it('refuses three figures at 20 %, whose four bands would say another value', () => {
    expect(readResistorBands(['yellow', 'violet', 'brown', 'brown'])?.ohms).toBe(470);
    expect(resistorBands(4710, 0.2)).toMatchObject({ reason: /two figures/ });
  });
});

describe('readResistorBands', () => {
  it.each(
    referenceRows('resistor_colour_examples.csv')
      .filter((row) => row('bands_in_order') !== 'NOT CODABLE')
      .map((row) => [row('bands_in_order').replace(/ none$/, ''), row('ohms'), row]),
  )('reads %s as %s Ω (IEC 60062:2016 via secondary sources)', (bands, ohms, row) => {
    const reading = readResistorBands(bands.split(' ').map(bandColour));
    expect(reading?.ohms).toBe(Number(ohms));
    expect(reading?.tolerance).toBeCloseTo(Number(row('tolerance_pct')) / 100, 12);
  });

  it('reads every tolerance of the table, with what it was before 2016 where that differs', () => {
    const found = referenceRows('resistor_colour_code.csv').map((row) => {
      if (row('colour') === 'none') return readResistorBands(['brown', 'black', 'red']);
      return readResistorBands(['brown', 'black', 'red', bandColour(row('colour'))]);
    });
    referenceRows('resistor_colour_code.csv').forEach((row, index) => {
      const [now, before] = [row('tolerance_pct_2016'), row('tolerance_pct_pre2016')];
      if (now === '') expect(found[index]).toBeNull();
      else {
        expect(100 * (found[index]?.tolerance ?? 0)).toBeCloseTo(Number(now), 12);
        const older = found[index]?.olderTolerance ?? null;
        if (before === '' || before === now) expect(older).toBeNull();
        else expect(100 * (older ?? 0)).toBeCloseTo(Number(before), 12);
      }
    });
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
    expect(readResistorBands(['black', 'red', 'red', 'gold'])).toBeNull();
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
    else {
      const value = Number(row('value_SI'));
      expect(read).toEqual({ value, tolerance: null });
      const written = kind === 'resistor' ? ohmCode(value) : faradCode(value);
      if (marking === 'L47') expect(written).toBeNull();
      else expect(customary(marking)).toBe(written);
    }
  });

  it('reads a tolerance letter after the value', () => {
    expect(readOhmCode('4K7J')).toEqual({ value: 4700, tolerance: 0.05 });
    expect(readOhmCode('47KK')).toEqual({ value: 47_000, tolerance: 0.1 });
    expect(readOhmCode('4M7M')).toEqual({ value: 4.7e6, tolerance: 0.2 });
    expect(readFaradCode('4n7K')).toEqual({ value: 4.7e-9, tolerance: plusMinus(0.1) });
    expect(readFaradCode('10nZ')).toEqual({ value: 1e-8, tolerance: { below: 0.2, above: 0.8 } });
    expect(readOhmCode('4K7X')).toBeNull();
    expect(readOhmCode('K')).toBeNull();
  });

  it('counts the letter after a capacitance under 10 pF in picofarads', () => {
    expect(readFaradCode('4p7C')?.tolerance?.above).toBeCloseTo(0.25 / 4.7, 12);
    expect(readFaradCode('47pC')?.tolerance?.above).toBeCloseTo(0.0025, 12);
  });

  it('does not read P, L or W on a capacitor, on which sources disagree', () => {
    expect(['10nP', '10nL', '10nW'].map(readFaradCode)).toEqual([null, null, null]);
    expect(readOhmCode('10KP')).toEqual({ value: 10_000, tolerance: 0.0002 });
  });

  it('writes a tolerance letter after the value', () => {
    expect(ohmCode(47_000, 0.1)).toBe('47KK');
    expect(ohmCode(4.7e6, 0.2)).toBe('4M7M');
    expect(ohmCode(4700, 0.03)).toBeNull();
    expect(faradCode(1e-7, 0.1)).toBe('100nK');
    expect(faradCode(1e-7, { below: 0.2, above: 0.8 })).toBe('100nZ');
    expect(faradCode(4.7e-12, 0.25 / 4.7)).toBe('4p7C');
    expect(faradCode(1e-7, 0.03)).toBeNull();
  });

  it('writes the customary form', () => {
    const ohms = [0, 0.47, 1, 4.7, 470, 1000, 4700, 9530, 887_000, 1e7, 1e9];
    expect(ohms.map((value) => ohmCode(value))).toEqual([
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
    expect(farads.map((value) => faradCode(value))).toEqual([
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
    const values = [1e-5, 1e12, -1, NaN, 1.2345678];
    expect(values.map((value) => ohmCode(value))).toEqual(values.map(() => null));
    expect(faradCode(1e-17)).toBeNull();
  });
});

describe('tolerance letters', () => {
  const rows = referenceRows('tolerance_letters.csv');

  it.each(rows.map((row) => [row('letter'), row('meaning_C>=10pF_or_R')]))(
    '%s on a resistor is %s (IEC 60062 clause 5 via secondary sources; P, L, W from memory)',
    (letter, meaning) => {
      const percent = /^±([\d.]+) %/.exec(meaning)?.[1];
      const read = readResistorToleranceLetter(letter);
      if (percent === undefined) expect(read).toBeNull();
      else {
        expect(100 * (read ?? 0)).toBeCloseTo(Number(percent), 12);
        const written = letter === 'A' ? 'W' : letter;
        expect(resistorToleranceLetter(Number(percent) / 100)).toBe(written);
      }
    },
  );

  it.each(
    rows
      .filter((row) => !['W', 'P', 'L', 'A'].includes(row('letter')))
      .map((row) => [row('letter'), row('meaning_C>=10pF_or_R'), row('meaning_C<10pF')]),
  )('%s on a capacitor is %s, and %s under 10 pF', (letter, meaning, under) => {
    const [, plus = '', minus = plus] = /^[±+]([\d.]+) %(?: −([\d.]+) %)?$/.exec(meaning) ?? [];
    const spread = { below: Number(minus) / 100, above: Number(plus) / 100 };
    expect(readCapacitorToleranceLetter(letter, 1e-11)).toEqual(spread);
    expect(capacitorToleranceLetter(spread, 1e-11)).toBe(letter);
    const picofarads = /^±([\d.]+) pF$/.exec(under)?.[1];
    if (picofarads === undefined) {
      expect(capacitorToleranceLetter(spread, 9.1e-12)).toBeNull();
      return;
    }
    const small = readCapacitorToleranceLetter(letter, 5e-12);
    expect(5 * (small?.above ?? 0)).toBeCloseTo(Number(picofarads), 12);
    expect(capacitorToleranceLetter(Number(picofarads) / 5, 5e-12)).toBe(letter);
  });

  it('has no letter that would let a capacitance reach zero', () => {
    expect(readCapacitorToleranceLetter('F', 1e-12)).toBeNull();
    expect(readCapacitorToleranceLetter('G', 1e-12)).toBeNull();
    expect(readCapacitorToleranceLetter('D', 1e-12)).toEqual(plusMinus(0.5));
  });

  it('has no letter for what no letter stands for', () => {
    expect([0, 0.03, NaN, -0.05].map(resistorToleranceLetter)).toEqual(Array(4).fill(null));
    expect(['', 'X', 'j', 'JJ', 'constructor'].map(readResistorToleranceLetter)).toEqual(
      Array(5).fill(null),
    );
    expect(capacitorToleranceLetter({ below: 0.1, above: 0.2 }, 1e-9)).toBeNull();
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

  it('gives nothing for what is no code', () => {
    const none = ['00', '00000', '047', '05R', '00R5', 'R', '97A', '12345', ''];
    expect(none.map(readChipCode)).toEqual(none.map(() => null));
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
        const preferredLetter = /alias of (\w)/.exec(letter('note'))?.[1] ?? letter('letter');
        expect(e96Code(ohms)).toBe(row('code') + preferredLetter);
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
      const { farads = 0, tolerance = null } = reading ?? {};
      if (row('min_pF') === '') expect(tolerance).toBeNull();
      else {
        const picofaradsAt = (factor: number) => farads * 1e12 * factor;
        const { below, above } = tolerance ?? plusMinus(0);
        expect(picofaradsAt(1 - below)).toBeCloseTo(Number(row('min_pF')), 6);
        expect(picofaradsAt(1 + above)).toBeCloseTo(Number(row('max_pF')), 6);
      }
      if (marking.length > 2) expect(capacitorCode(farads, tolerance)).toBe(marking);
    },
  );

  it('counts the tight letters in picofarads below 10 pF and in per cent from there up', () => {
    expect(readCapacitorCode('479C')?.tolerance?.above).toBeCloseTo(0.25 / 4.7, 12);
    expect(readCapacitorCode('101F')?.tolerance?.above).toBeCloseTo(0.01, 12);
    expect(readCapacitorCode('5D')?.tolerance?.below).toBeCloseTo(0.1, 12);
  });

  it('does not guess at letters on which sources disagree', () => {
    expect(readCapacitorCode('104P')).toBeNull();
    expect(readCapacitorCode('104L')).toBeNull();
  });
});

describe('capacitorCode', () => {
  it('writes the digits, and the letter when a tolerance is given', () => {
    expect(capacitorCode(1e-7, 0.1)).toBe('104K');
    expect(capacitorCode(1e-7, { below: 0.2, above: 0.8 })).toBe('104Z');
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
});
