/**
 * What the search may take: unreserved stock of one mounting, in SI units. `id` orders ties, so two
 * searches over the same shelf always agree. `available` counts single pieces.
 */
export interface Shelf {
  resistors: readonly StockedResistor[];
  capacitors: readonly StockedCapacitor[];
  comparators: readonly StockedComparator[];
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
  temperatureCoefficientPerKelvin: number;
}

export interface StockedCapacitor extends Stocked {
  farads: number;
  tolerance: number;
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
}

/** An LED on the output: forward voltages, and the current it is asked to carry. */
export interface SearchLoad {
  amps: number;
  forwardVolts: number;
  minForwardVolts: number;
  maxForwardVolts: number;
}
