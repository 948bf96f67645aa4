import type { RankedPack } from '../engine/search/find-packs.ts';
import type { SearchBrief, StockedResistor } from '../engine/search/shelf.ts';
import { widenedResistor, widestKelvin } from '../engine/search/guaranteed-band.ts';
import { percent } from './wording.ts';

export interface SpreadCause {
  role: string;
  label: string;
  /** Half-width of this cause alone, as a fraction of the rate. */
  fraction: number;
}

/**
 * What each cause alone may move the rate by, largest first: tolerance and drift times sensitivity
 * (model section 5) for the passive parts; what the guaranteed band has beyond those is the
 * comparator, the supply and the load.
 */
export function spreadCauses(pack: RankedPack, brief: SearchBrief): SpreadCause[] {
  const kelvin = widestKelvin(brief);
  const { r1, r2, r3 } = pack.frame.thresholds;
  const x1 = r1.ohms / (r1.ohms + r3.ohms);
  const x2 = r2.ohms / (r2.ohms + r3.ohms);
  const log = Math.log((1 + r1.ohms / r3.ohms) * (1 + r2.ohms / r3.ohms));
  const thresholds =
    (x1 * widenedResistor(r1, kelvin) +
      x2 * widenedResistor(r2, kelvin) +
      (x1 + x2) * widenedResistor(r3, kelvin)) /
    log;
  const capacitor = pack.frame.capacitor;
  const capacitance =
    capacitor.tolerance +
    Math.abs(capacitor.temperatureCoefficientPerKelvin) * kelvin +
    capacitor.temperatureSpread;
  const timing = timingFraction(pack, kelvin);
  const whole = Math.log(pack.guaranteed.maxHz / Math.max(pack.guaranteed.minHz, 1e-300)) / 2;
  const rest = Math.max(0, whole - thresholds - capacitance - timing);
  const causes = [
    { role: 'C1', label: 'Capacitor C1', fraction: capacitance },
    { role: pack.second === null ? 'R4' : 'R4A', label: 'Timing resistor R4', fraction: timing },
    { role: 'R1', label: 'Thresholds R1–R3', fraction: thresholds },
    { role: 'U1', label: 'Comparator, supply and load', fraction: rest },
  ];
  return causes.sort((a, b) => b.fraction - a.fraction);
}

/** Tolerance of a composite: each part's own, weighted by its share of the whole. */
function timingFraction(pack: RankedPack, kelvin: number): number {
  if (pack.second === null) return widenedResistor(pack.first, kelvin);
  const share = (part: StockedResistor) =>
    pack.join === 'parallel' ? pack.timingOhms / part.ohms : part.ohms / pack.timingOhms;
  return (
    share(pack.first) * widenedResistor(pack.first, kelvin) +
    share(pack.second) * widenedResistor(pack.second, kelvin)
  );
}

/** The conclusion, said before the picture. */
export function causesSentence(causes: readonly SpreadCause[]): string {
  const sum = causes.reduce((total, cause) => total + cause.fraction, 0);
  const [first] = causes;
  if (!first || sum === 0) return 'Nothing spreads this pack.';
  const names: Record<string, string> = {
    C1: 'The capacitor makes',
    R4: 'The timing resistor makes',
    R4A: 'The timing resistors make',
    R1: 'The threshold resistors make',
    U1: 'The comparator and its supply make',
  };
  return `${names[first.role] ?? first.label} ${percent(first.fraction / sum, 2)} of the spread.`;
}
