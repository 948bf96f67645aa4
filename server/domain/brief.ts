import type { Load, ParsedBrief, ResolvedBrief } from '../contracts/brief.ts';
import type { SearchBrief } from '../engine/search/shelf.ts';
import { partsOf, type CataloguePart, type PartOf } from './catalogue.ts';
import {
  celsiusRange,
  countWords,
  dutyWords,
  nbsp,
  percent,
  significant,
  targetHertz,
  thin,
} from './wording.ts';

/** The brief with what it needs from the shelves besides the timing parts. */
export interface BriefInHand {
  kind: 'resolved';
  brief: ResolvedBrief;
  search: SearchBrief;
  led: PartOf<'led'> | null;
  battery: PartOf<'battery'> | null;
  holder: PartOf<'holder'> | null;
}

/** What the bench can do. */
export interface Bench {
  /** Uncertainty of its capacitance meter, as a fraction of the reading. */
  meterUncertainty: number;
}

export type ResolvedOrNot = BriefInHand | { kind: 'impossible'; errors: FieldError[] };

export interface FieldError {
  path: string;
  message: string;
}

/** Rates above this are a clock rather than a light, when the maker does not say. */
const clockAboveHz = 20;
/** A supply given in volts is taken to be regulated this well. */
const regulation = 0.05;
/** What must be left for the series resistor, or the LED's current hangs on its own spread. */
const ledHeadroomVolts = 0.3;

/**
 * Fills in what the maker left open and turns the brief into SI units. Impossible briefs come back
 * as sentences that say what to change: an unknown battery, an LED colour the shelves lack, or a
 * supply too low for the colour, with the colours that would work.
 */
export function resolveBrief(
  parsed: ParsedBrief,
  catalogue: readonly CataloguePart[],
  bench: Bench,
): ResolvedOrNot {
  const targetHz = targetHertz(parsed.target);
  const supply = resolveSupply(parsed, catalogue);
  if ('path' in supply) return { kind: 'impossible', errors: [supply] };
  const load: Load =
    parsed.load ??
    (targetHz > clockAboveHz ? { kind: 'logic' } : { kind: 'led', colour: 'red', amps: 0.002 });
  const lit = resolveLed(load, supply, parsed.mounting, catalogue);
  if ('path' in lit) return { kind: 'impossible', errors: [lit] };
  const brief: ResolvedBrief = {
    target: parsed.target,
    targetHz,
    duty: parsed.duty,
    supply: supply.supply,
    load,
    band: parsed.band,
    ambient: parsed.ambient,
    mounting: parsed.mounting,
    careLevel: parsed.careLevel,
    quantity: parsed.quantity,
    sentence: '',
  };
  brief.sentence = briefSentence(brief);
  return {
    kind: 'resolved',
    brief,
    search: toSearch(brief, lit.led, bench),
    led: lit.led,
    battery: supply.battery,
    holder: supply.holder,
  };
}

interface SupplyInHand {
  supply: ResolvedBrief['supply'];
  battery: PartOf<'battery'> | null;
  holder: PartOf<'holder'> | null;
}

function resolveSupply(
  parsed: ParsedBrief,
  catalogue: readonly CataloguePart[],
): SupplyInHand | FieldError {
  if ('volts' in parsed.supply) {
    const { volts } = parsed.supply;
    return {
      supply: {
        volts,
        minVolts: volts * (1 - regulation),
        maxVolts: volts * (1 + regulation),
        batterySku: null,
        label: `${Number(volts.toPrecision(3))}${thin}V`,
      },
      battery: null,
      holder: null,
    };
  }
  const sku = parsed.supply.battery;
  const battery = partsOf(catalogue, 'battery').find((part) => part.facts.sku === sku);
  if (!battery) {
    const known = partsOf(catalogue, 'battery').map((part) => part.facts.sku);
    return {
      path: 'supply.battery',
      message: `The shop has no battery "${sku}". Choose one of ${known.join(', ')}.`,
    };
  }
  const { cellSize, cells, nominalVolts, emptyVolts, freshVolts } = battery.facts;
  const holder =
    partsOf(catalogue, 'holder').find(
      (part) => part.facts.cellSize === cellSize && part.facts.cells === cells,
    ) ?? null;
  return {
    supply: {
      volts: nominalVolts,
      minVolts: emptyVolts,
      maxVolts: freshVolts,
      batterySku: sku,
      label: `${countWords(cells)} ${cellSize} cells`,
    },
    battery,
    holder,
  };
}

function resolveLed(
  load: Load,
  { supply }: SupplyInHand,
  mounting: string,
  catalogue: readonly CataloguePart[],
): { led: PartOf<'led'> | null } | FieldError {
  if (load.kind === 'logic') return { led: null };
  const leds = partsOf(catalogue, 'led').filter((part) => part.mounting === mounting);
  const led = leds.find((part) => part.facts.colour === load.colour);
  if (!led)
    return {
      path: 'load.colour',
      message: `The shop has no ${load.colour} LED for this mounting.`,
    };
  const glows = (part: PartOf<'led'>) => supply.volts - part.facts.forwardVolts >= ledHeadroomVolts;
  if (!glows(led)) {
    const colours = leds.filter(glows).map((part) => part.facts.colour);
    const help =
      colours.length > 0
        ? `Take a higher voltage, or one of these colours: ${colours.join(', ')}.`
        : `Take at least ${significant(led.facts.forwardVolts + ledHeadroomVolts, 2)}${thin}V.`;
    return {
      path: 'load.colour',
      message:
        `A ${load.colour} LED needs about ${significant(led.facts.forwardVolts + ledHeadroomVolts, 2)}${thin}V ` +
        `with its resistor; this supply (${supply.label}) is ${significant(supply.volts, 2)}${thin}V. ${help}`,
    };
  }
  if (load.amps > led.facts.maxAmps) {
    return {
      path: 'load.amps',
      message: `This LED takes at most ${led.facts.maxAmps * 1e3}${thin}mA; ask for less current.`,
    };
  }
  return { led };
}

/** A resolved brief as the search is asked it; `led` is the LED of the pack, null for a clock. */
export function toSearch(
  brief: ResolvedBrief,
  led: PartOf<'led'> | null,
  { meterUncertainty }: Bench,
): SearchBrief {
  return {
    care: brief.careLevel,
    meterUncertainty,
    targetHz: brief.targetHz,
    duty: brief.duty,
    supplyVolts: brief.supply.volts,
    minSupplyVolts: brief.supply.minVolts,
    maxSupplyVolts: brief.supply.maxVolts,
    band: brief.band,
    minCelsius: brief.ambient.minCelsius,
    maxCelsius: brief.ambient.maxCelsius,
    quantity: brief.quantity,
    load:
      led === null || brief.load.kind === 'logic'
        ? null
        : {
            amps: brief.load.amps,
            forwardVolts: led.facts.forwardVolts,
            minForwardVolts: led.facts.minForwardVolts,
            maxForwardVolts: led.facts.maxForwardVolts,
          },
  };
}

/** The target as the maker put it: "90 times a minute", "32 kHz", "every 2 s". */
export function targetWords(target: ResolvedBrief['target']): string {
  const value = Number(target.value.toPrecision(6));
  switch (target.unit) {
    case 'per_minute':
      return `${value}${nbsp}times a minute`;
    case 'Hz':
      return `at ${value}${thin}Hz`;
    case 'kHz':
      return `at ${value}${thin}kHz`;
    case 's':
      return `every ${value}${thin}s`;
    case 'ms':
      return `every ${value}${thin}ms`;
  }
}

/** The brief as one sentence, the way it is shown everywhere. */
export function briefSentence(brief: ResolvedBrief): string {
  const { ambient, supply } = brief;
  const rest =
    `from ${supply.label}, within ±${nbsp}${percent(brief.band, 3)}, ` +
    `between ${celsiusRange(ambient.minCelsius, ambient.maxCelsius)}`;
  if (brief.load.kind === 'logic') {
    return `A clock ticks ${targetWords(brief.target)}, high for ${dutyWords(brief.duty)} of each beat, ${rest}`;
  }
  return (
    `A ${brief.load.colour} LED blinks ${targetWords(brief.target)}, ` +
    `lit for ${dutyWords(brief.duty)} of each beat, ${rest}`
  );
}
