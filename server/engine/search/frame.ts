import { createCircuit, type Circuit } from '../circuit.ts';
import { demandMakeable, demandOf, type ResistorDemand } from './demand.ts';
import {
  bearsLoad,
  capacitorSuits,
  comparatorSuits,
  idealLedOhms,
  idealPullUpOhms,
  lowestTimingOhms,
  nearestResistor,
} from './rules.ts';
import type {
  SearchBrief,
  Shelf,
  StockedCapacitor,
  StockedComparator,
  StockedResistor,
} from './shelf.ts';
import { thresholdSets, type ThresholdSet } from './threshold-sets.ts';

/** Everything of a pack but its timing resistance. */
export interface Frame {
  comparator: StockedComparator;
  thresholds: ThresholdSet;
  pullUp: StockedResistor | null;
  ledResistor: StockedResistor | null;
  capacitor: StockedCapacitor;
  demand: ResistorDemand;
  minTimingOhms: number;
  /** Net price of the framed parts that vary between packs, in minor units. */
  priceMinor: number;
}

/** Lists every frame the shelf and the rules allow, in ascending order of ids. */
export function framesFor(shelf: Shelf, brief: SearchBrief): Frame[] {
  const capacitors = shelf.capacitors.filter((part) => capacitorSuits(part, brief));
  const frames: Frame[] = [];
  for (const comparator of shelf.comparators) {
    if (!comparatorSuits(comparator, brief)) continue;
    const pullUp = choosePullUp(shelf.resistors, comparator, brief);
    const ledResistor = chooseLedResistor(shelf.resistors, comparator, brief);
    if (pullUp === undefined || ledResistor === undefined) continue;
    for (const thresholds of thresholdSets(shelf.resistors, comparator, brief)) {
      if (!bearsLoad(comparator, thresholds, brief)) continue;
      const { r1, r2, r3 } = thresholds;
      const fixed = [r1, r2, r3, pullUp, ledResistor];
      if (!demandMakeable(fixed, brief.quantity)) continue;
      const demand = demandOf(fixed);
      const minTimingOhms = lowestTimingOhms(comparator, pullUp?.ohms ?? null);
      const fixedPrice = fixed.reduce(
        (sum, part) => sum + (part?.priceMinor ?? 0),
        comparator.priceMinor,
      );
      for (const capacitor of capacitors) {
        const priceMinor = fixedPrice + capacitor.priceMinor;
        frames.push({
          comparator,
          thresholds,
          pullUp,
          ledResistor,
          capacitor,
          demand,
          minTimingOhms,
          priceMinor,
        });
      }
    }
  }
  return frames;
}

/** Null where none is needed, undefined where one is needed and the shelf has none. */
function choosePullUp(
  resistors: readonly StockedResistor[],
  comparator: StockedComparator,
  brief: SearchBrief,
): StockedResistor | null | undefined {
  if (comparator.output === 'push-pull') return null;
  const stocked = (part: StockedResistor) => part.available >= brief.quantity;
  return nearestResistor(resistors, idealPullUpOhms(brief), stocked) ?? undefined;
}

/** The smallest stocked value not under the ideal one, so that the asked current is never exceeded. */
function chooseLedResistor(
  resistors: readonly StockedResistor[],
  comparator: StockedComparator,
  brief: SearchBrief,
): StockedResistor | null | undefined {
  if (brief.load === null) return null;
  const ideal = idealLedOhms(comparator, brief);
  if (ideal <= 0) return undefined;
  const enough = (part: StockedResistor) =>
    part.available >= brief.quantity && part.ohms >= ideal * (1 - 1e-9);
  return nearestResistor(resistors, ideal, enough) ?? undefined;
}

/**
 * The nominal circuit of a frame at 25 °C and the nominal supply, with typical comparator figures.
 * Offset counts as zero: its sign is unknown. `timingOhms` is 1 Ω until the search sets it.
 */
export function frameCircuit(frame: Frame, brief: SearchBrief, timingOhms = 1): Circuit {
  const { comparator, capacitor, thresholds } = frame;
  return createCircuit({
    supplyVolts: brief.supplyVolts,
    r1Ohms: thresholds.r1.ohms,
    r2Ohms: thresholds.r2.ohms,
    r3Ohms: thresholds.r3.ohms,
    timing: { kind: 'single', ohms: timingOhms },
    capacitor: {
      farads: capacitor.farads,
      leakageOhms:
        capacitor.insulationSeconds === null
          ? null
          : capacitor.insulationSeconds / capacitor.farads,
      leakageAmps: capacitor.leakageAmps,
    },
    comparator: {
      output: comparator.output,
      highOhms: comparator.highOhms,
      lowOhms: comparator.lowOhms,
      pullUpOhms: frame.pullUp?.ohms ?? null,
      delayLowHighSeconds: comparator.delayLowHighSeconds,
      delayHighLowSeconds: comparator.delayHighLowSeconds,
      invertingBiasAmps: comparator.inputBiasAmps,
      nonInvertingBiasAmps: comparator.inputBiasAmps,
      hysteresisVolts: comparator.hysteresisVolts,
    },
    load:
      brief.load === null || frame.ledResistor === null
        ? null
        : { volts: brief.load.forwardVolts, ohms: frame.ledResistor.ohms },
  });
}
