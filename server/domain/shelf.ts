import type {
  Shelf,
  StockedCapacitor,
  StockedComparator,
  StockedDiode,
  StockedResistor,
  StockedTrimmer,
} from '../engine/search/shelf.ts';
import { partsOf, type CataloguePart, type PartOf } from './catalogue.ts';
import { lotWindow } from './lot-window.ts';

/** A catalogue resistor as the search sees it. */
export function toStockedResistor(part: PartOf<'resistor'>): StockedResistor {
  const { ohms, tolerance, temperatureCoefficientPerKelvin, ratedWatts } = part.facts;
  const { id, available, priceMinor } = part;
  return {
    id,
    available,
    priceMinor,
    ohms,
    tolerance,
    temperatureCoefficientPerKelvin,
    ratedWatts,
  };
}

/** A catalogue capacitor as the search sees it. */
export function toStockedCapacitor(part: PartOf<'capacitor'>): StockedCapacitor {
  const { facts, id, available, priceMinor } = part;
  return {
    id,
    available,
    priceMinor,
    farads: facts.farads,
    tolerance: facts.tolerance,
    deviation: null,
    dielectric: facts.dielectric,
    ratedVolts: facts.ratedVolts,
    temperatureCoefficientPerKelvin: facts.temperatureCoefficientPerKelvin,
    temperatureSpread: facts.temperatureSpread,
    insulationSeconds: facts.insulationSeconds,
    leakageAmps: facts.leakageAmps,
  };
}

/** A catalogue comparator as the search sees it. */
export function toStockedComparator(part: PartOf<'comparator'>): StockedComparator {
  const { facts, id, available, priceMinor } = part;
  return {
    id,
    available,
    priceMinor,
    output: facts.output,
    sections: facts.sections,
    minSupplyVolts: facts.supplyVolts.min,
    maxSupplyVolts: facts.supplyVolts.max,
    delayLowHighSeconds: facts.delayLowHighSeconds,
    delayHighLowSeconds: facts.delayHighLowSeconds,
    maxDelaySeconds: facts.maxDelaySeconds,
    inputBiasAmps: facts.inputBiasAmps,
    maxInputBiasAmps: facts.maxInputBiasAmps,
    offsetVolts: facts.offsetVolts,
    maxOffsetVolts: facts.maxOffsetVolts,
    hysteresisVolts: facts.hysteresisVolts,
    highOhms: facts.highOhms,
    lowOhms: facts.lowOhms,
    maxOutputAmps: facts.maxOutputAmps,
    quiescentAmps: facts.quiescentAmps,
    maxQuiescentAmps: facts.maxQuiescentAmps,
  };
}

/**
 * The same capacitor by what its lots were measured to be; null when a lot with unreserved pieces was
 * never measured. `meterUncertainty` is that of the receiving meter, as a fraction.
 */
export function toLotChecked(
  part: PartOf<'capacitor'>,
  meterUncertainty: number,
): StockedCapacitor | null {
  const window = lotWindow(part.facts, part.lots, meterUncertainty);
  if (window === null) return null;
  const { mean, tolerance, deviation } = window;
  return { ...toStockedCapacitor(part), farads: mean, tolerance, deviation };
}

/** A catalogue diode as the search sees it. */
export function toStockedDiode({
  facts,
  id,
  available,
  priceMinor,
}: PartOf<'diode'>): StockedDiode {
  return {
    id,
    available,
    priceMinor,
    saturationAmps: facts.saturationAmps,
    emissionCoefficient: facts.emissionCoefficient,
    energyGapElectronVolts: facts.energyGapElectronVolts,
    saturationTemperatureExponent: facts.saturationTemperatureExponent,
  };
}

/** A catalogue trimmer as the search sees it. */
export function toStockedTrimmer(part: PartOf<'trimmer'>): StockedTrimmer {
  const { ohms, tolerance, temperatureCoefficientPerKelvin } = part.facts;
  const { id, available, priceMinor } = part;
  return { id, available, priceMinor, ohms, tolerance, temperatureCoefficientPerKelvin };
}

/**
 * The shelf of one mounting, ascending by id; with lot-checked capacitors, only those whose lots were
 * measured. Resistors stay even when sold out, since the timing table is formed over all values.
 */
export function shelfOf(
  catalogue: readonly CataloguePart[],
  mounting: string,
  lotChecked: { meterUncertainty: number } | null,
): Shelf {
  const mounted = catalogue.filter((part) => part.mounting === mounting);
  return {
    resistors: partsOf(mounted, 'resistor').map(toStockedResistor),
    capacitors: partsOf(mounted, 'capacitor').flatMap(
      (part) =>
        (lotChecked === null
          ? toStockedCapacitor(part)
          : toLotChecked(part, lotChecked.meterUncertainty)) ?? [],
    ),
    comparators: partsOf(mounted, 'comparator').map(toStockedComparator),
    diodes: partsOf(mounted, 'diode').map(toStockedDiode),
    trimmers: partsOf(mounted, 'trimmer').map(toStockedTrimmer),
  };
}
