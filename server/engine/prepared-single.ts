import { checkCircuit } from './check-circuit.ts';
import type { Circuit } from './circuit.ts';
import { reduceState, type OutputState } from './output-stage.ts';
import { temperatureFactors } from './warm-circuit.ts';

/**
 * All of a single-resistor circuit that does not depend on the timing resistor or the capacitance,
 * reduced to plain numbers at the circuit's temperature. Treat as opaque; only `setThresholds` writes
 * to it.
 */
export interface PreparedSingle {
  farads: number;
  timingFactor: number;
  capacitorFactor: number;
  leakageSiemens: number;
  /** Input bias and the capacitor's leakage current. */
  drainAmps: number;
  /** Input bias alone. */
  inputAmps: number;
  highOpenVolts: number;
  highOhms: number;
  highFeedback: number;
  highBiasVolts: number;
  lowOpenVolts: number;
  lowOhms: number;
  lowFeedback: number;
  lowBiasVolts: number;
  delayLowHighSeconds: number;
  delayHighLowSeconds: number;
}

/**
 * Prepares a circuit with a single timing resistor and a constant capacitance for many quick
 * `periodAt` calls. The circuit's own timing resistance is not used. Throws a `RangeError` on
 * impossible numbers, steered timing, a capacitance that depends on voltage, or a temperature at
 * which a coefficient makes a value negative: those need `analyseCycle`.
 */
export function prepareSingle(circuit: Circuit): PreparedSingle {
  checkCircuit(circuit);
  return prepareChecked(circuit);
}

/** As `prepareSingle` for a circuit whose numbers are known to be possible: thirty times quicker. */
export function prepareChecked(circuit: Circuit): PreparedSingle {
  const { timing, capacitor, comparator } = circuit;
  if (timing.kind !== 'single') throw new RangeError('Only a single timing resistor is prepared.');
  if (capacitor.biasHalvingVolts !== null || capacitor.biasCurve) {
    throw new RangeError('Only a capacitance that does not depend on voltage is prepared.');
  }
  const factors = temperatureFactors(circuit);
  if (!(factors.thresholds > 0 && factors.timing > 0 && factors.capacitor > 0)) {
    throw new RangeError(`A value would be negative at ${circuit.celsius} °C.`);
  }
  const prepared: PreparedSingle = {
    farads: capacitor.farads,
    timingFactor: factors.timing,
    capacitorFactor: factors.capacitor,
    leakageSiemens: capacitor.leakageOhms === null ? 0 : 1 / capacitor.leakageOhms,
    drainAmps: comparator.invertingBiasAmps + capacitor.leakageAmps,
    inputAmps: comparator.invertingBiasAmps,
    highOpenVolts: 0,
    highOhms: 0,
    highFeedback: 0,
    highBiasVolts: 0,
    lowOpenVolts: 0,
    lowOhms: 0,
    lowFeedback: 0,
    lowBiasVolts: 0,
    delayLowHighSeconds: comparator.delayLowHighSeconds,
    delayHighLowSeconds: comparator.delayHighLowSeconds,
  };
  setThresholds(prepared, circuit, 1, 1, 1);
  return prepared;
}

/**
 * Rewrites `prepared` for R1 to R3 multiplied by the given factors (above 0); `circuit` must be the
 * one it was prepared from. For kits that differ by their tolerances.
 */
export function setThresholds(
  prepared: PreparedSingle,
  circuit: Circuit,
  r1Factor: number,
  r2Factor: number,
  r3Factor: number,
): void {
  const { thresholds } = temperatureFactors(circuit);
  const reduce = (state: OutputState) =>
    reduceState(
      circuit,
      state,
      circuit.r1Ohms * thresholds * r1Factor,
      circuit.r2Ohms * thresholds * r2Factor,
      circuit.r3Ohms * thresholds * r3Factor,
    );
  const high = reduce('high');
  const low = reduce('low');
  const { offsetVolts, hysteresisVolts } = circuit.comparator;
  prepared.highOpenVolts = high.openVolts;
  prepared.highOhms = high.ohms;
  prepared.highFeedback = high.feedback;
  prepared.highBiasVolts = high.biasVolts + offsetVolts + hysteresisVolts / 2;
  prepared.lowOpenVolts = low.openVolts;
  prepared.lowOhms = low.ohms;
  prepared.lowFeedback = low.feedback;
  prepared.lowBiasVolts = low.biasVolts + offsetVolts - hysteresisVolts / 2;
}

/** High and low time between output edges; both NaN where the circuit cannot oscillate. */
export interface Split {
  highSeconds: number;
  lowSeconds: number;
}

const scratch: Split = { highSeconds: NaN, lowSeconds: NaN };

/**
 * The settled period in seconds with timing resistance `timingOhms` and capacitance `farads` (both
 * at the reference temperature; the prepared capacitance when left out), or NaN when the circuit
 * cannot oscillate or a value is not positive. Allocates nothing. Agrees with `analyseCycle` to
 * rounding. Pass a capacitance only where leakage is the same as in the prepared circuit.
 */
export function periodAt(
  prepared: PreparedSingle,
  timingOhms: number,
  farads: number = prepared.farads,
): number {
  splitAt(prepared, timingOhms, farads, scratch);
  return scratch.highSeconds + scratch.lowSeconds;
}

/** As `periodAt`, writing the high and the low time into `into`, for those who need the duty. */
export function splitAt(
  prepared: PreparedSingle,
  timingOhms: number,
  farads: number,
  into: Split,
): void {
  const { timingFactor, capacitorFactor, leakageSiemens, drainAmps } = prepared;
  split(
    prepared,
    timingOhms * timingFactor,
    farads * capacitorFactor,
    leakageSiemens,
    drainAmps,
    into,
  );
}

/**
 * The settled period in seconds of a prepared circuit with another capacitor: `timingOhms` and
 * `farads` as they are at the circuit's temperature, the capacitor's own leakage as a conductance
 * and as a current. What the prepared circuit says of its own capacitor is not used. NaN as in
 * `periodAt`. Allocates nothing.
 */
export function periodWith(
  prepared: PreparedSingle,
  timingOhms: number,
  farads: number,
  leakageSiemens: number,
  leakageAmps: number,
): number {
  const drain = prepared.inputAmps + leakageAmps;
  split(prepared, timingOhms, farads, leakageSiemens, drain, scratch);
  return scratch.highSeconds + scratch.lowSeconds;
}

function split(
  p: PreparedSingle,
  ohms: number,
  capacitance: number,
  leakageSiemens: number,
  drainAmps: number,
  into: Split,
): void {
  into.highSeconds = NaN;
  into.lowSeconds = NaN;
  if (!(ohms > 0 && capacitance > 0)) return;
  const highBranch = ohms + p.highOhms;
  const lowBranch = ohms + p.lowOhms;
  const highTrip =
    (p.highBiasVolts + (p.highFeedback * p.highOpenVolts * ohms) / highBranch) /
    (1 - (p.highFeedback * p.highOhms) / highBranch);
  const lowTrip =
    (p.lowBiasVolts + (p.lowFeedback * p.lowOpenVolts * ohms) / lowBranch) /
    (1 - (p.lowFeedback * p.lowOhms) / lowBranch);
  if (!(highTrip > 0 && highTrip > lowTrip)) return;
  const highDrain = 1 / (1 / highBranch + leakageSiemens);
  const lowDrain = 1 / (1 / lowBranch + leakageSiemens);
  const highEnd = highDrain * (p.highOpenVolts / highBranch - drainAmps);
  const lowEnd = lowDrain * (p.lowOpenVolts / lowBranch - drainAmps);
  if (!(highEnd > highTrip && lowEnd < lowTrip)) return;
  const highTau = highDrain * capacitance;
  const lowTau = lowDrain * capacitance;
  const { delayLowHighSeconds: rise, delayHighLowSeconds: fall } = p;
  const peak = fall === 0 ? highTrip : highEnd - (highEnd - highTrip) * Math.exp(-fall / highTau);
  const valley = rise === 0 ? lowTrip : lowEnd - (lowEnd - lowTrip) * Math.exp(-rise / lowTau);
  into.highSeconds = highTau * Math.log((highEnd - valley) / (highEnd - highTrip)) + fall;
  into.lowSeconds = lowTau * Math.log((lowEnd - peak) / (lowEnd - lowTrip)) + rise;
}
