import type {
  Shelf,
  StockedCapacitor,
  StockedComparator,
  StockedResistor,
} from '../engine/search/shelf.ts';
import { partsOf, type CataloguePart, type PartOf } from './catalogue.ts';

/** A catalogue resistor as the search sees it. */
export function toStockedResistor(part: PartOf<'resistor'>): StockedResistor {
  const { ohms, tolerance, temperatureCoefficientPerKelvin } = part.facts;
  const { id, available, priceMinor } = part;
  return { id, available, priceMinor, ohms, tolerance, temperatureCoefficientPerKelvin };
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

/** Stands for a board that must be on the shelf before a comparator is offered. */
export type BoardFor = (comparator: PartOf<'comparator'>) => PartOf<'board'> | null;

/**
 * The shelf of one mounting, ascending by id. A comparator without a stocked board that takes it is
 * left out. Resistors stay even when sold out, since the composites are formed over all of them.
 */
export function shelfOf(
  catalogue: readonly CataloguePart[],
  mounting: string,
  boardFor: BoardFor,
): Shelf {
  const mounted = catalogue.filter((part) => part.mounting === mounting);
  return {
    resistors: partsOf(mounted, 'resistor').map(toStockedResistor),
    capacitors: partsOf(mounted, 'capacitor').map(toStockedCapacitor),
    comparators: partsOf(mounted, 'comparator')
      .filter((part) => boardFor(part) !== null)
      .map(toStockedComparator),
  };
}
