import { capacitanceCurve, type CapacitanceCurve } from './capacitance.ts';
import { checkCircuit } from './check-circuit.ts';
import type { Circuit, DiodeModel } from './circuit.ts';

const kelvinAtZeroCelsius = 273.15;
/** Boltzmann's constant over the elementary charge, both exact since the SI of 2019. */
const voltsPerKelvin = 1.380649e-23 / 1.602176634e-19;

/** n·V_t and I_s of the steering diodes at the circuit's temperature. */
export interface WarmDiode {
  emissionVolts: number;
  saturationAmps: number;
}

/** The circuit's values at its temperature. `leakageSiemens` is 0 without leakage. */
export interface WarmCircuit {
  circuit: Circuit;
  r1Ohms: number;
  r2Ohms: number;
  r3Ohms: number;
  chargeOhms: number;
  dischargeOhms: number;
  diode: WarmDiode | null;
  capacitance: CapacitanceCurve;
  leakageSiemens: number;
  /** Constant current out of the inverting node: input bias and leakage. */
  drainAmps: number;
}

/** Factors by which the temperature changes R1–R3, the timing resistors and the capacitor. */
export interface TemperatureFactors {
  thresholds: number;
  timing: number;
  capacitor: number;
}

/**
 * R(1 + TCR·ΔT) and C(1 + TCC·ΔT) as factors, ΔT from the reference temperature. The factors are
 * not positive when the linear law is used far outside its range. Neglects curvature.
 */
export function temperatureFactors(circuit: Circuit): TemperatureFactors {
  const kelvins = circuit.celsius - circuit.referenceCelsius;
  const common = circuit.resistorTemperatureCoefficientPerKelvin;
  return {
    thresholds: 1 + (circuit.thresholdTemperatureCoefficientPerKelvin ?? common) * kelvins,
    timing: 1 + (circuit.timingTemperatureCoefficientPerKelvin ?? common) * kelvins,
    capacitor: 1 + circuit.capacitor.temperatureCoefficientPerKelvin * kelvins,
  };
}

/**
 * The circuit's values at its temperature, or null where a temperature coefficient would make a
 * resistance or the capacitance zero or negative. Throws a `RangeError` on impossible numbers.
 */
export function warmCircuit(circuit: Circuit): WarmCircuit | null {
  checkCircuit(circuit);
  const factors = temperatureFactors(circuit);
  if (!(factors.thresholds > 0 && factors.timing > 0 && factors.capacitor > 0)) return null;
  const { timing, capacitor } = circuit;
  const steered = timing.kind === 'steered';
  return {
    circuit,
    r1Ohms: circuit.r1Ohms * factors.thresholds,
    r2Ohms: circuit.r2Ohms * factors.thresholds,
    r3Ohms: circuit.r3Ohms * factors.thresholds,
    chargeOhms: (steered ? timing.chargeOhms : timing.ohms) * factors.timing,
    dischargeOhms: (steered ? timing.dischargeOhms : timing.ohms) * factors.timing,
    diode: steered ? warmDiode(timing.diode, circuit.celsius, circuit.referenceCelsius) : null,
    capacitance: capacitanceCurve(capacitor, factors.capacitor),
    leakageSiemens: capacitor.leakageOhms === null ? 0 : 1 / capacitor.leakageOhms,
    drainAmps: circuit.comparator.invertingBiasAmps + capacitor.leakageAmps,
  };
}

/**
 * n·V_t in volts and I_s in amperes of a diode at a temperature:
 * I_s(T) = I_s exp[(T/Tref − 1) Eg/(n V_t) + (Xti/n) ln(T/Tref)], the usual junction law.
 */
export function warmDiode(diode: DiodeModel, celsius: number, referenceCelsius: number): WarmDiode {
  const kelvins = celsius + kelvinAtZeroCelsius;
  const ratio = kelvins / (referenceCelsius + kelvinAtZeroCelsius);
  const n = diode.emissionCoefficient;
  const emissionVolts = n * voltsPerKelvin * kelvins;
  const exponent =
    ((ratio - 1) * diode.energyGapElectronVolts) / emissionVolts +
    (diode.saturationTemperatureExponent / n) * Math.log(ratio);
  return { emissionVolts, saturationAmps: diode.saturationAmps * Math.exp(exponent) };
}
