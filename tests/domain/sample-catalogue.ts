import type { CataloguePart, PartFacts } from '../../server/domain/catalogue.ts';

let count = 0;

/** A catalogue part with everything filled in; 100 on hand unless said, in one unmeasured lot. */
export function part(facts: PartFacts, change: Partial<CataloguePart> = {}): CataloguePart {
  count += 1;
  const onHand = change.onHand ?? 100;
  const reserved = change.reserved ?? 0;
  const available = onHand - reserved;
  const unmeasured = { measuredMean: null, measuredDeviation: null, measuredCount: null };
  return {
    id: count,
    kind: facts.kind,
    mounting: 'through-hole',
    active: true,
    costMinor: 2,
    priceMinor: 10,
    grams: 0.2,
    facts,
    lots: available > 0 ? [{ id: count, available, ...unmeasured }] : [],
    ...change,
    onHand,
    reserved,
    available,
  };
}

export const resistor = (ohms: number, tolerance = 0.01, change: Partial<CataloguePart> = {}) =>
  part(
    {
      kind: 'resistor',
      sku: `TW-R-${ohms}-${tolerance}`,
      name: `Resistor ${ohms}`,
      ohms,
      tolerance,
      temperatureCoefficientPerKelvin: 5e-5,
      ratedWatts: 0.25,
    },
    change,
  );

export const capacitor = (
  farads: number,
  dielectric: 'C0G' | 'X7R' | 'film-pp' | 'film-pet' | 'electrolytic' = 'film-pet',
  change: Partial<CataloguePart> = {},
) =>
  part(
    {
      kind: 'capacitor',
      sku: `TW-C-${farads}-${dielectric}`,
      name: `Capacitor ${farads}`,
      farads,
      tolerance: dielectric === 'electrolytic' ? 0.2 : 0.05,
      dielectric,
      ratedVolts: 63,
      temperatureCoefficientPerKelvin: 4e-4,
      temperatureSpread: 0.004,
      insulationSeconds: dielectric === 'electrolytic' ? null : 1e4,
      leakageAmps: dielectric === 'electrolytic' ? 5e-7 : 0,
      biasHalvingVolts: null,
      polarised: dielectric === 'electrolytic',
    },
    change,
  );

export const comparator = (sections = 1, change: Partial<CataloguePart> = {}) =>
  part(
    {
      kind: 'comparator',
      sku: `TW-C${sections}`,
      name: 'Comparator',
      output: 'push-pull',
      sections,
      supplyVolts: { min: 1.8, max: 5.5 },
      delayLowHighSeconds: 4.5e-7,
      delayHighLowSeconds: 4e-7,
      maxDelaySeconds: 1e-6,
      inputBiasAmps: 2e-12,
      maxInputBiasAmps: 6e-11,
      offsetVolts: 4e-4,
      maxOffsetVolts: 4e-3,
      hysteresisVolts: 1.5e-3,
      highOhms: 40,
      lowOhms: 36,
      maxOutputAmps: 0.015,
      quiescentAmps: 9e-6,
      maxQuiescentAmps: 2e-5,
    },
    change,
  );

export const led = (colour: string, forwardVolts: number, change: Partial<CataloguePart> = {}) =>
  part(
    {
      kind: 'led',
      sku: `TW-L-${colour.toUpperCase()}`,
      name: `LED, ${colour}`,
      colour,
      forwardVolts,
      minForwardVolts: forwardVolts - 0.2,
      maxForwardVolts: forwardVolts + 0.2,
      maxAmps: 0.02,
    },
    change,
  );

export const board = (sections = 1, change: Partial<CataloguePart> = {}) =>
  part({ kind: 'board', sku: `TW-B${sections}`, name: 'Board', sections }, change);

export const battery = (change: Partial<CataloguePart> = {}) =>
  part(
    {
      kind: 'battery',
      sku: 'TW-CELL-AA-2',
      name: 'Two AA cells',
      cellSize: 'AA',
      cells: 2,
      nominalVolts: 3,
      freshVolts: 3.2,
      emptyVolts: 1.8,
      capacityAmpHours: 2.4,
    },
    change,
  );

export const holder = (change: Partial<CataloguePart> = {}) =>
  part({ kind: 'holder', sku: 'TW-HOLD-AA-2', name: 'Holder', cellSize: 'AA', cells: 2 }, change);

export const trimmer = (ohms: number, change: Partial<CataloguePart> = {}) =>
  part(
    {
      kind: 'trimmer',
      sku: `TW-V-${ohms}`,
      name: `Trimmer ${ohms}`,
      ohms,
      tolerance: 0.1,
      temperatureCoefficientPerKelvin: 1e-4,
    },
    change,
  );

export const diode = (change: Partial<CataloguePart> = {}) =>
  part(
    {
      kind: 'diode',
      sku: 'TW-D1',
      name: 'Diode, silicon signal',
      saturationAmps: 2.5e-9,
      emissionCoefficient: 1.75,
      energyGapElectronVolts: 1.11,
      saturationTemperatureExponent: 3,
    },
    change,
  );
