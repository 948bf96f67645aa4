import { decimalFigures, fromDecimal } from './decimal-figures.ts';

export type BandColour =
  | 'pink'
  | 'silver'
  | 'gold'
  | 'black'
  | 'brown'
  | 'red'
  | 'orange'
  | 'yellow'
  | 'green'
  | 'blue'
  | 'violet'
  | 'grey'
  | 'white';

interface ColourMeaning {
  colour: BandColour;
  multiplierExponent: number;
  tolerance: number | null;
  partsPerMillionPerKelvin: number | null;
}

/** IEC 60062:2016, clauses 3.2 to 3.4; a colour's digit is its multiplier's exponent from 0 up. */
const meanings: readonly ColourMeaning[] = [
  meaning('pink', -3, null, null),
  meaning('silver', -2, 0.1, null),
  meaning('gold', -1, 0.05, null),
  meaning('black', 0, null, 250),
  meaning('brown', 1, 0.01, 100),
  meaning('red', 2, 0.02, 50),
  meaning('orange', 3, 0.0005, 15),
  meaning('yellow', 4, 0.0002, 25),
  meaning('green', 5, 0.005, 20),
  meaning('blue', 6, 0.0025, 10),
  meaning('violet', 7, 0.001, 5),
  meaning('grey', 8, 0.0001, 1),
  meaning('white', 9, null, null),
];

/** What grey meant as a tolerance before the 2016 edition. */
const olderGreyTolerance = 0.0005;
const toleranceWithoutBand = 0.2;

function meaning(
  colour: BandColour,
  multiplierExponent: number,
  tolerance: number | null,
  partsPerMillionPerKelvin: number | null,
): ColourMeaning {
  return { colour, multiplierExponent, tolerance, partsPerMillionPerKelvin };
}

export type BandCode =
  { kind: 'bands'; colours: BandColour[] } | { kind: 'uncodable'; reason: string };

/**
 * Colour bands in reading order for a resistance in ohms and a tolerance as a fraction, by IEC
 * 60062:2016: two figures for 5 % and wider, three for 2 % and tighter (and for a wider one that
 * needs three), no tolerance band for 20 %, one black band for a link of 0 Ω. A temperature
 * coefficient in parts per million per kelvin adds a sixth band. Uncodable when the value is not
 * positive and finite, needs more figures or another multiplier, when no colour stands for the
 * tolerance or the coefficient, or when it needs three figures at 20 %: without a tolerance band
 * those would be read as two figures with one.
 */
export function resistorBands(
  ohms: number,
  tolerance: number,
  partsPerMillionPerKelvin: number | null = null,
): BandCode {
  if (ohms === 0) return { kind: 'bands', colours: ['black'] };
  if (!(ohms > 0 && ohms < Infinity)) return uncodable('Bands say a resistance above zero only.');
  const wide = tolerance > 0.02 && partsPerMillionPerKelvin === null;
  const ways = (wide ? [2, 3] : [3]).map((count) => decimalFigures(ohms, count));
  const figures = ways.find((way) => way && multiplierOf(way.exponent)) ?? ways.at(-1);
  if (!figures) return uncodable('The value has more than three figures, which bands cannot say.');
  const multiplier = multiplierOf(figures.exponent);
  if (!multiplier) return uncodable('No colour stands for a multiplier as small or large as this.');
  const digits = [...String(figures.mantissa)].map(digitColour);
  const ending = endingBands(tolerance, partsPerMillionPerKelvin);
  if (ending === null) {
    return uncodable('No colour stands for this tolerance or temperature coefficient.');
  }
  if (ending.length === 0 && digits.length > 2) {
    return uncodable('Without a tolerance band, bands can say two figures only.');
  }
  return { kind: 'bands', colours: [...digits, multiplier.colour, ...ending] };
}

function uncodable(reason: string): BandCode {
  return { kind: 'uncodable', reason };
}

function multiplierOf(exponent: number): ColourMeaning | undefined {
  return meanings.find((entry) => entry.multiplierExponent === exponent);
}

function digitColour(digit: string): BandColour {
  return multiplierOf(Number(digit))?.colour ?? 'black';
}

function endingBands(tolerance: number, coefficient: number | null): BandColour[] | null {
  const near = (one: number | null, other: number) =>
    one !== null && Math.abs(one - other) < 1e-9 * other;
  if (near(toleranceWithoutBand, tolerance)) return coefficient === null ? [] : null;
  const toleranceBand = meanings.find((entry) => near(entry.tolerance, tolerance));
  if (!toleranceBand) return null;
  if (coefficient === null) return [toleranceBand.colour];
  const last = meanings.find((entry) => near(entry.partsPerMillionPerKelvin, coefficient));
  return last ? [toleranceBand.colour, last.colour] : null;
}

export interface BandReading {
  ohms: number;
  tolerance: number;
  /** What the same band said before the 2016 edition, where that differs (grey); else null. */
  olderTolerance: number | null;
  partsPerMillionPerKelvin: number | null;
}

/**
 * Reads one to six bands in order, or null when they are no code (a metallic or a leading black
 * digit, a colour that is no tolerance, too many or too few). Three and four bands have two figures, five and six have
 * three.
 */
export function readResistorBands(colours: readonly BandColour[]): BandReading | null {
  const found = colours.map((colour) => meanings.find((entry) => entry.colour === colour));
  if (colours.length === 1 && colours[0] === 'black') {
    return { ohms: 0, tolerance: 0, olderTolerance: null, partsPerMillionPerKelvin: null };
  }
  if (colours.length < 3 || colours.length > 6) return null;
  const figureCount = colours.length < 5 ? 2 : 3;
  const digits = found.slice(0, figureCount).map((entry) => entry?.multiplierExponent ?? -1);
  const [multiplier, tolerance, coefficient] = found.slice(figureCount);
  if (!multiplier || digits.some((digit) => digit < 0) || digits[0] === 0) return null;
  const toleranceValue =
    colours.length === 3 ? toleranceWithoutBand : (tolerance?.tolerance ?? null);
  const coefficientValue = coefficient?.partsPerMillionPerKelvin ?? null;
  if (toleranceValue === null || (coefficient && coefficientValue === null)) return null;
  return {
    ohms: fromDecimal(digits.join(''), multiplier.multiplierExponent),
    tolerance: toleranceValue,
    olderTolerance: tolerance?.colour === 'grey' ? olderGreyTolerance : null,
    partsPerMillionPerKelvin: coefficientValue,
  };
}
