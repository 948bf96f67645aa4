import type { BiasCurve, Circuit, Comparator, Timing, TimingCapacitor } from './circuit.ts';

const absoluteZeroCelsius = -273.15;

/** Throws a `RangeError` that names `what` unless `value` is finite. */
export function requireFinite(value: number, what: string): void {
  if (!Number.isFinite(value))
    throw new RangeError(`${what} must be a finite number, not ${value}.`);
}

/** Throws a `RangeError` that names `what` unless `value` is finite and above zero. */
export function requirePositive(value: number, what: string): void {
  if (!(value > 0 && value < Infinity)) {
    throw new RangeError(`${what} must be a finite number above zero, not ${value}.`);
  }
}

/** Throws a `RangeError` that names `what` unless `value` is finite and zero or more. */
export function requireNonNegative(value: number, what: string): void {
  if (!(value >= 0 && value < Infinity)) {
    throw new RangeError(`${what} must be a finite number of zero or more, not ${value}.`);
  }
}

/**
 * Refuses numbers that no circuit can have (R ≤ 0, C ≤ 0, NaN, a negative delay, an open-drain
 * output without a pull-up). Throws a `RangeError` whose message says which; returns nothing.
 * A circuit made of possible parts that merely does not oscillate passes.
 */
export function checkCircuit(circuit: Circuit): void {
  requirePositive(circuit.supplyVolts, 'The supply');
  requireAboveAbsoluteZero(circuit.celsius, 'The temperature');
  requireAboveAbsoluteZero(circuit.referenceCelsius, 'The reference temperature');
  requirePositive(circuit.r1Ohms, 'R1');
  requirePositive(circuit.r2Ohms, 'R2');
  requirePositive(circuit.r3Ohms, 'R3');
  requireFinite(circuit.resistorTemperatureCoefficientPerKelvin, 'The resistor coefficient');
  requireFinite(circuit.thresholdTemperatureCoefficientPerKelvin ?? 0, 'The threshold coefficient');
  requireFinite(circuit.timingTemperatureCoefficientPerKelvin ?? 0, 'The timing coefficient');
  checkTiming(circuit.timing);
  checkCapacitor(circuit.capacitor);
  checkComparator(circuit.comparator);
  if (circuit.load) {
    requireNonNegative(circuit.load.volts, "The load's voltage drop");
    requirePositive(circuit.load.ohms, "The load's series resistance");
  }
}

function requireAboveAbsoluteZero(celsius: number, what: string): void {
  requireFinite(celsius, what);
  if (celsius <= absoluteZeroCelsius) {
    throw new RangeError(`${what} must be above ${absoluteZeroCelsius} °C, not ${celsius}.`);
  }
}

function checkTiming(timing: Timing): void {
  if (timing.kind === 'single') {
    requirePositive(timing.ohms, 'The timing resistance');
    return;
  }
  requirePositive(timing.chargeOhms, 'The charging resistance');
  requirePositive(timing.dischargeOhms, 'The discharging resistance');
  requirePositive(timing.diode.saturationAmps, "The diode's saturation current");
  requirePositive(timing.diode.emissionCoefficient, "The diode's emission coefficient");
  requirePositive(timing.diode.energyGapElectronVolts, "The diode's energy gap");
  requireFinite(timing.diode.saturationTemperatureExponent, "The diode's temperature exponent");
}

function checkCapacitor(capacitor: TimingCapacitor): void {
  requirePositive(capacitor.farads, 'The capacitance');
  requireFinite(capacitor.leakageAmps, 'The leakage current');
  requireFinite(capacitor.temperatureCoefficientPerKelvin, "The capacitor's coefficient");
  if (capacitor.leakageOhms !== null) {
    requirePositive(capacitor.leakageOhms, 'The leakage resistance');
  }
  if (capacitor.biasHalvingVolts !== null) {
    requirePositive(capacitor.biasHalvingVolts, 'The halving voltage');
  }
  if (capacitor.biasCurve) checkBiasCurve(capacitor.biasCurve);
}

function checkBiasCurve(curve: BiasCurve): void {
  if (curve.volts.length === 0 || curve.volts.length !== curve.fractions.length) {
    throw new RangeError('A bias curve needs as many fractions as voltages, and at least one.');
  }
  let previous = -1;
  for (const volts of curve.volts) {
    requireNonNegative(volts, 'A voltage of the bias curve');
    if (volts <= previous) throw new RangeError('The voltages of a bias curve must ascend.');
    previous = volts;
  }
  for (const fraction of curve.fractions) requirePositive(fraction, 'A bias curve fraction');
}

function checkComparator(comparator: Comparator): void {
  if (comparator.highVolts !== null) requireFinite(comparator.highVolts, 'The high output');
  requireFinite(comparator.lowVolts, 'The low output');
  requireNonNegative(comparator.highOhms, 'The high output resistance');
  requireNonNegative(comparator.lowOhms, 'The low output resistance');
  if (comparator.pullUpOhms !== null) requirePositive(comparator.pullUpOhms, 'The pull-up');
  if (comparator.output === 'open-drain' && comparator.pullUpOhms === null) {
    throw new RangeError('An open-drain output needs a pull-up resistor.');
  }
  requireNonNegative(comparator.delayLowHighSeconds, 'The rising delay');
  requireNonNegative(comparator.delayHighLowSeconds, 'The falling delay');
  requireFinite(comparator.invertingBiasAmps, 'The inverting bias');
  requireFinite(comparator.nonInvertingBiasAmps, 'The non-inverting bias');
  requireFinite(comparator.offsetVolts, 'The offset');
  requireNonNegative(comparator.hysteresisVolts, 'The hysteresis');
}
