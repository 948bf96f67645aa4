/** What a tolerance allows below and above the nominal value, as fractions of it. */
export interface ToleranceSpread {
  below: number;
  above: number;
}

/** Symmetric tolerances of resistors, as fractions (IEC 60062:2016 clause 5). */
const resistorLetters = new Map([
  ['L', 0.0001],
  ['P', 0.0002],
  ['W', 0.0005],
  ['B', 0.001],
  ['C', 0.0025],
  ['D', 0.005],
  ['F', 0.01],
  ['G', 0.02],
  ['J', 0.05],
  ['K', 0.1],
  ['M', 0.2],
  ['N', 0.3],
]);
/** A said ±0.05 % before the 2016 edition: it is read and never written. */
const formerResistorLetters = new Map([['A', 0.0005]]);

/** Capacitors: plus and minus so many per cent from 10 pF up, so many picofarads below. */
const tightLetters = new Map([
  ['B', 0.1],
  ['C', 0.25],
  ['D', 0.5],
  ['F', 1],
  ['G', 2],
]);
/** Capacitors: per cent below and above. */
const wideLetters = new Map<string, readonly [number, number]>([
  ['J', [5, 5]],
  ['K', [10, 10]],
  ['M', [20, 20]],
  ['N', [30, 30]],
  ['Z', [20, 80]],
  ['S', [20, 50]],
  ['T', [10, 50]],
  ['Q', [10, 30]],
]);
const tightLimitFarads = 1e-11;

/**
 * The tolerance (a fraction, ±) that a letter stands for on a resistor, or null when it stands for
 * none. A is read as the ±0.05 % it meant before 2016. IEC 60062:2016 clause 5; L, P and W as in
 * its colour table.
 */
export function readResistorToleranceLetter(letter: string): number | null {
  return resistorLetters.get(letter) ?? formerResistorLetters.get(letter) ?? null;
}

/** The letter of a resistor's symmetric tolerance (a fraction), or null when none stands for it. */
export function resistorToleranceLetter(tolerance: number): string | null {
  const found = [...resistorLetters].find(([, value]) => isSame(value, tolerance));
  return found ? found[0] : null;
}

/**
 * What a letter allows on a capacitor of `farads`, as fractions. B, C, D, F and G count per cent
 * from 10 pF up and picofarads below; the others count per cent at any value, which under 10 pF is
 * common practice and not in the table. Null for a letter without a meaning, for P, L and W, on
 * which sources disagree for capacitors, and where the letter would let the value reach zero.
 * IEC 60062:2016 clause 5.
 */
export function readCapacitorToleranceLetter(
  letter: string,
  farads: number,
): ToleranceSpread | null {
  const tight = tightLetters.get(letter);
  if (tight !== undefined) {
    const fraction = isUnderTightLimit(farads) ? tight / (farads * 1e12) : tight / 100;
    return fraction > 0 && fraction < 1 - 1e-9 ? { below: fraction, above: fraction } : null;
  }
  const wide = wideLetters.get(letter);
  return wide ? { below: wide[0] / 100, above: wide[1] / 100 } : null;
}

/**
 * The letter of a capacitor's tolerance: one fraction for ±, or two where the ends differ. Under
 * 10 pF the tolerance must equal one of the picofarads that the letters count there. Null when no
 * letter stands for it.
 */
export function capacitorToleranceLetter(
  tolerance: number | ToleranceSpread,
  farads: number,
): string | null {
  const wanted = typeof tolerance === 'number' ? { below: tolerance, above: tolerance } : tolerance;
  const letters = [
    ...tightLetters.keys(),
    ...(isUnderTightLimit(farads) ? [] : wideLetters.keys()),
  ];
  const stands = (letter: string) => {
    const spread = readCapacitorToleranceLetter(letter, farads);
    return spread && isSame(spread.below, wanted.below) && isSame(spread.above, wanted.above);
  };
  return letters.find(stands) ?? null;
}

function isUnderTightLimit(farads: number): boolean {
  return farads < tightLimitFarads * (1 - 1e-9);
}

function isSame(one: number, other: number): boolean {
  return Math.abs(one - other) <= 1e-9 * one;
}
