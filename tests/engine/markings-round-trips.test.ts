import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { capacitorCode, readCapacitorCode } from '../../server/engine/capacitor-code.ts';
import { chipCode, e96Code, readChipCode, readE96Code } from '../../server/engine/chip-code.ts';
import { preferredBetween, type ESeries } from '../../server/engine/e-series.ts';
import { faradCode, ohmCode, readFaradCode, readOhmCode } from '../../server/engine/letter-code.ts';
import { readResistorBands, resistorBands } from '../../server/engine/resistor-bands.ts';
import {
  readCapacitorToleranceLetter,
  type ToleranceSpread,
} from '../../server/engine/tolerance-letters.ts';

// E3, E6 and E12 lie within E24, E48 and E96 within E192: these two hold every series' values.
const families: readonly ESeries[] = ['E24', 'E192'];
const everyPreferred = (low: number, high: number) =>
  families.flatMap((series) => preferredBetween(low, high, series));

const bandTolerances = [0.2, 0.1, 0.05, 0.02, 0.01, 0.005, 0.0025, 0.001, 0.0005, 0.0002, 0.0001];
const letterTolerances = [0.3, ...bandTolerances];
const coefficients = [250, 100, 50, 25, 20, 15, 10, 5, 1];
const capacitorLetters = [...'BCDFGJKMNZSTQ'];

const decimal = (figures: number, leastExponent: number, greatestExponent: number) =>
  fc
    .tuple(
      fc.integer({ min: 10 ** (figures - 1), max: 10 ** figures - 1 }),
      fc.integer({ min: leastExponent, max: greatestExponent }),
    )
    .map(([mantissa, exponent]) => Number(`${mantissa}e${exponent}`));

/** What the bands say that were coded, or why there are none. */
function bandsBack(ohms: number, tolerance: number, coefficient: number | null = null) {
  const code = resistorBands(ohms, tolerance, coefficient);
  if (code.kind === 'uncodable') return { reason: code.reason };
  const reading = readResistorBands(code.colours);
  return {
    ohms: reading?.ohms,
    tolerance: reading?.tolerance,
    partsPerMillionPerKelvin: reading?.partsPerMillionPerKelvin,
  };
}

describe('colour bands', () => {
  it('bring back every preferred value from 1 Ω to 9.88 GΩ with every tolerance', () => {
    const isCodable = (ohms: number, tolerance: number) =>
      tolerance < 0.2 || Number(ohms.toPrecision(2)) === ohms;
    const failures = everyPreferred(1, 9.9e9).flatMap((ohms) =>
      bandTolerances
        .filter((tolerance) => isCodable(ohms, tolerance))
        .filter((tolerance) => {
          const back = bandsBack(ohms, tolerance);
          return back.ohms !== ohms || back.tolerance !== tolerance;
        })
        .map((tolerance) => ({ ohms, tolerance })),
    );
    expect(failures).toEqual([]);
  });

  it('bring back any three figures, tolerance and temperature coefficient', () => {
    const tight = bandTolerances.filter((tolerance) => tolerance < 0.2);
    fc.assert(
      fc.property(
        decimal(3, -3, 9),
        fc.constantFrom(...tight),
        fc.constantFrom(null, ...coefficients),
        (ohms, tolerance, partsPerMillionPerKelvin) => {
          expect(bandsBack(ohms, tolerance, partsPerMillionPerKelvin)).toEqual({
            ohms,
            tolerance,
            partsPerMillionPerKelvin,
          });
        },
      ),
      { numRuns: 2000 },
    );
  });

  it('say nothing of any value with four figures', () => {
    fc.assert(
      fc.property(decimal(4, -6, 9), fc.constantFrom(...bandTolerances), (ohms, tolerance) => {
        fc.pre(Number(ohms.toPrecision(3)) !== ohms);
        expect(resistorBands(ohms, tolerance).kind).toBe('uncodable');
      }),
    );
  });
});

describe('letter-and-digit code', () => {
  it('brings back every preferred resistance from 1 mΩ to 988 GΩ with every tolerance', () => {
    const failures = everyPreferred(1e-3, 9.9e11).flatMap((ohms) =>
      [null, ...letterTolerances]
        .map((tolerance) => ({ value: ohms, tolerance }))
        .filter((said) => {
          const back = readOhmCode(ohmCode(said.value, said.tolerance) ?? '');
          return back?.value !== said.value || back.tolerance !== said.tolerance;
        }),
    );
    expect(failures).toEqual([]);
  });

  it('brings back every preferred capacitance from 0.001 pF to 988 F with every letter', () => {
    const failures = everyPreferred(1e-15, 990).filter((farads) => {
      const spreads = capacitorLetters.map((letter) =>
        readCapacitorToleranceLetter(letter, farads),
      );
      return [null, ...spreads].some(
        (spread) => !isFaithful(farads, spread, faradCode(farads, spread), readFaradCode),
      );
    });
    expect(failures).toEqual([]);
  });

  it('brings back anything of up to six figures', () => {
    fc.assert(
      fc.property(decimal(6, -8, 6), (value) => {
        expect(readOhmCode(ohmCode(value) ?? '')).toEqual({ value, tolerance: null });
      }),
      { numRuns: 2000 },
    );
    fc.assert(
      fc.property(decimal(6, -20, -3), (value) => {
        expect(readFaradCode(faradCode(value) ?? '')).toEqual({ value, tolerance: null });
      }),
      { numRuns: 2000 },
    );
  });
});

/** A letter that cannot be written at that value is allowed, a wrong reading is not. */
function isFaithful(
  farads: number,
  spread: ToleranceSpread | null,
  code: string | null,
  read: (code: string) => { tolerance: ToleranceSpread | null; value?: number } | null,
): boolean {
  if (code === null) return spread !== null && farads < 1e-11;
  const back = read(code);
  const isNear = (one = -1, other = -1) => Math.abs(one - other) <= 1e-9;
  return (
    back?.value === farads &&
    isNear(back.tolerance?.below, spread?.below) &&
    isNear(back.tolerance?.above, spread?.above)
  );
}

describe('the print of small capacitors', () => {
  it('brings back every two-figure preferred value from 0.1 pF to 910 µF with every letter', () => {
    const read = (code: string) => {
      const back = readCapacitorCode(code);
      return back && { value: back.farads, tolerance: back.tolerance };
    };
    const failures = preferredBetween(1e-13, 9.2e-4, 'E24').filter((farads) => {
      const spreads = capacitorLetters.map((letter) =>
        readCapacitorToleranceLetter(letter, farads),
      );
      return [null, ...spreads].some(
        (spread) => !isFaithful(farads, spread, capacitorCode(farads, spread), read),
      );
    });
    expect(failures).toEqual([]);
  });

  it('brings back any two figures, and says nothing of any three', () => {
    fc.assert(
      fc.property(decimal(2, -14, -5), (farads) => {
        expect(readCapacitorCode(capacitorCode(farads) ?? '')?.farads).toBe(farads);
      }),
    );
    fc.assert(
      fc.property(decimal(3, -15, -6), (farads) => {
        fc.pre(Number(farads.toPrecision(2)) !== farads);
        expect(capacitorCode(farads)).toBeNull();
      }),
    );
  });
});

describe('the print of chip resistors', () => {
  it('brings back every preferred value from 0.1 Ω up that its figures can say', () => {
    for (const [figures, series, high] of [
      [2, 'E24', 9.2e10],
      [3, 'E24', 9.2e11],
      [3, 'E192', 9.9e11],
    ] as const) {
      const failures = preferredBetween(0.1, high, series).filter(
        (ohms) => readChipCode(chipCode(ohms, figures) ?? '') !== ohms,
      );
      expect(failures).toEqual([]);
    }
  });

  it('brings back every E96 value from 0.1 Ω to 97.6 MΩ in the three-character code', () => {
    const values = preferredBetween(0.1, 97.7e6, 'E96');
    expect(values).toHaveLength(9 * 96);
    const failures = values.filter((ohms) => {
      const code = e96Code(ohms) ?? '';
      return readE96Code(code) !== ohms || readChipCode(code) !== ohms;
    });
    expect(failures).toEqual([]);
  });
});
