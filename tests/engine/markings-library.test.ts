import { createRequire } from 'node:module';
import { describe, expect, it } from 'vitest';
import { preferredBetween } from '../../server/engine/e-series.ts';
import { ohmCode } from '../../server/engine/letter-code.ts';
import { readResistorBands, resistorBands } from '../../server/engine/resistor-bands.ts';
import { formatSi } from '../../server/engine/si-format.ts';
import { readTypedFarads, readTypedOhms } from '../../server/engine/typed-value.ts';

// Two general-purpose packages judge the engine: resistor-data 1.1.1 for bands and letter codes,
// js-quantities 1.8.0 for prefixes. Neither brings types.

interface ResistorData {
  notationToBands(said: [notation: string, percent: number], bands: number): string[];
  bandsToNotation(bands: readonly string[], count: number): [notation: string, percent: number];
  valueToNotation(ohms: number): string;
  notationToValue(notation: string): number;
}
interface Quantities {
  parse(text: string): { baseScalar: number; kind(): string } | null;
}
const require = createRequire(import.meta.url);
const library = require('resistor-data') as ResistorData;
const quantities = require('js-quantities') as Quantities;

function coloursOf(ohms: number, percent: number): string[] {
  const code = resistorBands(ohms, percent / 100);
  return code.kind === 'bands' ? code.colours : [code.reason];
}

// The package works in whole ohms, from two figures up, and has no letter from 1 GΩ on.
const twoFigures = preferredBetween(10, 9.99e8, 'E24');
const threeFigures = [...twoFigures, ...preferredBetween(100, 9.99e8, 'E192')];
const cases = [
  ...[10, 5].flatMap((percent) => twoFigures.map((ohms) => ({ ohms, percent }))),
  ...[2, 1, 0.5, 0.25, 0.1].flatMap((percent) => threeFigures.map((ohms) => ({ ohms, percent }))),
];

/** Values that the package cuts down by one ohm on reading its own notation: 4.02 × 1000 = 4019.9… */
const cutDown = new Set(
  threeFigures.filter((ohms) => library.notationToValue(library.valueToNotation(ohms)) !== ohms),
);

describe('the package version', () => {
  it.each([
    ['resistor-data', '1.1.1'],
    ['js-quantities', '1.8.0'],
  ])('of %s is %s, the one whose errors are listed here', (name, version) => {
    const lock = require('../../package-lock.json') as { packages: Record<string, unknown> };
    expect(lock.packages[`node_modules/${name}`]).toMatchObject({ version });
  });
});

describe('resistorBands beside resistor-data 1.1.1', () => {
  it('agrees on every whole E24, E48, E96 and E192 value from 10 Ω to 988 MΩ', () => {
    const differing = cases.filter(({ ohms, percent }) => {
      const ours = coloursOf(ohms, percent);
      const notation = library.valueToNotation(ohms);
      return library.notationToBands([notation, percent], ours.length).join() !== ours.join();
    });
    // In the cut-down values the package is wrong: it takes 4.02 kΩ for 4019 Ω.
    expect(new Set(differing.map(({ ohms }) => ohms))).toEqual(cutDown);
    expect(cases).toHaveLength(2 * 192 + 5 * (192 + 7 * 192));
  });

  it('is read by it as it was meant', () => {
    const differing = cases.filter(({ ohms, percent }) => {
      const ours = coloursOf(ohms, percent);
      const [notation, said] = library.bandsToNotation(ours, ours.length);
      return notation !== library.valueToNotation(ohms) || said !== percent;
    });
    expect(differing).toEqual([]);
  });

  it('cuts down only values whose product falls short of a whole number', () => {
    expect(cutDown.size).toBeLessThan(threeFigures.length / 50);
    for (const ohms of cutDown) {
      expect(library.notationToValue(library.valueToNotation(ohms))).toBe(ohms - 1);
    }
  });

  it('differs where the package stands before the 2016 table, or beside it', () => {
    const ending = (colour: string) =>
      library.bandsToNotation(['brown', 'black', 'black', 'red', colour], 5)[1];
    // resistor_colour_code.csv, IEC 60062:2016 by way of secondary sources, is the judge.
    expect([ending('grey'), ending('yellow'), ending('orange')]).toEqual([0.05, 5, undefined]);
    const read = (colour: 'grey' | 'yellow' | 'orange') =>
      readResistorBands(['brown', 'black', 'black', 'red', colour])?.tolerance;
    expect([read('grey'), read('yellow'), read('orange')]).toEqual([0.0001, 0.0002, 0.0005]);
    expect(() => library.bandsToNotation(['brown', 'black', 'pink', 'gold'], 4)).toThrow('pink');
    expect(readResistorBands(['brown', 'black', 'pink', 'gold'])?.ohms).toBe(0.01);
  });

  it('differs on tenths of an ohm, which the package drops', () => {
    expect(library.bandsToNotation(['red', 'red', 'gold', 'gold'], 4)[0]).toBe('2200undefined');
    expect(readResistorBands(['red', 'red', 'gold', 'gold'])?.ohms).toBe(2.2);
  });
});

describe('ohmCode beside resistor-data 1.1.1', () => {
  it('is read by it as the same value, and written in the same digits', () => {
    const differing = threeFigures.filter((ohms) => {
      const ours = ohmCode(ohms) ?? '';
      // The package writes a small m for mega, no R after whole ohms, and no zero to fill up.
      const theirs = ours
        .replace('R', '')
        .toLowerCase()
        .replace(/([km])0$/, '$1');
      return library.notationToValue(ours) !== ohms || library.valueToNotation(ohms) !== theirs;
    });
    expect(new Set(differing)).toEqual(cutDown);
  });
});

const numbers = [1, 2.2, 4.7, 8.06, 10, 49.9, 68, 100, 249, 887, 0.47, 0.082];

describe('typed values beside js-quantities 1.8.0', () => {
  const read = (text: string, kind: string) => {
    const found = quantities.parse(text);
    return found?.kind() === kind ? found.baseScalar : NaN;
  };

  it.each(['Ω', 'kΩ', 'mohm', 'ohm', 'kohm', 'Mohm', 'Gohm'])('means the same by %s', (unit) => {
    for (const number of numbers) {
      const ohms = read(`${number} ${unit}`, 'resistance');
      expect((readTypedOhms(`${number} ${unit}`) ?? 0) / ohms).toBeCloseTo(1, 12);
      expect((readTypedOhms(`${number}${unit}`) ?? 0) / ohms).toBeCloseTo(1, 12);
    }
  });

  it('knows prefixes before the sign Ω that the package takes for other units', () => {
    // Prefixes go before any unit (SI brochure, from memory); the package finds no resistance here.
    for (const [sign, word] of [
      ['mΩ', 'mohm'],
      ['MΩ', 'Mohm'],
      ['GΩ', 'Gohm'],
    ]) {
      expect(read(`4.7 ${sign}`, 'resistance')).toBeNaN();
      expect(readTypedOhms(`4.7 ${sign}`)).toBe(readTypedOhms(`4.7 ${word}`));
    }
  });

  it.each(['pF', 'nF', 'uF', 'µF', 'mF', 'F', 'farad'])('means the same by %s', (unit) => {
    for (const number of numbers) {
      const farads = read(`${number} ${unit}`, 'capacitance');
      expect((readTypedFarads(`${number} ${unit}`) ?? 0) / farads).toBeCloseTo(1, 12);
    }
  });

  it.each([
    ['ohm', 'resistance'],
    ['F', 'capacitance'],
    ['Hz', 'frequency'],
    ['V', 'potential'],
    ['A', 'current'],
    ['s', 'time'],
  ])('reads back what formatSi writes in %s, for every decade', (unit, kind) => {
    for (let exponent = -15; exponent <= 14; exponent++) {
      for (const value of preferredBetween(1, 9.99, 'E192')) {
        const scaled = Number(`${value}e${exponent}`);
        const text = formatSi(scaled, unit, 3).replace('\u202f', ' ');
        expect(read(text, kind) / scaled).toBeCloseTo(1, 9);
      }
    }
  });
});
