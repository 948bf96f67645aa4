import type { BiasCurve, TimingCapacitor } from './circuit.ts';

/** Differential capacitance against bias, warmed to the circuit's temperature. */
export interface CapacitanceCurve {
  /** The capacitance when it does not depend on voltage, else null. */
  constantFarads: number | null;
  /** dQ/dV in farads at a bias of either sign. */
  faradsAt(volts: number): number;
  /** Voltages at which the curve has a corner. */
  cornerVolts: readonly number[];
}

/**
 * The capacitor's curve C(V) with its value at 0 V multiplied by `factor` (the temperature's).
 * C(V) = C / (1 + (V/v)²), or straight lines between tabulated fractions. The tabulated curve is
 * the differential capacitance dQ/dV; a Q/V curve must be differentiated before it comes here.
 */
export function capacitanceCurve(capacitor: TimingCapacitor, factor: number): CapacitanceCurve {
  const farads = capacitor.farads * factor;
  if (capacitor.biasCurve) return tabulatedCurve(farads, capacitor.biasCurve);
  const halving = capacitor.biasHalvingVolts;
  if (halving === null) {
    return { constantFarads: farads, faradsAt: () => farads, cornerVolts: [] };
  }
  return {
    constantFarads: null,
    faradsAt: (volts) => farads / (1 + (volts / halving) ** 2),
    cornerVolts: [],
  };
}

function tabulatedCurve(farads: number, curve: BiasCurve): CapacitanceCurve {
  return {
    constantFarads: null,
    faradsAt: (volts) => farads * fractionAt(curve, Math.abs(volts)),
    cornerVolts: curve.volts.flatMap((volts) => [-volts, volts]),
  };
}

function fractionAt(curve: BiasCurve, volts: number): number {
  let leftVolts = 0;
  let leftFraction = curve.fractions[0] ?? 1;
  for (const [index, rightVolts] of curve.volts.entries()) {
    const rightFraction = curve.fractions[index] ?? leftFraction;
    if (volts <= rightVolts) {
      const width = rightVolts - leftVolts;
      if (width === 0) return rightFraction;
      return leftFraction + ((rightFraction - leftFraction) * (volts - leftVolts)) / width;
    }
    leftVolts = rightVolts;
    leftFraction = rightFraction;
  }
  return leftFraction;
}
