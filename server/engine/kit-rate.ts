import type { Circuit } from './circuit.ts';
import { analyseCycle } from './cycle.ts';
import { periodAt, prepareSingle, setThresholds } from './prepared-single.ts';

/** How far the parts of one kit are from their nominal values, as factors (1 is nominal). */
export interface KitFactors {
  r1: number;
  r2: number;
  r3: number;
  /** The timing resistor; when steered, the charging one. */
  timing: number;
  /** The discharging resistor; unused with a single timing resistor. */
  discharge: number;
  capacitor: number;
}

export const nominalKit: Readonly<KitFactors> = {
  r1: 1,
  r2: 1,
  r3: 1,
  timing: 1,
  discharge: 1,
  capacitor: 1,
};

/**
 * The rate in hertz of kits of one circuit, by the full model; NaN for a kit that does not
 * oscillate. With a single timing resistor and a constant capacitance a call takes about a
 * microsecond. Throws a `RangeError` on impossible numbers in the circuit.
 */
export function kitRate(circuit: Circuit): (kit: Readonly<KitFactors>) => number {
  const { timing, capacitor } = circuit;
  const constant = capacitor.biasHalvingVolts === null && !capacitor.biasCurve;
  const nominal = analyseCycle(circuit);
  if (nominal.kind === 'no-oscillation' && nominal.code === 'outside-temperature-range') {
    return () => NaN;
  }
  if (timing.kind === 'steered' || !constant) return (kit) => fullRate(circuit, kit);
  const prepared = prepareSingle(circuit);
  return (kit) => {
    setThresholds(prepared, circuit, kit.r1, kit.r2, kit.r3);
    return 1 / periodAt(prepared, timing.ohms * kit.timing, capacitor.farads * kit.capacitor);
  };
}

function fullRate(circuit: Circuit, kit: Readonly<KitFactors>): number {
  const { timing, capacitor } = circuit;
  const cycle = analyseCycle({
    ...circuit,
    r1Ohms: circuit.r1Ohms * kit.r1,
    r2Ohms: circuit.r2Ohms * kit.r2,
    r3Ohms: circuit.r3Ohms * kit.r3,
    timing:
      timing.kind === 'single'
        ? { ...timing, ohms: timing.ohms * kit.timing }
        : {
            ...timing,
            chargeOhms: timing.chargeOhms * kit.timing,
            dischargeOhms: timing.dischargeOhms * kit.discharge,
          },
    capacitor: { ...capacitor, farads: capacitor.farads * kit.capacitor },
  });
  return cycle.kind === 'oscillates' ? cycle.frequencyHz : NaN;
}
