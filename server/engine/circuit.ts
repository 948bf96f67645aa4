/** Junction diode of a steered timing branch, given at the circuit's reference temperature. */
export interface DiodeModel {
  saturationAmps: number;
  emissionCoefficient: number;
  energyGapElectronVolts: number;
  saturationTemperatureExponent: number;
}

export interface SingleTiming {
  kind: 'single';
  ohms: number;
}

/** Two resistors, each in series with one of two identical, opposed diodes. */
export interface SteeredTiming {
  kind: 'steered';
  chargeOhms: number;
  dischargeOhms: number;
  diode: DiodeModel;
}

export type Timing = SingleTiming | SteeredTiming;

/**
 * Differential capacitance (dQ/dV) against bias as fractions of the value at 0 V. `volts` are
 * non-negative and ascending, as long as `fractions`; straight lines between, held flat outside.
 */
export interface BiasCurve {
  volts: readonly number[];
  fractions: readonly number[];
}

export interface TimingCapacitor {
  farads: number;
  leakageOhms: number | null;
  /** Constant current from the inverting node to ground. */
  leakageAmps: number;
  /** v in C(V) = C / (1 + (V/v)²); null for a capacitance that does not depend on voltage. */
  biasHalvingVolts: number | null;
  /** Takes the place of `biasHalvingVolts` when given. */
  biasCurve?: BiasCurve | null;
  temperatureCoefficientPerKelvin: number;
}

export interface Comparator {
  output: 'push-pull' | 'open-drain';
  /** Unloaded high output; null means the supply. Unused when the output is open drain. */
  highVolts: number | null;
  lowVolts: number;
  highOhms: number;
  lowOhms: number;
  pullUpOhms: number | null;
  delayLowHighSeconds: number;
  delayHighLowSeconds: number;
  /** Bias currents are positive into the pin. */
  invertingBiasAmps: number;
  nonInvertingBiasAmps: number;
  /** The comparator trips when V(inverting) = V(non-inverting) + offset. */
  offsetVolts: number;
  /** Whole internal hysteresis: half of it is added in the high state, half taken off in the low. */
  hysteresisVolts: number;
}

/**
 * Indicator from output to ground that conducts in the high state only: a constant drop `volts`
 * in series with `ohms`. Neglects the curvature of the diode's characteristic.
 */
export interface IndicatorLoad {
  volts: number;
  ohms: number;
  /** True where a spare section drives it, so that the oscillator's own output does not feel it. */
  buffered?: boolean;
}

/**
 * A comparator relaxation oscillator in SI units. R1: supply to reference node, R2: reference node
 * to ground, R3: output to reference node; timing: output to inverting input; capacitor: inverting
 * input to ground. Values hold at `referenceCelsius`.
 */
export interface Circuit {
  supplyVolts: number;
  celsius: number;
  referenceCelsius: number;
  r1Ohms: number;
  r2Ohms: number;
  r3Ohms: number;
  timing: Timing;
  resistorTemperatureCoefficientPerKelvin: number;
  /** Overrides the common coefficient for R1, R2 and R3. */
  thresholdTemperatureCoefficientPerKelvin?: number;
  /** Overrides the common coefficient for the timing resistors. */
  timingTemperatureCoefficientPerKelvin?: number;
  capacitor: TimingCapacitor;
  comparator: Comparator;
  load?: IndicatorLoad | null;
}

/** What must be said of a circuit; every absent effect is ideal. */
export interface CircuitDraft extends Partial<
  Omit<Circuit, 'supplyVolts' | 'timing' | 'capacitor' | 'comparator'>
> {
  supplyVolts: number;
  r1Ohms: number;
  r2Ohms: number;
  r3Ohms: number;
  timing: Timing;
  capacitor: Partial<TimingCapacitor> & { farads: number };
  comparator?: Partial<Comparator>;
}

const idealComparator: Comparator = {
  output: 'push-pull',
  highVolts: null,
  lowVolts: 0,
  highOhms: 0,
  lowOhms: 0,
  pullUpOhms: null,
  delayLowHighSeconds: 0,
  delayHighLowSeconds: 0,
  invertingBiasAmps: 0,
  nonInvertingBiasAmps: 0,
  offsetVolts: 0,
  hysteresisVolts: 0,
};

/**
 * Fills a draft with ideal effects: 25 °C, no leakage, a push-pull comparator that swings from rail
 * to rail without delay, bias, offset or output resistance.
 */
export function createCircuit(draft: CircuitDraft): Circuit {
  return {
    celsius: 25,
    referenceCelsius: 25,
    resistorTemperatureCoefficientPerKelvin: 0,
    ...draft,
    capacitor: {
      leakageOhms: null,
      leakageAmps: 0,
      biasHalvingVolts: null,
      temperatureCoefficientPerKelvin: 0,
      ...draft.capacitor,
    },
    comparator: { ...idealComparator, ...draft.comparator },
  };
}
