import { createCircuit, type Circuit } from '../circuit.ts';
import { checkCircuit } from '../check-circuit.ts';
import { prepareChecked, type PreparedSingle } from '../prepared-single.ts';
import { demandMakeable, demandOf, type ResistorDemand } from './demand.ts';
import { nearestResistor } from './nearest-resistor.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import {
  bearsLoad,
  bearsPower,
  buffersLoad,
  comparatorSuits,
  idealLedOhms,
  idealPullUpOhms,
  limits,
  lowestTimingOhms,
} from './rules.ts';
import type { ResistorValues } from './resistor-values.ts';
import type { SearchBrief, StockedComparator, StockedResistor } from './shelf.ts';
import { thresholdSets, type ThresholdSet } from './threshold-sets.ts';

/** A pack's parts around the comparator: all but its timing resistance and its capacitor. */
export interface Head {
  comparator: StockedComparator;
  thresholds: ThresholdSet;
  pullUp: StockedResistor | null;
  ledResistor: StockedResistor | null;
  /** True where a spare section drives the LED. */
  buffered: boolean;
  /** One of the two resistors that hold the inputs of idle sections apart; null without idle sections. */
  idle: StockedResistor | null;
  demand: ResistorDemand;
  minTimingOhms: number;
  /** Net price of the head's parts, in minor units. */
  priceMinor: number;
  /** The nominal circuit without capacitor leakage, reduced. */
  prepared: PreparedSingle;
}

/** Lists every head the shelf and the rules allow, in ascending order of the comparators' ids. */
export function headsFor(
  { shelf, values, smallestWatts }: PreparedShelf,
  brief: SearchBrief,
): Head[] {
  const sets = new Map<number, ThresholdSet[]>();
  return shelf.comparators
    .filter((part) => comparatorSuits(part, brief))
    .flatMap((comparator) => {
      const pullUp = choosePullUp(values, comparator, brief);
      const ledResistor = chooseLedResistor(values, comparator, brief);
      const idle = chooseIdleResistor(values, comparator, brief);
      if (pullUp === undefined || ledResistor === undefined || idle === undefined) return [];
      const buffered = buffersLoad(comparator, brief);
      const minTimingOhms = lowestTimingOhms(
        comparator,
        pullUp?.ohms ?? null,
        brief,
        smallestWatts,
      );
      return thresholdSets(values, comparator, brief, sets).flatMap((thresholds): Head[] => {
        if (!buffered && !bearsLoad(comparator, thresholds, brief)) return [];
        const parts = { comparator, thresholds, pullUp, ledResistor, buffered, idle };
        const fixed = fixedResistors(parts);
        if (!demandMakeable(fixed, brief.quantity)) return [];
        return [{ ...completeHead(parts, brief), minTimingOhms }];
      });
    });
}

type HeadParts = Omit<Head, 'demand' | 'minTimingOhms' | 'priceMinor' | 'prepared'>;

/** Works out what follows from a head's parts; the limit of timing resistance is left at its lowest. */
export function completeHead(parts: HeadParts, brief: SearchBrief): Head {
  const fixed = fixedResistors(parts);
  return {
    ...parts,
    demand: demandOf(fixed),
    minTimingOhms: limits.minTimingOhms,
    priceMinor: fixed.reduce(
      (sum, part) => sum + (part?.priceMinor ?? 0),
      parts.comparator.priceMinor,
    ),
    prepared: cornerReducer(parts, brief)({}),
  };
}

function fixedResistors(parts: HeadParts): (StockedResistor | null)[] {
  const { r1, r2, r3 } = parts.thresholds;
  return [r1, r2, r3, parts.pullUp, parts.ledResistor, parts.idle, parts.idle];
}

/** Null where none is needed, undefined where one is needed and the shelf has none. */
function choosePullUp(
  values: ResistorValues,
  comparator: StockedComparator,
  brief: SearchBrief,
): StockedResistor | null | undefined {
  if (comparator.output === 'push-pull') return null;
  const suits = (part: StockedResistor) =>
    part.available >= brief.quantity && bearsPower(part, brief.maxSupplyVolts);
  return nearestResistor(values, idealPullUpOhms(brief), suits) ?? undefined;
}

/** The smallest stocked value not under the ideal one, so that the asked current is never exceeded. */
function chooseLedResistor(
  values: ResistorValues,
  comparator: StockedComparator,
  brief: SearchBrief,
): StockedResistor | null | undefined {
  if (brief.load === null) return null;
  const ideal = idealLedOhms(comparator, brief);
  if (ideal <= 0) return undefined;
  const most = brief.maxSupplyVolts - brief.load.minForwardVolts;
  const suits = (part: StockedResistor) =>
    part.available >= brief.quantity && part.ohms >= ideal * (1 - 1e-9) && bearsPower(part, most);
  return nearestResistor(values, ideal, suits) ?? undefined;
}

/** For idle sections two of the stocked value nearest to 10 kΩ, between 1 and 10 kΩ. */
function chooseIdleResistor(
  values: ResistorValues,
  comparator: StockedComparator,
  brief: SearchBrief,
): StockedResistor | null | undefined {
  if (comparator.sections - 1 - (buffersLoad(comparator, brief) ? 1 : 0) === 0) return null;
  const suits = (part: StockedResistor) =>
    part.available >= 2 * brief.quantity &&
    part.ohms >= limits.minIdleOhms * (1 - 1e-9) &&
    part.ohms <= limits.maxIdleOhms * (1 + 1e-9);
  return nearestResistor(values, limits.maxIdleOhms, suits) ?? undefined;
}

/** What a nominal circuit is changed by at a corner; ohms as they are at the corner's temperature. */
export interface HeadCorner {
  supplyVolts?: number;
  r1Ohms?: number;
  r2Ohms?: number;
  r3Ohms?: number;
  outputFactor?: number;
  offsetVolts?: number;
  /** Bias of one input; the nominal one when left out. */
  biasAmps?: number;
  delayLowHighSeconds?: number;
  delayHighLowSeconds?: number;
  forwardVolts?: number;
}

/**
 * Reduces a head at many corners: sets the numbers of one circuit again and again, which a search that
 * needs thousands of corners gains a factor of ten by.
 */
export function cornerReducer(
  head: Omit<Head, 'prepared' | 'demand' | 'minTimingOhms' | 'priceMinor'>,
  brief: SearchBrief,
): (corner: HeadCorner) => PreparedSingle {
  const circuit = headCircuit(head, brief);
  checkCircuit(circuit);
  return (corner) => prepareChecked(setCorner(circuit, head, brief, corner));
}

/**
 * The circuit of a head at 25 °C and the nominal supply with typical comparator figures, or at a
 * corner. Offset counts as zero where not given: its sign is unknown. A buffering section draws its
 * own bias from the reference node. Timing is 1 Ω and 1 F until they are set.
 */
export function headCircuit(
  head: Pick<HeadParts, 'comparator' | 'thresholds' | 'pullUp' | 'ledResistor' | 'buffered'>,
  brief: SearchBrief,
  corner: HeadCorner = {},
): Circuit {
  const { comparator, thresholds, ledResistor, buffered, pullUp } = head;
  const circuit = createCircuit({
    supplyVolts: brief.supplyVolts,
    r1Ohms: thresholds.r1.ohms,
    r2Ohms: thresholds.r2.ohms,
    r3Ohms: thresholds.r3.ohms,
    timing: { kind: 'single', ohms: 1 },
    capacitor: { farads: 1 },
    comparator: {
      output: comparator.output,
      pullUpOhms: pullUp?.ohms ?? null,
      hysteresisVolts: comparator.hysteresisVolts,
    },
    load:
      brief.load === null || ledResistor === null
        ? null
        : { volts: brief.load.forwardVolts, ohms: ledResistor.ohms, buffered },
  });
  return setCorner(circuit, head, brief, corner);
}

/** Writes a corner's numbers into a head's circuit; what the corner leaves out becomes nominal. */
function setCorner(
  circuit: Circuit,
  { comparator, thresholds, buffered }: Pick<HeadParts, 'comparator' | 'thresholds' | 'buffered'>,
  brief: SearchBrief,
  corner: HeadCorner,
): Circuit {
  const outputFactor = corner.outputFactor ?? 1;
  const biasAmps = corner.biasAmps ?? comparator.inputBiasAmps;
  circuit.supplyVolts = corner.supplyVolts ?? brief.supplyVolts;
  circuit.r1Ohms = corner.r1Ohms ?? thresholds.r1.ohms;
  circuit.r2Ohms = corner.r2Ohms ?? thresholds.r2.ohms;
  circuit.r3Ohms = corner.r3Ohms ?? thresholds.r3.ohms;
  const stage = circuit.comparator;
  stage.highOhms = comparator.highOhms * outputFactor;
  stage.lowOhms = comparator.lowOhms * outputFactor;
  stage.delayLowHighSeconds = corner.delayLowHighSeconds ?? comparator.delayLowHighSeconds;
  stage.delayHighLowSeconds = corner.delayHighLowSeconds ?? comparator.delayHighLowSeconds;
  stage.invertingBiasAmps = biasAmps;
  stage.nonInvertingBiasAmps = buffered ? 2 * biasAmps : biasAmps;
  stage.offsetVolts = corner.offsetVolts ?? 0;
  if (circuit.load && brief.load) {
    circuit.load.volts = corner.forwardVolts ?? brief.load.forwardVolts;
  }
  return circuit;
}
