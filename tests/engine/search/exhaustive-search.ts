import { createCircuit } from '../../../server/engine/circuit.ts';
import { analyseCycle } from '../../../server/engine/cycle.ts';
import type {
  SearchBrief,
  Shelf,
  StockedCapacitor,
  StockedComparator,
  StockedResistor,
} from '../../../server/engine/search/shelf.ts';

/** One way to make a kit, written out part by part. */
export interface Recipe {
  comparator: StockedComparator;
  thresholds: [StockedResistor, StockedResistor, StockedResistor];
  pullUp: StockedResistor | null;
  ledResistor: StockedResistor | null;
  capacitor: StockedCapacitor;
  timing: { first: StockedResistor; second: StockedResistor | null; ohms: number };
}

export interface Outcome extends Recipe {
  frequencyHz: number;
  distance: number;
}

/**
 * Every kit that the written rules allow, by plain loops and the full model. It knows the rules'
 * sentences and numbers and nothing of how the search walks through them.
 */
export function everyKit(shelf: Shelf, brief: SearchBrief): Outcome[] {
  return frames(shelf, brief).flatMap((frame) =>
    timings(shelf.resistors)
      .filter(({ ohms }) => ohms >= lowestTiming(frame) && ohms <= 1e7)
      .map((timing): Recipe => ({ ...frame, timing }))
      .filter((recipe) => isOnTheShelf(recipe, brief.quantity))
      .flatMap((recipe) => {
        const frequencyHz = rateOf(recipe, brief);
        if (frequencyHz === null) return [];
        return [
          { ...recipe, frequencyHz, distance: Math.abs(Math.log(frequencyHz / brief.targetHz)) },
        ];
      }),
  );
}

type FrameParts = Omit<Recipe, 'timing'>;

function frames(shelf: Shelf, brief: SearchBrief): FrameParts[] {
  return shelf.comparators
    .filter((part) => runs(part, brief))
    .flatMap((comparator) => {
      const stocked = shelf.resistors.filter((part) => part.available >= brief.quantity);
      const openDrain = comparator.output === 'open-drain';
      const pullUp = openDrain ? nearest(stocked, brief.supplyVolts / 5e-4) : null;
      if (openDrain && pullUp === null) return [];
      let ledResistor: StockedResistor | null = null;
      if (brief.load !== null) {
        const ideal =
          (brief.supplyVolts - brief.load.forwardVolts) / brief.load.amps - comparator.highOhms;
        ledResistor =
          ideal > 0
            ? nearest(
                stocked.filter((part) => part.ohms >= ideal * (1 - 1e-9)),
                ideal,
              )
            : null;
        if (ledResistor === null) return [];
      }
      return thresholdChoices(shelf.resistors, comparator, brief)
        .filter((thresholds) => bearsLed(comparator, thresholds, brief))
        .flatMap((thresholds) =>
          shelf.capacitors
            .filter((part) => setsTime(part, brief))
            .map((capacitor) => ({ comparator, thresholds, pullUp, ledResistor, capacitor })),
        );
    });
}

function runs(part: StockedComparator, brief: SearchBrief): boolean {
  if (part.available < brief.quantity) return false;
  if (part.minSupplyVolts > brief.minSupplyVolts) return false;
  if (part.maxSupplyVolts < brief.maxSupplyVolts) return false;
  if ((part.delayLowHighSeconds + part.delayHighLowSeconds) * brief.targetHz > 0.1) return false;
  if (brief.load === null) return true;
  return part.output === 'push-pull' && part.maxOutputAmps >= brief.load.amps;
}

/** The LED's drop over the output resistance is at most 12 % of what lies above the upper threshold. */
function bearsLed(
  part: StockedComparator,
  [r1, r2, r3]: Recipe['thresholds'],
  brief: SearchBrief,
): boolean {
  if (brief.load === null) return true;
  const upperVolts =
    (brief.supplyVolts * (1 / r1.ohms + 1 / r3.ohms)) / (1 / r1.ohms + 1 / r2.ohms + 1 / r3.ohms);
  return brief.load.amps * part.highOhms <= 0.12 * (brief.supplyVolts - upperVolts);
}

function setsTime(part: StockedCapacitor, brief: SearchBrief): boolean {
  if (part.available < brief.quantity || part.farads < 1e-9) return false;
  if (part.dielectric === 'X7R') return false;
  if (part.dielectric === 'electrolytic' && brief.band < 0.2) return false;
  return part.ratedVolts * 0.8 >= brief.maxSupplyVolts;
}

/** The nearest by ratio; among equals the cheaper, then the lower id. */
function nearest(parts: readonly StockedResistor[], ohms: number): StockedResistor | null {
  const away = (part: StockedResistor) => Number(Math.abs(Math.log(part.ohms / ohms)).toFixed(11));
  const [best] = [...parts].sort(
    (a, b) => away(a) - away(b) || a.priceMinor - b.priceMinor || a.id - b.id,
  );
  return best ?? null;
}

function idealThreshold(part: StockedComparator, brief: SearchBrief): number {
  const pullUp = part.output === 'open-drain' ? brief.supplyVolts / 5e-4 : 0;
  const floor = Math.max(1e4, 100 * Math.max(part.highOhms, part.lowOhms), 20 * pullUp);
  const byBias = (0.006 * brief.minSupplyVolts) / Math.max(Math.abs(part.maxInputBiasAmps), 1e-15);
  const bySpeed = 0.006 / (brief.targetHz * 1e-11);
  return Math.max(floor, Math.min(1e6, byBias, bySpeed));
}

function thresholdChoices(
  resistors: readonly StockedResistor[],
  comparator: StockedComparator,
  brief: SearchBrief,
): Recipe['thresholds'][] {
  const ideal = idealThreshold(comparator, brief);
  const within = (tolerance: number) =>
    resistors.filter(
      (part) => part.tolerance <= tolerance * 1.000001 && part.available >= 3 * brief.quantity,
    );
  if (Math.abs(brief.duty - 0.5) <= 0.005) {
    return [0.01, 0.001].flatMap((tolerance): Recipe['thresholds'][] => {
      const one = nearest(within(tolerance), ideal);
      return one === null ? [] : [[one, one, one]];
    });
  }
  if (brief.duty < 0.2 || brief.duty > 0.8) return [];
  // With R1/R3 = 4^(1−D) − 1 and R2/R3 = 4^D − 1 the period stays 2·ln 2·R4·C (model section 5).
  const usable = within(0.01);
  return usable
    .filter((r3) => r3.ohms >= ideal / 2 && r3.ohms <= 2 * ideal)
    .map((r3): { set: Recipe['thresholds']; miss: number } => {
      const r1 = nearest(usable, r3.ohms * (4 ** (1 - brief.duty) - 1))!;
      const r2 = nearest(usable, r3.ohms * (4 ** brief.duty - 1))!;
      const high = Math.log(1 + r2.ohms / r3.ohms);
      const low = Math.log(1 + r1.ohms / r3.ohms);
      return { set: [r1, r2, r3], miss: Math.abs(high / (high + low) - brief.duty) };
    })
    .filter(({ miss }) => miss <= 0.01)
    .sort((a, b) => a.miss - b.miss || a.set[2].id - b.set[2].id)
    .slice(0, 3)
    .map(({ set }) => set);
}

function timings(resistors: readonly StockedResistor[]): Recipe['timing'][] {
  const singles = resistors.map((first) => ({ first, second: null, ohms: first.ohms }));
  const pairs = resistors.flatMap((first, i) =>
    resistors.slice(i).flatMap((second) => [
      { first, second, ohms: first.ohms + second.ohms },
      { first, second, ohms: 1 / (1 / first.ohms + 1 / second.ohms) },
    ]),
  );
  return [...singles, ...pairs].filter(({ ohms }) => ohms >= 1e3);
}

function lowestTiming({ comparator, pullUp }: FrameParts): number {
  return Math.max(1e3, 20 * Math.max(comparator.highOhms, comparator.lowOhms, pullUp?.ohms ?? 0));
}

/** A value used twice counts twice. */
export function isOnTheShelf(recipe: Recipe, quantity: number): boolean {
  const { thresholds, pullUp, ledResistor, timing } = recipe;
  const taken = [...thresholds, pullUp, ledResistor, timing.first, timing.second];
  return taken.every(
    (part) =>
      part === null ||
      part.available >= quantity * taken.filter((other) => other?.id === part.id).length,
  );
}

/** The nominal rate by the full model; null when the kit does not oscillate. */
export function rateOf(recipe: Recipe, brief: SearchBrief): number | null {
  const { comparator, capacitor, thresholds, pullUp, ledResistor, timing } = recipe;
  const cycle = analyseCycle(
    createCircuit({
      supplyVolts: brief.supplyVolts,
      r1Ohms: thresholds[0].ohms,
      r2Ohms: thresholds[1].ohms,
      r3Ohms: thresholds[2].ohms,
      timing: { kind: 'single', ohms: timing.ohms },
      capacitor: {
        farads: capacitor.farads,
        leakageAmps: capacitor.leakageAmps,
        leakageOhms:
          capacitor.insulationSeconds === null
            ? null
            : capacitor.insulationSeconds / capacitor.farads,
      },
      comparator: {
        output: comparator.output,
        highOhms: comparator.highOhms,
        lowOhms: comparator.lowOhms,
        pullUpOhms: pullUp?.ohms ?? null,
        delayLowHighSeconds: comparator.delayLowHighSeconds,
        delayHighLowSeconds: comparator.delayHighLowSeconds,
        invertingBiasAmps: comparator.inputBiasAmps,
        nonInvertingBiasAmps: comparator.inputBiasAmps,
        hysteresisVolts: comparator.hysteresisVolts,
      },
      load:
        brief.load && ledResistor
          ? { volts: brief.load.forwardVolts, ohms: ledResistor.ohms }
          : null,
    }),
  );
  return cycle.kind === 'oscillates' ? cycle.frequencyHz : null;
}
