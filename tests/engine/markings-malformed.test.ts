import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readCapacitorCode } from '../../server/engine/capacitor-code.ts';
import { readChipCode, readE96Code } from '../../server/engine/chip-code.ts';
import { readFaradCode, readOhmCode } from '../../server/engine/letter-code.ts';
import { readResistorBands, type BandColour } from '../../server/engine/resistor-bands.ts';
import { referenceRows } from './reference-rows.ts';

// What a code says, worked out from the published tables alone; null for what is no code.

const colourRows = new Map(
  referenceRows('resistor_colour_code.csv').map((row) => [row('colour'), row]),
);
const isBand = (name: string): name is BandColour => name !== 'none';
const colours = [...colourRows.keys()].filter(isBand);

function bandsByTable(bands: readonly string[]): string | null {
  if (bands.join(' ') === 'black') return '0 ± 0 %';
  if (bands.length < 3 || bands.length > 6) return null;
  const cell = (index: number, column: string) => colourRows.get(bands[index] ?? 'none')?.(column);
  const figures = bands.length < 5 ? 2 : 3;
  const digits = bands.slice(0, figures).map((_, index) => cell(index, 'digit') ?? '');
  const tolerance = cell(figures + 1, 'tolerance_pct_2016');
  const coefficient = bands.length === 6 ? cell(5, 'tcr_ppm_per_K') : 'none';
  if (digits.includes('') || digits[0] === '0' || tolerance === '' || coefficient === '') {
    return null;
  }
  const ohms = Number(`${digits.join('')}e${cell(figures, 'multiplier_exp10')}`);
  return `${ohms} ± ${tolerance} %${bands.length === 6 ? `, ${coefficient} ppm/K` : ''}`;
}

function bandsAsRead(bands: readonly BandColour[]): string | null {
  const reading = readResistorBands(bands);
  if (!reading) return null;
  const percent = Number((100 * reading.tolerance).toPrecision(9));
  const { ohms, partsPerMillionPerKelvin: coefficient } = reading;
  return `${ohms} ± ${percent} %${coefficient === null ? '' : `, ${coefficient} ppm/K`}`;
}

/** Every string of up to `longest` of these signs, the empty one included. */
function* strings(signs: readonly string[], longest: number): Generator<string> {
  yield '';
  if (longest === 0) return;
  for (const rest of strings(signs, longest - 1)) {
    for (const sign of signs) yield sign + rest;
  }
}

/** The codes that are read as something else than the tables say, each once. */
function misread<Answer>(
  codes: Iterable<string>,
  read: (code: string) => Answer,
  byTable: (code: string) => Answer,
): string[] {
  return [...new Set(codes)].filter((code) => !Object.is(read(code), byTable(code)));
}

describe('readResistorBands', () => {
  it('reads every row of up to four colours as the table says, or not at all', () => {
    const rows = colours.flatMap((a) => [
      [a],
      ...colours.flatMap((b) => [
        [a, b],
        ...colours.flatMap((c) => [[a, b, c], ...colours.map((d) => [a, b, c, d])]),
      ]),
    ]);
    expect(rows.filter((bands) => bandsAsRead(bands) !== bandsByTable(bands))).toEqual([]);
    const named = rows.filter((bands) => bandsAsRead(bands) !== null);
    // 9 leading digits, 10 digits, 13 multipliers; no tolerance band or one of ten; and the link.
    expect(named).toHaveLength(9 * 10 * 13 * (1 + 10) + 1);
  });

  it('reads longer rows as the table says, or not at all', () => {
    fc.assert(
      fc.property(
        fc.array(fc.constantFrom(...colours), { minLength: 5, maxLength: 8 }),
        (bands) => {
          expect(bandsAsRead(bands)).toBe(bandsByTable(bands));
        },
      ),
      { numRuns: 20_000 },
    );
  });
});

function chipByTable(code: string): number | null {
  if (['0', '000', '0000'].includes(code)) return 0;
  const isPrint = code.length === 3 || code.length === 4;
  const [whole = '', decimals, ...more] = code.split('R');
  if (!isPrint || more.length > 0 || /^0\d/.test(whole)) return null;
  if (decimals !== undefined) return Number(code.replace('R', '.'));
  return whole.startsWith('0') ? null : Number(`${code.slice(0, -1)}e${code.slice(-1)}`);
}

describe('readChipCode', () => {
  it('reads every print of up to five digits and R as printed, or not at all', () => {
    const codes = strings([...'0123456789R'], 5);
    expect(misread(codes, readChipCode, chipByTable)).toEqual([]);
  });

  it('reads every number and letter of the three-character code as the tables say', () => {
    const figures = new Map(
      referenceRows('eia96_codes.csv').map((row) => [row('code'), row('significand')]),
    );
    const powers = new Map(
      referenceRows('eia96_multipliers.csv').map((row) => [
        row('letter'),
        Math.round(Math.log10(Number(row('multiplier')))),
      ]),
    );
    const codes = Array.from({ length: 1000 }, (_, index) =>
      [...'ABCDEFGHIJKLMNOPQRSTUVWXYZabcxyz'].map(
        (letter) => String(index).padStart(2, '0') + letter,
      ),
    ).flat();
    const byTable = (code: string) => {
      const [figure, power] = [figures.get(code.slice(0, -1)), powers.get(code.slice(-1))];
      return figure === undefined || power === undefined ? null : Number(`${figure}e${power}`);
    };
    expect(misread(codes, readE96Code, byTable)).toEqual([]);
    const plain = codes.filter((code) => !code.endsWith('R'));
    expect(misread(plain, readChipCode, byTable)).toEqual([]);
  });
});

const letterRows = referenceRows('tolerance_letters.csv');
const percentByLetter = new Map(
  letterRows.map((row) => [
    row('letter'),
    /^±([\d.]+) %/.exec(row('meaning_C>=10pF_or_R'))?.[1] ?? null,
  ]),
);

/** Two ways of cutting a code: all of it the value, or its last letter the tolerance. */
function cuts(code: string): [string, string][] {
  return [
    [code, ''],
    [code.slice(0, -1), code.slice(-1)],
  ];
}

function letterCodeByTable(code: string, powers: Record<string, number>) {
  for (const [value, letter] of cuts(code)) {
    const mark = /\D/.exec(value)?.[0] ?? '';
    const power = new Map(Object.entries(powers)).get(mark);
    const number = value.replace(mark, '.');
    if (power !== undefined && /^(?=.*\d)\d*\.\d*$/.test(number)) {
      return { value: Number(`${number}e${power}`), letter };
    }
  }
  return null;
}

function ohmsByTable(code: string): string | null {
  if (code === '0') return '0';
  const said = letterCodeByTable(code, { L: -3, R: 0, r: 0, K: 3, k: 3, M: 6, G: 9 });
  if (!said) return null;
  if (said.letter === '') return String(said.value);
  const percent = percentByLetter.get(said.letter) ?? null;
  return percent === null ? null : `${said.value} ± ${Number(percent)} %`;
}

function ohmsAsRead(code: string): string | null {
  const reading = readOhmCode(code);
  if (!reading) return null;
  const percent = Number((100 * (reading.tolerance ?? 0)).toPrecision(9));
  return `${reading.value}${reading.tolerance === null ? '' : ` ± ${percent} %`}`;
}

describe('readOhmCode', () => {
  it('reads every code of up to five of its signs as the tables say, or not at all', () => {
    const codes = strings([...'047LRKMGkmJA'], 5);
    expect(misread(codes, ohmsAsRead, ohmsByTable)).toEqual([]);
  });

  it('reads nothing that holds a foreign sign, and no endless number', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', maxLength: 8 }), (code) => {
        fc.pre(/[^0-9A-Zkr]/.test(code));
        expect(readOhmCode(code)).toBeNull();
      }),
    );
    expect(readOhmCode(`${'9'.repeat(400)}K`)).toBeNull();
    expect(readOhmCode('0000000R1')).toBeNull();
  });
});

describe('readFaradCode', () => {
  it('reads every code of up to five of its signs as the tables say, or not at all', () => {
    const powers = { p: -12, n: -9, u: -6, µ: -6, μ: -6, m: -3, F: 0 };
    const byTable = (code: string) => {
      const said = letterCodeByTable(code, powers);
      if (!said || (said.letter !== '' && !'FKNZ'.includes(said.letter))) return null;
      const reachesZero = said.letter === 'F' && said.value < 1.0001e-12;
      return reachesZero ? null : said.value;
    };
    const codes = strings([...'047pnµuNFKPZ'], 5);
    expect(misread(codes, (code) => readFaradCode(code)?.value ?? null, byTable)).toEqual([]);
  });
});

describe('readCapacitorCode', () => {
  it('reads every print of up to four digits and a letter as the rule says, or not at all', () => {
    const byRule = (code: string) => {
      const [, digits = '', letter = ''] = /^(\d*)(\D?)$/.exec(code) ?? [];
      if (digits === '' || digits.length > 3 || digits.startsWith('0')) return null;
      if (!['', ...'BCDFGJKMNZSTQ'].includes(letter)) return null;
      const power = [0, 1, 2, 3, 4, 5, 6, 7, -2, -1][Number(digits[2] ?? 0)] ?? 0;
      const farads = Number(`${digits.slice(0, 2)}e${power - 12}`);
      const picofarads = { B: 0.1, C: 0.25, D: 0.5, F: 1, G: 2 }[letter] ?? 0;
      return picofarads * 1.0001e-12 > farads ? null : farads;
    };
    const letters = ['', ...'ABCDEFGHIJKLMNOPQRSTUVWXYZkµ'];
    const codes = [...strings([...'0123456789'], 4)].flatMap((digits) =>
      letters.map((letter) => digits + letter),
    );
    expect(misread(codes, (code) => readCapacitorCode(code)?.farads ?? null, byRule)).toEqual([]);
  });
});
