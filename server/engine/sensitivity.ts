import type { Circuit } from './circuit.ts';
import { kitRate, nominalKit, type KitFactors } from './kit-rate.ts';

/** Relative change of the rate per relative change of a part, d ln f / d ln x. */
export interface Sensitivities {
  method: 'closed' | 'differences';
  r1: number;
  r2: number;
  r3: number;
  /** The timing resistor; when steered, the charging one. */
  timing: number;
  /** The discharging resistor; 0 with a single timing resistor. */
  discharge: number;
  capacitor: number;
}

/** Step of the central differences in ln x: truncation and rounding are both near 1e-9 there. */
const step = 1e-4;

/**
 * Sensitivities of the rate at the nominal values. Closed form for the ideal circuit (single timing
 * resistor, rail to rail, no resistance, delay, bias, offset, hysteresis, leakage, constant
 * capacitance), else central differences of the full model with a step of 1e-4 in ln x. NaN where
 * the circuit does not oscillate at the nominal values or a step away.
 */
export function rateSensitivities(circuit: Circuit): Sensitivities {
  return isIdeal(circuit) ? closedSensitivities(circuit) : differenceSensitivities(circuit);
}

/** With xk = Rk/(Rk+R3) and L = ln[(1+R1/R3)(1+R2/R3)]: −x1/L, −x2/L, (x1+x2)/L, −1, −1. */
function closedSensitivities(circuit: Circuit): Sensitivities {
  const { r1Ohms, r2Ohms, r3Ohms } = circuit;
  const logarithm = Math.log1p(r1Ohms / r3Ohms) + Math.log1p(r2Ohms / r3Ohms);
  const r1 = -r1Ohms / (r1Ohms + r3Ohms) / logarithm;
  const r2 = -r2Ohms / (r2Ohms + r3Ohms) / logarithm;
  return { method: 'closed', r1, r2, r3: -(r1 + r2), timing: -1, discharge: 0, capacitor: -1 };
}

function differenceSensitivities(circuit: Circuit): Sensitivities {
  const rate = kitRate(circuit);
  const of = (part: keyof KitFactors) => {
    const above = rate({ ...nominalKit, [part]: Math.exp(step) });
    const below = rate({ ...nominalKit, [part]: Math.exp(-step) });
    return Math.log(above / below) / (2 * step);
  };
  return {
    method: 'differences',
    r1: of('r1'),
    r2: of('r2'),
    r3: of('r3'),
    timing: of('timing'),
    discharge: circuit.timing.kind === 'steered' ? of('discharge') : 0,
    capacitor: of('capacitor'),
  };
}

function isIdeal(circuit: Circuit): boolean {
  const { comparator, capacitor, supplyVolts } = circuit;
  const zero = [
    comparator.lowVolts,
    comparator.highOhms,
    comparator.lowOhms,
    comparator.delayLowHighSeconds,
    comparator.delayHighLowSeconds,
    comparator.invertingBiasAmps,
    comparator.nonInvertingBiasAmps,
    comparator.offsetVolts,
    comparator.hysteresisVolts,
    capacitor.leakageAmps,
    1 / (capacitor.leakageOhms ?? Infinity),
  ];
  return (
    circuit.timing.kind === 'single' &&
    comparator.output === 'push-pull' &&
    (comparator.highVolts ?? supplyVolts) === supplyVolts &&
    capacitor.biasHalvingVolts === null &&
    !capacitor.biasCurve &&
    zero.every((value) => value === 0)
  );
}
