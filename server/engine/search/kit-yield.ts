import { createRandom } from '../random.ts';
import { periodAt, prepareSingle } from '../prepared-single.ts';
import type { Candidate } from './candidates.ts';
import { frameCircuit } from './frame.ts';
import type { GuaranteedBand } from './guaranteed-band.ts';
import type { SearchBrief } from './shelf.ts';

/** Share of kits inside the asked band, with the standard error of the estimate. */
export interface KitYield {
  yieldWithinBand: number;
  yieldStandardError: number;
}

const samples = 8192;
const draws = 6;
const uniform = drawUniform();

/** Common random numbers for all packs, so that two packs differ by their parts and not by luck. */
function drawUniform(): Float64Array {
  const random = createRandom(20261201);
  return Float64Array.from({ length: samples * draws }, () => 2 * random() - 1);
}

/**
 * Share of kits that stay within ± band of the target over the whole ambient range and from the lowest
 * to the highest supply, from 8192 kits with uniform tolerances. Ideal-circuit scaling around the nominal rate of the full model,
 * f = f0 · (R4·C·L)nominal/(R4·C·L), L = ln[(1+R1/R3)(1+R2/R3)] (model section 6); each kit drifts
 * by the signed coefficients of its own R4 and C, and moves with the supply as the nominal circuit
 * does (none is inside when that stops at a supply end). Neglects the spread of the comparator, which the
 * guaranteed band holds. Exactly 1 where the guaranteed band lies inside the asked one.
 */
export function kitYield(
  candidate: Candidate,
  brief: SearchBrief,
  guaranteed: GuaranteedBand,
): KitYield {
  if (
    guaranteed.maxHz <= brief.targetHz * (1 + brief.band) &&
    guaranteed.minHz >= brief.targetHz * (1 - brief.band)
  ) {
    return { yieldWithinBand: 1, yieldStandardError: 0 };
  }
  const shifts = conditionShifts(candidate, brief);
  const share = 1 - kitsOutside(candidate, brief, shifts, samples, samples) / samples;
  return {
    yieldWithinBand: share,
    yieldStandardError: Math.sqrt((share * (1 - share)) / samples),
  };
}

/** Kits of a first, small lot; with more than `quickFailures` outside, a yield of 99 % is out of question. */
const quickSamples = 256;
const quickFailures = 16;

/**
 * Whether at least `share` (0.98…1) of kits hold the band, by the same kits as `kitYield`. Gives up early
 * when a first lot of 256 has more than 16 outside, which one in a million packs of 99 % would show.
 */
export function holdsBand(candidate: Candidate, brief: SearchBrief, share: number): boolean {
  return holdsUnder(candidate, brief, conditionShifts(candidate, brief), share);
}

/** As `holdsBand` at the nominal supply alone: a bound for what no comparator could better. */
export function holdsBandAtBest(candidate: Candidate, brief: SearchBrief, share: number): boolean {
  return holdsUnder(candidate, brief, driftLogs(candidate, brief), share);
}

function holdsUnder(
  candidate: Candidate,
  brief: SearchBrief,
  shifts: Shifts,
  share: number,
): boolean {
  const quick = kitsOutside(candidate, brief, shifts, quickSamples, quickFailures);
  if (quick > quickFailures) return false;
  const allowed = Math.floor((1 - share) * samples + 1e-9);
  return kitsOutside(candidate, brief, shifts, samples, allowed) <= allowed;
}

/** How far conditions move ln of the rate, at most upwards and at most downwards. */
interface Shifts {
  up: number;
  down: number;
}

/** Counts kits outside the band among the first `count`; stops once more than `enough` are. */
function kitsOutside(
  candidate: Candidate,
  brief: SearchBrief,
  shifts: Shifts,
  count: number,
  enough: number,
): number {
  const { r1, r2, r3 } = candidate.frame.thresholds;
  const capacitor = candidate.frame.capacitor;
  const upperLimit = Math.log(1 + brief.band) - shifts.up;
  const lowerLimit = Math.log(1 - brief.band) - shifts.down;
  const nominalLog = Math.log(candidate.frequencyHz / brief.targetHz);
  const base = Math.log((1 + r1.ohms / r3.ohms) * (1 + r2.ohms / r3.ohms));
  let outside = 0;
  for (let k = 0; k < count && outside <= enough; k += 1) {
    const at = k * draws;
    const third = r3.ohms * (1 + r3.tolerance * uniform[at + 2]!);
    const first = 1 + (r1.ohms * (1 + r1.tolerance * uniform[at]!)) / third;
    const second = 1 + (r2.ohms * (1 + r2.tolerance * uniform[at + 1]!)) / third;
    const timing = timingRatio(candidate, uniform[at + 3]!, uniform[at + 4]!);
    const capacitance = 1 + capacitor.tolerance * uniform[at + 5]!;
    const log = nominalLog - Math.log((timing * capacitance * Math.log(first * second)) / base);
    if (!(log <= upperLimit && log >= lowerLimit)) outside += 1;
  }
  return outside;
}

function timingRatio(candidate: Candidate, a: number, b: number): number {
  const first = candidate.first.ohms * (1 + candidate.first.tolerance * a);
  if (candidate.second === null) return first / candidate.timingOhms;
  const second = candidate.second.ohms * (1 + candidate.second.tolerance * b);
  const ohms = candidate.join === 'parallel' ? (first * second) / (first + second) : first + second;
  return ohms / candidate.timingOhms;
}

function conditionShifts(candidate: Candidate, brief: SearchBrief): Shifts {
  const drift = driftLogs(candidate, brief);
  const supply = supplyLogs(candidate, brief);
  return { up: drift.up + supply.up, down: drift.down + supply.down };
}

/** ln of the rate at either end of the supply over the nominal one; −∞ where the circuit stops. */
function supplyLogs({ frame, timingOhms }: Candidate, brief: SearchBrief): Shifts {
  const logAt = (supplyVolts: number) => {
    const circuit = frameCircuit(frame, { ...brief, supplyVolts });
    return -Math.log(periodAt(prepareSingle(circuit), timingOhms));
  };
  const nominal = logAt(brief.supplyVolts);
  const ends = [brief.minSupplyVolts, brief.maxSupplyVolts].map((volts) => logAt(volts) - nominal);
  if (ends.some(Number.isNaN)) return { up: 0, down: Number.NEGATIVE_INFINITY };
  return { up: Math.max(0, ...ends), down: Math.min(0, ...ends) };
}

/** ln of the rate at the hot and the cold end over the rate at 25 °C. */
function driftLogs(candidate: Candidate, brief: SearchBrief): Shifts {
  const resistor = candidate.first.temperatureCoefficientPerKelvin;
  const capacitor = candidate.frame.capacitor;
  const at = (celsius: number) =>
    -Math.log1p(resistor * (celsius - 25)) -
    Math.log1p(capacitor.temperatureCoefficientPerKelvin * (celsius - 25));
  const [hot, cold] = [at(brief.maxCelsius), at(brief.minCelsius)];
  return { up: Math.max(0, hot, cold), down: Math.min(0, hot, cold) };
}
