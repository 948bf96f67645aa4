import type { Circuit, IndicatorLoad } from './circuit.ts';

export type OutputState = 'high' | 'low';

/** A voltage source behind a resistance. */
export interface TheveninSource {
  volts: number;
  ohms: number;
}

/**
 * What the output node and the reference node look like in one state. With the timing branch
 * taking i out of the output, Vo = openVolts − ohms·i and Vp = feedback·Vo + bias.
 */
export interface ReducedState {
  openVolts: number;
  ohms: number;
  feedback: number;
  biasVolts: number;
}

/**
 * The comparator's output in one state together with pull-up and indicator, as one source.
 * Push-pull: (V_OH, R_OH) or (V_OL, R_OL), in parallel with the pull-up when it has resistance.
 * Open drain: (V+, pull-up) when high; when low (V_OL, R_OL) in parallel with the pull-up, or V_OL
 * alone when R_OL is 0. An indicator that no spare section drives joins the high state; see
 * `withIndicator`.
 */
export function outputSource(circuit: Circuit, state: OutputState): TheveninSource {
  const { comparator, supplyVolts, load } = circuit;
  const pullUp =
    comparator.pullUpOhms === null ? null : { volts: supplyVolts, ohms: comparator.pullUpOhms };
  if (state === 'low') {
    return inParallel({ volts: comparator.lowVolts, ohms: comparator.lowOhms }, pullUp);
  }
  const stage = { volts: comparator.highVolts ?? supplyVolts, ohms: comparator.highOhms };
  const openDrain = comparator.output === 'open-drain' && pullUp !== null;
  const driven = openDrain ? pullUp : inParallel(stage, pullUp);
  return load && load.buffered !== true ? withIndicator(driven, load) : driven;
}

/** Two sources on one node. A source without resistance holds the node alone. */
function inParallel(first: TheveninSource, second: TheveninSource | null): TheveninSource {
  if (second === null || first.ohms === 0) return first;
  const siemens = 1 / first.ohms + 1 / second.ohms;
  return {
    volts: (first.volts / first.ohms + second.volts / second.ohms) / siemens,
    ohms: 1 / siemens,
  };
}

/**
 * The source with the indicator's constant drop and series resistance across it; unchanged when
 * the source does not exceed the drop. Neglects the curvature of the indicator, and that a heavy
 * R3 or timing branch could pull a barely conducting indicator back out of conduction.
 */
function withIndicator(source: TheveninSource, load: IndicatorLoad): TheveninSource {
  if (source.volts <= load.volts) return source;
  return inParallel(source, load);
}

/**
 * Reduces one state to what the timing branch and the reference node see; exact for linear parts.
 * R1–R3 are in ohms at the circuit's temperature.
 */
export function reduceState(
  circuit: Circuit,
  state: OutputState,
  r1Ohms: number,
  r2Ohms: number,
  r3Ohms: number,
): ReducedState {
  const source = outputSource(circuit, state);
  const r12 = (r1Ohms * r2Ohms) / (r1Ohms + r2Ohms);
  const dividerVolts =
    (circuit.supplyVolts * r2Ohms) / (r1Ohms + r2Ohms) -
    circuit.comparator.nonInvertingBiasAmps * r12;
  const siemens = 1 / (r3Ohms + r12);
  const loading = 1 + source.ohms * siemens;
  return {
    openVolts: (source.volts + source.ohms * siemens * dividerVolts) / loading,
    ohms: source.ohms / loading,
    feedback: r12 / (r12 + r3Ohms),
    biasVolts: (dividerVolts * r3Ohms) / (r12 + r3Ohms),
  };
}
