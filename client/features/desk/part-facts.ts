import type { Dielectric, Part } from '../../../server/contracts/parts.ts';
import { formatDigits, formatPercent, formatQuantity } from '../../lib/format-number.ts';
import { narrow } from '../../lib/spaces.ts';

export interface Fact {
  name: string;
  value: string;
}

const dielectricWords: Record<Dielectric, string> = {
  C0G: 'C0G ceramic',
  X7R: 'X7R ceramic',
  'film-pp': 'film (PP)',
  'film-pet': 'film (PET)',
  electrolytic: 'electrolytic',
};

const perKelvin = (value: number) => `${formatDigits(value * 1e6)}${narrow}ppm/K`;
const span = (from: number, to: number, unit: string) =>
  `${formatDigits(from)} to ${formatQuantity(to, unit)}`;

/** What the catalogue knows of a part, as names and values with their units. */
export function factsOf(part: Part): Fact[] {
  const mounting = { name: 'Mounting', value: part.mounting };
  return [...kindFacts(part), mounting];
}

function kindFacts(part: Part): Fact[] {
  switch (part.kind) {
    case 'resistor':
      return [
        { name: 'Resistance', value: formatQuantity(part.ohms, 'Ω', 4) },
        { name: 'Tolerance', value: `±${narrow}${formatPercent(part.tolerance)}` },
        { name: 'Drift', value: perKelvin(part.temperatureCoefficientPerKelvin) },
        { name: 'Rated', value: formatQuantity(part.ratedWatts, 'W') },
      ];
    case 'trimmer':
      return [
        { name: 'Resistance', value: formatQuantity(part.ohms, 'Ω', 4) },
        { name: 'Tolerance', value: `±${narrow}${formatPercent(part.tolerance)}` },
        { name: 'Drift', value: perKelvin(part.temperatureCoefficientPerKelvin) },
      ];
    case 'capacitor':
      return [
        { name: 'Capacitance', value: formatQuantity(part.farads, 'F', 4) },
        { name: 'Tolerance', value: `±${narrow}${formatPercent(part.tolerance)}` },
        { name: 'Dielectric', value: dielectricWords[part.dielectric] },
        { name: 'Rated', value: formatQuantity(part.ratedVolts, 'V') },
        { name: 'Drift', value: perKelvin(part.temperatureCoefficientPerKelvin) },
        { name: 'Polarity', value: part.polarised ? 'polarised' : 'either way round' },
      ];
    case 'comparator':
      return [
        { name: 'Output', value: part.output },
        { name: 'Sections', value: String(part.sections) },
        { name: 'Supply', value: span(part.supplyVolts.min, part.supplyVolts.max, 'V') },
        { name: 'Delay', value: formatQuantity(part.delayLowHighSeconds, 's') },
        { name: 'Draws', value: formatQuantity(part.quiescentAmps, 'A') },
        { name: 'Input bias', value: formatQuantity(part.inputBiasAmps, 'A') },
      ];
    case 'led':
      return [
        { name: 'Colour', value: part.colour },
        { name: 'Forward voltage', value: formatQuantity(part.forwardVolts, 'V') },
        { name: 'Most current', value: formatQuantity(part.maxAmps, 'A') },
      ];
    case 'diode':
      return [{ name: 'Saturation current', value: formatQuantity(part.saturationAmps, 'A') }];
    case 'board':
      return [{ name: 'For', value: part.sections === 1 ? 'one section' : 'two sections' }];
    case 'battery':
      return [
        { name: 'Cells', value: `${part.cells} ${part.cellSize}` },
        { name: 'Nominal', value: formatQuantity(part.nominalVolts, 'V') },
        { name: 'Fresh to empty', value: span(part.freshVolts, part.emptyVolts, 'V') },
        { name: 'Holds', value: formatQuantity(part.capacityAmpHours, 'Ah') },
      ];
    case 'holder':
      return [{ name: 'For', value: `${part.cells} ${part.cellSize} cells` }];
  }
}
