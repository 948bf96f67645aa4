import type { CauseWidth, SpreadCause } from '../engine/search/kit-causes.ts';
import type { CareLevel } from '../contracts/brief.ts';
import { percent } from './wording.ts';

export interface SpreadCauseLine {
  role: string;
  label: string;
  /** Half-width of this cause alone, as a fraction of the rate. */
  fraction: number;
}

const labels: Record<SpreadCause, [role: string, label: string, sentence: string]> = {
  capacitor: ['C1', 'Capacitor C1', 'The capacitor makes'],
  timing: ['R4', 'Timing resistor R4', 'The timing resistor makes'],
  thresholds: ['R1', 'Thresholds R1–R3', 'The threshold resistors make'],
  stray: ['C1', 'Stray capacitance', 'Stray capacitance makes'],
  comparator: ['U1', 'Comparator', 'The comparator makes'],
  load: ['LED', 'LED on the output', 'The LED makes'],
  temperature: ['°C', 'Temperature', 'Temperature makes'],
  supply: ['V+', 'Supply', 'The supply makes'],
};

/** A cause in the words of the care level: measured, the capacitor leaves but the meter's doubt. */
function labelOf(cause: SpreadCause, careLevel: CareLevel, isSteered: boolean): string {
  if (cause === 'capacitor' && careLevel === 'bench-tuned') return 'Meter and capacitor C1';
  if (cause === 'capacitor' && careLevel === 'lot-checked') return 'Capacitor C1 within its lots';
  if (cause === 'capacitor' && careLevel === 'trimmer-fitted') return 'Dielectric of C1';
  if (cause === 'timing' && careLevel === 'trimmer-fitted') return 'Setting of the trimmer';
  if (cause === 'timing' && careLevel === 'bench-tuned') return 'Timing resistor and its grid';
  if (cause === 'timing' && isSteered) return 'Steering resistors and diodes';
  return labels[cause][1];
}

/** The causes of a pack's spread with their names, in the order given. */
export function causeLines(
  causes: readonly CauseWidth[],
  careLevel: CareLevel,
  isSteered: boolean,
): SpreadCauseLine[] {
  return causes.map(({ cause, fraction }) => ({
    role: cause === 'timing' && isSteered ? 'RC' : labels[cause][0],
    label: labelOf(cause, careLevel, isSteered),
    fraction,
  }));
}

/** The conclusion, said before the picture. */
export function causesSentence(causes: readonly CauseWidth[]): string {
  const sum = causes.reduce((total, cause) => total + cause.fraction, 0);
  const [first] = causes;
  if (!first || sum === 0) return 'Nothing spreads this pack.';
  return `${labels[first.cause][2]} ${percent(first.fraction / sum, 2)} of the spread.`;
}
