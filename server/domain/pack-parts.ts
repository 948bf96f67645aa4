import type { Marking, PackPart, PackRole } from '../contracts/packs.ts';
import { chipCode, e96Code } from '../engine/chip-code.ts';
import type { Circuit } from '../engine/circuit.ts';
import { capacitorCode } from '../engine/capacitor-code.ts';
import { resistorBands } from '../engine/resistor-bands.ts';
import { formatFarads, formatOhms } from '../engine/si-format.ts';
import { isKind, type CataloguePart, type FactsOf } from './catalogue.ts';
import { nbsp } from './wording.ts';

/** The order in which a bill of materials lists roles. */
const roleOrder: readonly PackRole[] = [
  'U1',
  'R1',
  'R2',
  'R3',
  'R4',
  'R4A',
  'R4B',
  'RV',
  'RC',
  'RD',
  'DC',
  'DD',
  'C1',
  'RP',
  'LED',
  'RL',
  'R5',
  'R6',
  'C2',
  'PCB',
  'BH',
  'BAT',
];

const dielectricWords: Record<FactsOf<'capacitor'>['dielectric'], string> = {
  C0G: 'C0G',
  X7R: 'X7R',
  'film-pp': 'film (PP)',
  'film-pet': 'film (PET)',
  electrolytic: 'electrolytic',
};

const tolerancePercent = (tolerance: number) =>
  `±${nbsp}${Number((tolerance * 100).toPrecision(3))}\u202f%`;

/** How a part is marked, by IEC 60062 where that applies; the colour names stand for the colours. */
export function markingOf(part: CataloguePart): Marking {
  if (isKind(part, 'resistor')) {
    const { ohms, tolerance } = part.facts;
    if (part.mounting === 'surface-mount') {
      const code =
        (tolerance <= 0.01 ? e96Code(ohms) : null) ?? chipCode(ohms, tolerance <= 0.01 ? 3 : 2);
      return { bands: null, code, text: code ?? formatOhms(ohms) };
    }
    const coded = resistorBands(ohms, tolerance);
    if (coded.kind === 'uncodable') return { bands: null, code: null, text: formatOhms(ohms) };
    return { bands: [...coded.colours], code: null, text: coded.colours.join(' ') };
  }
  if (isKind(part, 'capacitor')) {
    const { farads, tolerance, dielectric, ratedVolts } = part.facts;
    const chip = part.mounting === 'surface-mount';
    if (chip) return { bands: null, code: null, text: 'not marked; keep it in its bag' };
    const code =
      dielectric === 'electrolytic'
        ? `${formatFarads(farads)} ${ratedVolts}\u202fV`
        : (capacitorCode(farads, tolerance) ?? capacitorCode(farads));
    return { bands: null, code, text: code ?? formatFarads(farads) };
  }
  if (isKind(part, 'trimmer')) {
    const code = chipCode(part.facts.ohms, 2);
    return { bands: null, code, text: code ?? formatOhms(part.facts.ohms) };
  }
  if (isKind(part, 'diode'))
    return { bands: null, code: null, text: 'a band round one end marks the cathode' };
  if (isKind(part, 'comparator'))
    return { bands: null, code: part.facts.sku, text: part.facts.sku };
  return { bands: null, code: null, text: '' };
}

function valueOf(part: CataloguePart): string {
  if (isKind(part, 'resistor') || isKind(part, 'trimmer')) return formatOhms(part.facts.ohms);
  if (isKind(part, 'capacitor')) return formatFarads(part.facts.farads);
  if (isKind(part, 'comparator') || isKind(part, 'diode')) return part.facts.sku;
  if (isKind(part, 'led')) return part.facts.colour;
  return '';
}

/** What a part is, in a few words: "887 kΩ ± 1 %", "560 nF ± 5 % film (PET)", "500 kΩ ± 10 % trimmer". */
export function labelOf(part: CataloguePart): string {
  if (isKind(part, 'resistor')) return `${valueOf(part)} ${tolerancePercent(part.facts.tolerance)}`;
  if (isKind(part, 'capacitor')) {
    const { tolerance, dielectric } = part.facts;
    return `${valueOf(part)} ${tolerancePercent(tolerance)} ${dielectricWords[dielectric]}`;
  }
  if (isKind(part, 'trimmer'))
    return `${valueOf(part)} ${tolerancePercent(part.facts.tolerance)} trimmer`;
  return part.facts.name;
}

/** A part in its role, as packs, orders and build sheets show it. */
export function toPackPart(role: PackRole, part: CataloguePart): PackPart {
  const shown: PackPart = {
    role,
    sku: part.facts.sku,
    kind: part.kind,
    quantity: 1,
    label: labelOf(part),
    value: valueOf(part),
    mounting: part.mounting,
    marking: markingOf(part),
  };
  if (isKind(part, 'resistor') || isKind(part, 'trimmer')) {
    shown.ohms = part.facts.ohms;
    shown.tolerance = part.facts.tolerance;
  } else if (isKind(part, 'capacitor')) {
    shown.farads = part.facts.farads;
    shown.tolerance = part.facts.tolerance;
    shown.dielectric = part.facts.dielectric;
  } else if (isKind(part, 'comparator')) shown.sections = part.facts.sections;
  else if (isKind(part, 'led')) shown.colour = part.facts.colour;
  return shown;
}

/** Sorts parts the way a bill of materials lists them. */
export function inBillOrder<Item extends { role: PackRole }>(parts: readonly Item[]): Item[] {
  return [...parts].sort((a, b) => roleOrder.indexOf(a.role) - roleOrder.indexOf(b.role));
}

/** How R4A and R4B of a pack are joined, told by the whole resistance of its circuit; null for one R4. */
export function joinOf(
  parts: readonly PackPart[],
  { timing }: Circuit,
): 'series' | 'parallel' | null {
  const [first, second] = ['R4A', 'R4B'].map((role) => parts.find((part) => part.role === role));
  if (!first?.ohms || !second?.ohms || timing.kind !== 'single') return null;
  return timing.ohms > Math.max(first.ohms, second.ohms) ? 'series' : 'parallel';
}
