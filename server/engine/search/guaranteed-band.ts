import type { Circuit } from '../circuit.ts';
import { periodAt, prepareSingle } from '../prepared-single.ts';
import { type Candidate } from './candidates.ts';
import { frameCircuit } from './frame.ts';
import { limits } from './rules.ts';
import type { SearchBrief, StockedResistor } from './shelf.ts';

/** The rates between which every kit of a pack stays. */
export interface GuaranteedBand {
  minHz: number;
  maxHz: number;
}

type Corner = 'slow' | 'fast';

const referenceCelsius = 25;

/** Largest distance of the ambient range from the reference temperature, in kelvin. */
export function widestKelvin(brief: SearchBrief): number {
  return Math.max(
    Math.abs(brief.minCelsius - referenceCelsius),
    Math.abs(brief.maxCelsius - referenceCelsius),
  );
}

/** Tolerance of a resistor widened by its drift over the ambient range, as a fraction. */
export function widenedResistor(part: StockedResistor, kelvin: number): number {
  return part.tolerance + Math.abs(part.temperatureCoefficientPerKelvin) * kelvin;
}

/**
 * The guaranteed band of a candidate: the slowest and fastest rate over the corners of tolerance,
 * drift over the ambient range, supply from empty to fresh, output resistance (half to twice the
 * typical), delay (half the typical to the maximum), bias and offset (none to the maximum, both
 * signs), LED voltage, and up to 5 pF of stray capacitance.
 *
 * The rate is monotone in each passive part (model section 6), so those stand at one corner each:
 * fastest at R1−, R2−, R3+, R4−, C−. The comparator's figures are not, so each corner takes the
 * extreme over the combinations, the undisturbed middle included (model section 8.5).
 * A corner that cannot oscillate gives 0 Hz at the slow end. Neglects ageing and dielectric absorption.
 */
export function guaranteedBand(candidate: Candidate, brief: SearchBrief): GuaranteedBand {
  let minHz = Number.POSITIVE_INFINITY;
  let maxHz = 0;
  for (const supplyVolts of distinct([brief.minSupplyVolts, brief.maxSupplyVolts])) {
    for (const forwardVolts of forwardVoltsOf(brief)) {
      for (const outputFactor of [0.5, 2]) {
        const shared = { supplyVolts, forwardVolts, outputFactor };
        minHz = Math.min(minHz, cornerHz(candidate, brief, 'slow', shared));
        maxHz = Math.max(maxHz, cornerHz(candidate, brief, 'fast', shared));
      }
    }
  }
  return { minHz, maxHz };
}

function distinct(values: number[]): number[] {
  return [...new Set(values)];
}

function forwardVoltsOf(brief: SearchBrief): (number | null)[] {
  if (brief.load === null) return [null];
  return distinct([brief.load.minForwardVolts, brief.load.maxForwardVolts]);
}

interface SharedConditions {
  supplyVolts: number;
  forwardVolts: number | null;
  outputFactor: number;
}

function cornerHz(
  candidate: Candidate,
  brief: SearchBrief,
  corner: Corner,
  shared: SharedConditions,
): number {
  const base = passiveCorner(candidate, brief, corner, shared);
  const timingOhms = base.timing.kind === 'single' ? base.timing.ohms : NaN;
  let extreme = corner === 'slow' ? Number.POSITIVE_INFINITY : 0;
  for (const circuit of comparatorCorners(base, candidate, corner)) {
    const period = periodAt(prepareSingle(circuit), timingOhms);
    const hertz = period > 0 ? 1 / period : 0;
    extreme = corner === 'slow' ? Math.min(extreme, hertz) : Math.max(extreme, hertz);
  }
  return extreme;
}

/** A resistor at its corner: its tolerance holds at 25 °C, and it drifts from there. */
function resistorCorner(part: StockedResistor, kelvin: number, sign: number): number {
  const drift = Math.abs(part.temperatureCoefficientPerKelvin) * kelvin;
  return part.ohms * (1 + sign * part.tolerance) * (1 + sign * drift);
}

/** Timing resistance at its corner; two parts keep their own tolerances. */
function timingCorner(candidate: Candidate, kelvin: number, sign: number): number {
  const at = (part: StockedResistor) => resistorCorner(part, kelvin, sign);
  const first = at(candidate.first);
  if (candidate.second === null) return first;
  const second = at(candidate.second);
  return candidate.join === 'parallel' ? (first * second) / (first + second) : first + second;
}

function passiveCorner(
  candidate: Candidate,
  brief: SearchBrief,
  corner: Corner,
  shared: SharedConditions,
): Circuit {
  const { frame } = candidate;
  const sign = corner === 'slow' ? 1 : -1;
  const kelvin = widestKelvin(brief);
  const { r1, r2, r3 } = frame.thresholds;
  const part = frame.capacitor;
  const capacitorFactor =
    (1 + sign * part.tolerance) *
    (1 + sign * Math.abs(part.temperatureCoefficientPerKelvin) * kelvin) *
    (1 + sign * part.temperatureSpread);
  const circuit = frameCircuit(frame, brief, timingCorner(candidate, kelvin, sign));
  circuit.supplyVolts = shared.supplyVolts;
  circuit.r1Ohms = resistorCorner(r1, kelvin, sign);
  circuit.r2Ohms = resistorCorner(r2, kelvin, sign);
  circuit.r3Ohms = resistorCorner(r3, kelvin, -sign);
  circuit.capacitor.farads = part.farads * capacitorFactor + (sign > 0 ? limits.strayFarads : 0);
  circuit.comparator.highOhms *= shared.outputFactor;
  circuit.comparator.lowOhms *= shared.outputFactor;
  if (circuit.load && shared.forwardVolts !== null) {
    circuit.load = { volts: shared.forwardVolts, ohms: circuit.load.ohms };
  }
  return circuit;
}

/** The comparator's own figures: undisturbed when fast, at every signed maximum when slow, or the reverse. */
function comparatorCorners(base: Circuit, candidate: Candidate, corner: Corner): Circuit[] {
  const part = candidate.frame.comparator;
  const half = 0.5;
  const delays =
    corner === 'slow'
      ? { low: part.maxDelaySeconds, high: part.maxDelaySeconds }
      : { low: part.delayLowHighSeconds * half, high: part.delayHighLowSeconds * half };
  const pairs = [
    [0, 0],
    [1, 1],
    [1, -1],
    [-1, 1],
    [-1, -1],
  ] as const;
  return pairs.map(([offsetSign, biasSign]) => {
    const biasAmps = biasSign * part.maxInputBiasAmps;
    return {
      ...base,
      comparator: {
        ...base.comparator,
        offsetVolts: offsetSign * part.maxOffsetVolts,
        invertingBiasAmps: biasAmps,
        nonInvertingBiasAmps: biasSign === 0 ? 0 : biasAmps,
        delayLowHighSeconds: delays.low,
        delayHighLowSeconds: delays.high,
      },
    };
  });
}

/** The worse end of a band, as a fraction away from the target. */
export function worseEnd(band: GuaranteedBand, targetHz: number): number {
  return Math.max(Math.abs(band.maxHz / targetHz - 1), Math.abs(band.minHz / targetHz - 1));
}
