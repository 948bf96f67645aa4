/**
 * What the search may take: unreserved stock of one mounting, in SI units. `id` orders ties, so two
 * searches over the same shelf always agree. `available` counts single pieces.
 */
export interface Shelf {
  resistors: readonly StockedResistor[];
  capacitors: readonly StockedCapacitor[];
  comparators: readonly StockedComparator[];
  diodes: readonly StockedDiode[];
  trimmers: readonly StockedTrimmer[];
}

interface Stocked {
  id: number;
  available: number;
  /** Net price of one piece in minor units. */
  priceMinor: number;
}

export interface StockedResistor extends Stocked {
  ohms: number;
  tolerance: number;
  /** Signed; every piece of the part is taken to drift by it. */
  temperatureCoefficientPerKelvin: number;
  ratedWatts: number;
}

/** A trimming resistor used as a rheostat; `ohms` is its whole track. */
export interface StockedTrimmer extends Stocked {
  ohms: number;
  tolerance: number;
  temperatureCoefficientPerKelvin: number;
}

/** A small-signal diode; two of one part steer the charge and discharge paths. */
export interface StockedDiode extends Stocked {
  saturationAmps: number;
  emissionCoefficient: number;
  energyGapElectronVolts: number;
  saturationTemperatureExponent: number;
}

export interface StockedCapacitor extends Stocked {
  /** Middle of what a piece may measure: the printed value, or the lots' mean where that is used. */
  farads: number;
  /** A piece lies within ± this fraction of `farads`: the printed tolerance, or the lots' window. */
  tolerance: number;
  /** Standard deviation as a fraction where lots are measured; null: any value as likely as another. */
  deviation: number | null;
  dielectric: 'C0G' | 'X7R' | 'film-pp' | 'film-pet' | 'electrolytic';
  ratedVolts: number;
  temperatureCoefficientPerKelvin: number;
  /** Largest further change over the whole temperature range, as a fraction. */
  temperatureSpread: number;
  /** Insulation resistance times capacitance; null where leakage is given as a current. */
  insulationSeconds: number | null;
  leakageAmps: number;
}

export interface StockedComparator extends Stocked {
  output: 'push-pull' | 'open-drain';
  sections: number;
  minSupplyVolts: number;
  maxSupplyVolts: number;
  delayLowHighSeconds: number;
  delayHighLowSeconds: number;
  maxDelaySeconds: number;
  inputBiasAmps: number;
  maxInputBiasAmps: number;
  offsetVolts: number;
  maxOffsetVolts: number;
  hysteresisVolts: number;
  highOhms: number;
  lowOhms: number;
  maxOutputAmps: number;
  quiescentAmps: number;
  maxQuiescentAmps: number;
}

/** What the search is asked, in SI units. */
export interface SearchBrief {
  targetHz: number;
  duty: number;
  supplyVolts: number;
  minSupplyVolts: number;
  maxSupplyVolts: number;
  /** Fraction either side of the target. */
  band: number;
  minCelsius: number;
  maxCelsius: number;
  quantity: number;
  load: SearchLoad | null;
  care: CareLevel;
  /** Uncertainty of the bench's capacitance meter, as a fraction of the reading. */
  meterUncertainty: number;
}

/**
 * How the shop treats a pack. Lot-checked differs from as-stocked by the capacitors on the shelf
 * alone, whose value and tolerance are then the lots'.
 */
export type CareLevel = 'as-stocked' | 'lot-checked' | 'bench-tuned' | 'trimmer-fitted';

/** An LED on the output: forward voltages, and the current it is asked to carry. */
export interface SearchLoad {
  amps: number;
  forwardVolts: number;
  minForwardVolts: number;
  maxForwardVolts: number;
}
