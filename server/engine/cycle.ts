import type { Circuit } from './circuit.ts';
import { reduceState } from './output-stage.ts';
import { singleBranch } from './single-branch.ts';
import type { StateBranch } from './state-branch.ts';
import { steeredBranch } from './steered-branch.ts';
import { warmCircuit, type WarmCircuit } from './warm-circuit.ts';

/** A settled cycle. High and low times run between output edges. */
export interface Cycle {
  kind: 'oscillates';
  frequencyHz: number;
  periodSeconds: number;
  highSeconds: number;
  lowSeconds: number;
  /** High share of the period, 0…1. */
  duty: number;
  /** First high time after power-up from an empty capacitor with the output already high. */
  firstHighSeconds: number;
  firstCycleSeconds: number;
  thresholdLowVolts: number;
  thresholdHighVolts: number;
  /** Highest and lowest capacitor voltage, beyond the thresholds by what the delays let pass. */
  peakVolts: number;
  valleyVolts: number;
  /** Time constants, or null when the run is not one exponential. */
  tauHighSeconds: number | null;
  tauLowSeconds: number | null;
  /**
   * Least voltage left across a steering branch at a trip, less what the reversed diode's current
   * drops across its own resistor, in units of n·V_t; null when not steered. Under 5 the result is more than about 1e-5 off, and very sensitive to the diode.
   */
  steeringHeadroom: number | null;
}

export type NoOscillationCode =
  | 'threshold-not-positive'
  | 'thresholds-inverted'
  | 'stuck-high'
  | 'stuck-low'
  | 'outside-temperature-range'
  | 'beyond-numbers';

/** Why a circuit does not oscillate; `reason` is a sentence or two that says what to change. */
export interface NoOscillation {
  kind: 'no-oscillation';
  code: NoOscillationCode;
  reason: string;
}

/** A cycle with the two states it was made from, for those who draw or integrate it. */
export interface SolvedCircuit {
  kind: 'solved';
  cycle: Cycle;
  high: StateBranch;
  low: StateBranch;
}

/**
 * The settled cycle of a circuit, or why it has none. Throws a `RangeError` on numbers no circuit
 * can have. Source: the circuit's own differential equation, solved exactly state by state.
 * Neglects overdrive-dependent delay, slewing, input capacitance, the common-mode range, diode
 * capacitance and series resistance, and a supply that rises slowly.
 */
export function analyseCycle(circuit: Circuit): Cycle | NoOscillation {
  const solved = solveCircuit(circuit);
  return solved.kind === 'solved' ? solved.cycle : solved;
}

/** As `analyseCycle`, with the two states beside the cycle. */
export function solveCircuit(circuit: Circuit): SolvedCircuit | NoOscillation {
  const warm = warmCircuit(circuit);
  if (warm === null) {
    return refuse(
      'outside-temperature-range',
      `At ${circuit.celsius} °C a temperature coefficient would make a part's value negative. ` +
        'Give a temperature nearer the reference, or a smaller coefficient.',
    );
  }
  const high = branchOf(warm, 1);
  const low = branchOf(warm, -1);
  const refusal = refusalOf(high, low);
  if (refusal) return refusal;
  const cycle = cycleOf(warm, high, low);
  return Number.isFinite(cycle.frequencyHz) && cycle.frequencyHz > 0
    ? { kind: 'solved', cycle, high, low }
    : refuse(
        'beyond-numbers',
        'The period is too short or too long to calculate. Choose a resistance and a capacitance ' +
          'nearer to what is made.',
      );
}

function branchOf(warm: WarmCircuit, sign: 1 | -1): StateBranch {
  const { circuit, r1Ohms, r2Ohms, r3Ohms, diode } = warm;
  const reduced = reduceState(circuit, sign > 0 ? 'high' : 'low', r1Ohms, r2Ohms, r3Ohms);
  return diode === null
    ? singleBranch(warm, reduced, sign)
    : steeredBranch(warm, diode, reduced, sign);
}

function cycleOf(warm: WarmCircuit, high: StateBranch, low: StateBranch): Cycle {
  const { delayLowHighSeconds, delayHighLowSeconds } = warm.circuit.comparator;
  const peakVolts = high.voltsAfter(high.tripVolts, delayHighLowSeconds);
  const valleyVolts = low.voltsAfter(low.tripVolts, delayLowHighSeconds);
  const highSeconds = high.secondsBetween(valleyVolts, high.tripVolts) + delayHighLowSeconds;
  const lowSeconds = low.secondsBetween(peakVolts, low.tripVolts) + delayLowHighSeconds;
  const firstHighSeconds = high.secondsBetween(0, high.tripVolts) + delayHighLowSeconds;
  const periodSeconds = highSeconds + lowSeconds;
  return {
    kind: 'oscillates',
    frequencyHz: 1 / periodSeconds,
    periodSeconds,
    highSeconds,
    lowSeconds,
    duty: highSeconds / periodSeconds,
    firstHighSeconds,
    firstCycleSeconds: firstHighSeconds + lowSeconds,
    thresholdLowVolts: low.tripVolts,
    thresholdHighVolts: high.tripVolts,
    peakVolts,
    valleyVolts,
    tauHighSeconds: high.tauSeconds,
    tauLowSeconds: low.tauSeconds,
    steeringHeadroom:
      high.headroom === null || low.headroom === null
        ? null
        : Math.min(high.headroom, low.headroom),
  };
}

function refusalOf(high: StateBranch, low: StateBranch): NoOscillation | null {
  if (high.tripVolts <= 0) {
    return refuse(
      'threshold-not-positive',
      `The upper threshold is ${volts(high.tripVolts)}, so an empty capacitor is already above it ` +
        'and the output stays low. Lower R1 or raise R2, or choose a smaller offset.',
    );
  }
  if (high.tripVolts <= low.tripVolts) {
    return refuse(
      'thresholds-inverted',
      `The upper threshold (${volts(high.tripVolts)}) is not above the lower ` +
        `(${volts(low.tripVolts)}). Lower R3, or choose an output that swings further.`,
    );
  }
  if (!high.reachesTrip) return stuck('stuck-high', high);
  if (!low.reachesTrip) return stuck('stuck-low', low);
  return null;
}

function stuck(code: 'stuck-high' | 'stuck-low', branch: StateBranch): NoOscillation {
  const [side, stays] = code === 'stuck-high' ? ['upper', 'high'] : ['lower', 'low'];
  if (branch.headroom !== null) {
    return refuse(
      code,
      `The steering diode leaves no current to carry the capacitor past the ${side} threshold, ` +
        `so the output stays ${stays}. Raise the supply, lower the steering resistor, or choose ` +
        'a comparator with less input bias.',
    );
  }
  return refuse(
    code,
    `The capacitor settles at ${volts(branch.settlingVolts)} and never crosses the ${side} ` +
      `threshold of ${volts(branch.tripVolts)}, so the output stays ${stays}. Lower R4, or choose ` +
      'less input bias, less leakage, or an output that swings closer to the rails.',
  );
}

function volts(value: number): string {
  return `${Number(value.toPrecision(4))} V`;
}

function refuse(code: NoOscillationCode, reason: string): NoOscillation {
  return { kind: 'no-oscillation', code, reason };
}
