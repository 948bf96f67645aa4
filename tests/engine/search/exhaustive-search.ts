import { createCircuit, type Circuit } from '../../../server/engine/circuit.ts';
import { analyseCycle } from '../../../server/engine/cycle.ts';
import type {
  SearchBrief,
  Shelf,
  StockedCapacitor,
  StockedComparator,
  StockedDiode,
  StockedResistor,
} from '../../../server/engine/search/shelf.ts';

/** All of a kit but its timing resistance, written out part by part. */
export interface FrameParts {
  comparator: StockedComparator;
  thresholds: [StockedResistor, StockedResistor, StockedResistor];
  pullUp: StockedResistor | null;
  ledResistor: StockedResistor | null;
  /** Two of these hold the inputs of idle sections apart. */
  idle: StockedResistor | null;
  capacitor: StockedCapacitor;
}

export interface SingleTiming {
  kind: 'single';
  first: StockedResistor;
  second: StockedResistor | null;
  join: 'series' | 'parallel' | null;
  ohms: number;
}

export interface SteeredTiming {
  kind: 'steered';
  charge: StockedResistor;
  discharge: StockedResistor;
  diode: StockedDiode;
}

/** One way to make a kit. */
export interface Recipe {
  frame: FrameParts;
  timing: SingleTiming | SteeredTiming;
}

export interface Outcome extends Recipe {
  frequencyHz: number;
  distance: number;
  priceMinor: number;
}

/**
 * Every kit that the written rules allow, by plain loops and the full model. It knows the rules'
 * sentences and numbers and nothing of how the search walks through them.
 */
export function everyKit(shelf: Shelf, brief: SearchBrief): Outcome[] {
  return [...everySingle(shelf, brief), ...everySteered(shelf, brief)];
}

function everySingle(shelf: Shelf, brief: SearchBrief): Outcome[] {
  const ways = timings(shelf.resistors);
  return everyFrame(shelf, brief).flatMap((frame) => {
    const lowest = lowestTiming(shelf, frame, brief);
    return ways
      .filter(({ ohms }) => ohms >= lowest)
      .map((timing): Recipe => ({ frame, timing }))
      .filter((recipe) => isOnTheShelf(recipe, brief.quantity))
      .flatMap((recipe) => outcomeOf(recipe, brief) ?? []);
  });
}

function outcomeOf(recipe: Recipe, brief: SearchBrief): Outcome | null {
  const frequencyHz = rateOf(recipe, brief);
  if (frequencyHz === null) return null;
  const distance = Math.abs(Math.log(frequencyHz / brief.targetHz));
  return { ...recipe, frequencyHz, distance, priceMinor: priceOf(recipe) };
}

function everyFrame(shelf: Shelf, brief: SearchBrief): FrameParts[] {
  const capacitors = shelf.capacitors.filter((part) => setsTime(part, brief));
  return shelf.comparators
    .filter((part) => runs(part, brief))
    .flatMap((comparator) => {
      const around = partsAround(shelf, comparator, brief);
      if (around === null) return [];
      return thresholdChoices(shelf.resistors, comparator, brief)
        .filter((thresholds) => bearsLed(comparator, thresholds, brief))
        .flatMap((thresholds) =>
          capacitors.map((capacitor) => ({ comparator, thresholds, capacitor, ...around })),
        );
    });
}

/** Pull-up, LED resistor and the resistor of idle sections; null where one is needed and missing. */
function partsAround(shelf: Shelf, comparator: StockedComparator, brief: SearchBrief) {
  const stocked = shelf.resistors.filter((part) => part.available >= brief.quantity);
  let pullUp: StockedResistor | null = null;
  if (comparator.output === 'open-drain') {
    const cool = stocked.filter((part) => staysCool(part, brief.maxSupplyVolts));
    pullUp = nearest(cool, brief.supplyVolts / 5e-4);
    if (pullUp === null) return null;
  }
  let ledResistor: StockedResistor | null = null;
  if (brief.load !== null) {
    const { amps, forwardVolts, minForwardVolts } = brief.load;
    const ideal = (brief.supplyVolts - forwardVolts) / amps - comparator.highOhms;
    const most = brief.maxSupplyVolts - minForwardVolts;
    const usable = stocked.filter((part) => part.ohms > ideal * 0.999999 && staysCool(part, most));
    ledResistor = ideal > 0 ? nearest(usable, ideal) : null;
    if (ledResistor === null) return null;
  }
  const busy = brief.load !== null && comparator.sections > 1 ? 2 : 1;
  let idle: StockedResistor | null = null;
  if (comparator.sections > busy) {
    const usable = shelf.resistors.filter(
      (part) => part.ohms >= 1e3 && part.ohms <= 1e4 && part.available >= 2 * brief.quantity,
    );
    idle = nearest(usable, 1e4);
    if (idle === null) return null;
  }
  return { pullUp, ledResistor, idle };
}

/** At most half of the rated power. */
function staysCool(part: StockedResistor, volts: number): boolean {
  return volts ** 2 / part.ohms <= part.ratedWatts / 2;
}

function runs(part: StockedComparator, brief: SearchBrief): boolean {
  if (part.available < brief.quantity) return false;
  if (part.minSupplyVolts > brief.minSupplyVolts) return false;
  if (part.maxSupplyVolts < brief.maxSupplyVolts) return false;
  if ((part.delayLowHighSeconds + part.delayHighLowSeconds) * brief.targetHz > 0.1) return false;
  if (brief.load === null) return true;
  return part.output === 'push-pull' && part.maxOutputAmps >= brief.load.amps;
}

/**
 * Where no spare section drives it, the LED's drop over the output resistance is at most 12 % of what
 * lies above the upper threshold.
 */
function bearsLed(
  part: StockedComparator,
  [r1, r2, r3]: FrameParts['thresholds'],
  brief: SearchBrief,
): boolean {
  if (brief.load === null || part.sections > 1) return true;
  const upperVolts =
    (brief.supplyVolts * (1 / r1.ohms + 1 / r3.ohms)) / (1 / r1.ohms + 1 / r2.ohms + 1 / r3.ohms);
  return brief.load.amps * part.highOhms <= 0.12 * (brief.supplyVolts - upperVolts);
}

function setsTime(part: StockedCapacitor, brief: SearchBrief): boolean {
  if (part.available < brief.quantity || part.farads < 1e-10) return false;
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

/** Resistors of a tolerance of which every kit can have three. */
function usableThresholds(resistors: readonly StockedResistor[], tolerance: number, count: number) {
  return resistors.filter(
    (part) => part.tolerance <= tolerance * 1.000001 && part.available >= 3 * count,
  );
}

export function thresholdChoices(
  resistors: readonly StockedResistor[],
  comparator: StockedComparator,
  brief: SearchBrief,
): FrameParts['thresholds'][] {
  const { duty } = brief;
  if (Math.abs(duty - 0.5) <= 0.005) return equalChoices(resistors, comparator, brief);
  if (duty < 0.05 || duty > 0.95) return [];
  const ideal = idealThreshold(comparator, brief);
  const usable = usableThresholds(resistors, 0.01, brief.quantity);
  // With R1/R3 = 4^(1−D) − 1 and R2/R3 = 4^D − 1 the period stays 2·ln 2·R4·C (model section 5).
  return usable
    .filter((r3) => r3.ohms >= ideal / 2 && r3.ohms <= 2 * ideal)
    .map((r3): { set: FrameParts['thresholds']; miss: number } => {
      const r1 = nearest(usable, r3.ohms * (4 ** (1 - duty) - 1))!;
      const r2 = nearest(usable, r3.ohms * (4 ** duty - 1))!;
      const high = Math.log(1 + r2.ohms / r3.ohms);
      const low = Math.log(1 + r1.ohms / r3.ohms);
      return { set: [r1, r2, r3], miss: Math.abs(high / (high + low) - duty) };
    })
    .filter(({ miss }) => miss <= 0.01)
    .sort((a, b) => a.miss - b.miss || a.set[2].id - b.set[2].id)
    .slice(0, 3)
    .map(({ set }) => set);
}

/** The SKU nearest to the ideal of 1 % or better, then, where it is another, of 0.1 % or better. */
function equalChoices(
  resistors: readonly StockedResistor[],
  comparator: StockedComparator,
  brief: SearchBrief,
): FrameParts['thresholds'][] {
  const ideal = idealThreshold(comparator, brief);
  const chosen = new Set<StockedResistor>();
  for (const tolerance of [0.01, 0.001]) {
    const one = nearest(usableThresholds(resistors, tolerance, brief.quantity), ideal);
    if (one !== null) chosen.add(one);
  }
  return [...chosen].map((one) => [one, one, one]);
}

/** One resistor alone or two joined, between 1 kΩ and 10 MΩ. */
export function timings(resistors: readonly StockedResistor[]): SingleTiming[] {
  const ways: SingleTiming[] = [];
  resistors.forEach((first, i) => {
    ways.push({ kind: 'single', first, second: null, join: null, ohms: first.ohms });
    for (const second of resistors.slice(i)) {
      const series = first.ohms + second.ohms;
      const parallel = 1 / (1 / first.ohms + 1 / second.ohms);
      ways.push({ kind: 'single', first, second, join: 'series', ohms: series });
      ways.push({ kind: 'single', first, second, join: 'parallel', ohms: parallel });
    }
  });
  return ways.filter(({ ohms }) => ohms >= 1e3 * (1 - 1e-12) && ohms <= 1e7);
}

/**
 * Twenty times output resistance and pull-up, and half the power of the shelf's smallest resistor
 * (no more than 0.25 W) with the whole supply across it.
 */
function lowestTiming(shelf: Shelf, { comparator, pullUp }: FrameParts, brief: SearchBrief) {
  const watts = Math.min(0.25, ...shelf.resistors.map((part) => part.ratedWatts));
  return Math.max(
    1e3 * (1 - 1e-12),
    20 * Math.max(comparator.highOhms, comparator.lowOhms, pullUp?.ohms ?? 0),
    (2 * brief.maxSupplyVolts ** 2) / watts,
  );
}

/**
 * The steered kits that the rules allow: duties from 0.1 beside one half; for each comparator the
 * equal thresholds nearest to the ideal that can be made; RC and RD the stocked resistors nearest to
 * what the asked high and low time need without bias and leakage, that ideal lying between 2 kΩ, or
 * what a single one must be at least, and 1 MΩ; the duty within 1 % of the asked one; and the reversed
 * diode, twice as leaky as in the catalogue and at the hottest, dropping no more than 2 % of a third of
 * the lowest supply over the larger resistor.
 */
function everySteered(shelf: Shelf, brief: SearchBrief): Outcome[] {
  if (Math.abs(brief.duty - 0.5) < 0.1 || brief.duty < 0.05 || brief.duty > 0.95) return [];
  const diodes = shelf.diodes.filter((part) => part.available >= 2 * brief.quantity);
  const even = { ...brief, duty: 0.5 };
  const frames = everyFrame(shelf, even).filter((frame) => fixedOnTheShelf(frame, brief.quantity));
  return frames.flatMap((frame) => {
    const first = frames.find((other) => other.comparator.id === frame.comparator.id)!;
    if (first.thresholds[0].id !== frame.thresholds[0].id) return [];
    return diodes.flatMap((diode) => steeredOutcome(shelf, frame, diode, brief) ?? []);
  });
}

function steeredOutcome(
  shelf: Shelf,
  frame: FrameParts,
  diode: StockedDiode,
  brief: SearchBrief,
): Outcome | null {
  const ideal = idealSteering(frame, diode, brief);
  if (ideal === null) return null;
  const least = Math.max(2e3, lowestTiming(shelf, frame, brief));
  if (Math.min(ideal.chargeOhms, ideal.dischargeOhms) < least) return null;
  const { quantity } = brief;
  const spare = (parts: readonly StockedResistor[]) =>
    shelf.resistors.filter((part) => isEnough([...fixedParts(frame), ...parts, part], quantity));
  const charge = nearest(spare([]), ideal.chargeOhms);
  if (charge === null) return null;
  const discharge = nearest(spare([charge]), ideal.dischargeOhms);
  if (discharge === null) return null;
  const drop = 2 * hotSaturationAmps(diode, brief) * Math.max(charge.ohms, discharge.ohms);
  if (drop > (0.02 * brief.minSupplyVolts) / 3) return null;
  const recipe: Recipe = { frame, timing: { kind: 'steered', charge, discharge, diode } };
  const cycle = analyseCycle(circuitOf(recipe, brief));
  if (cycle.kind !== 'oscillates' || Math.abs(cycle.duty - brief.duty) > 0.01) return null;
  return outcomeOf(recipe, brief);
}

/** The junction law of model section 0, at the hottest of 25 °C and the ambient range. */
function hotSaturationAmps(diode: StockedDiode, brief: SearchBrief): number {
  const kelvins = 273.15 + Math.max(25, brief.maxCelsius);
  const ratio = kelvins / 298.15;
  const thermalVolts = 8.617333262e-5 * kelvins;
  const { emissionCoefficient: n, energyGapElectronVolts: gap } = diode;
  const power = diode.saturationTemperatureExponent / n;
  return diode.saturationAmps * Math.exp(((ratio - 1) * gap) / (n * thermalVolts)) * ratio ** power;
}

/** By repeated correction of each resistance by what its own half period misses. */
function idealSteering(frame: FrameParts, diode: StockedDiode, brief: SearchBrief) {
  const [high, low] = [brief.duty / brief.targetHz, (1 - brief.duty) / brief.targetHz];
  const { farads } = frame.capacitor;
  let [chargeOhms, dischargeOhms] = [high / (0.7 * farads), low / (0.7 * farads)];
  if (Math.max(chargeOhms, dischargeOhms) > 1e7 || Math.min(chargeOhms, dischargeOhms) < 400) {
    return null;
  }
  for (let step = 0; step < 30; step += 1) {
    const circuit = steeredCircuit(frame, diode, chargeOhms, dischargeOhms, brief);
    circuit.capacitor = { ...circuit.capacitor, leakageOhms: null, leakageAmps: 0 };
    circuit.comparator = { ...circuit.comparator, invertingBiasAmps: 0, nonInvertingBiasAmps: 0 };
    const cycle = analyseCycle(circuit);
    if (cycle.kind !== 'oscillates') return null;
    chargeOhms *= high / cycle.highSeconds;
    dischargeOhms *= low / cycle.lowSeconds;
  }
  return Math.max(chargeOhms, dischargeOhms) <= 1e6 ? { chargeOhms, dischargeOhms } : null;
}

function steeredCircuit(
  frame: FrameParts,
  diode: StockedDiode,
  chargeOhms: number,
  dischargeOhms: number,
  brief: SearchBrief,
): Circuit {
  return {
    ...circuitOfFrame(frame, brief),
    timing: { kind: 'steered', chargeOhms, dischargeOhms, diode },
  };
}

function fixedParts({ thresholds, pullUp, ledResistor, idle }: FrameParts) {
  return [...thresholds, pullUp, ledResistor, idle, idle];
}

function timingParts({ timing }: Recipe): (StockedResistor | null)[] {
  return timing.kind === 'single'
    ? [timing.first, timing.second]
    : [timing.charge, timing.discharge];
}

function isEnough(taken: readonly (StockedResistor | null)[], quantity: number): boolean {
  return taken.every(
    (part) =>
      part === null ||
      part.available >= quantity * taken.filter((other) => other?.id === part.id).length,
  );
}

function fixedOnTheShelf(frame: FrameParts, quantity: number): boolean {
  return isEnough(fixedParts(frame), quantity);
}

/** A value used twice counts twice. */
export function isOnTheShelf(recipe: Recipe, quantity: number): boolean {
  const { frame, timing } = recipe;
  return (
    frame.comparator.available >= quantity &&
    frame.capacitor.available >= quantity &&
    (timing.kind === 'single' || timing.diode.available >= 2 * quantity) &&
    isEnough([...fixedParts(frame), ...timingParts(recipe)], quantity)
  );
}

/** Net price of comparator, capacitor, all resistors and diodes, in minor units. */
export function priceOf(recipe: Recipe): number {
  const { frame, timing } = recipe;
  const diodes = timing.kind === 'steered' ? [timing.diode, timing.diode] : [];
  const parts = [
    frame.comparator,
    frame.capacitor,
    ...fixedParts(frame),
    ...timingParts(recipe),
    ...diodes,
  ];
  return parts.reduce((sum, part) => sum + (part?.priceMinor ?? 0), 0);
}

/** The nominal rate by the full model; null when the kit does not oscillate. */
export function rateOf(recipe: Recipe, brief: SearchBrief): number | null {
  const cycle = analyseCycle(circuitOf(recipe, brief));
  return cycle.kind === 'oscillates' ? cycle.frequencyHz : null;
}

/** The nominal circuit: 25 °C, nominal supply, typical comparator without offset. */
export function circuitOf({ frame, timing }: Recipe, brief: SearchBrief): Circuit {
  if (timing.kind === 'steered') {
    const { charge, discharge, diode } = timing;
    return steeredCircuit(frame, diode, charge.ohms, discharge.ohms, brief);
  }
  return { ...circuitOfFrame(frame, brief), timing: { kind: 'single', ohms: timing.ohms } };
}

function circuitOfFrame(frame: FrameParts, brief: SearchBrief): Circuit {
  const { comparator, capacitor, thresholds, pullUp, ledResistor } = frame;
  const buffered = brief.load !== null && comparator.sections > 1;
  const { insulationSeconds, farads } = capacitor;
  return createCircuit({
    supplyVolts: brief.supplyVolts,
    r1Ohms: thresholds[0].ohms,
    r2Ohms: thresholds[1].ohms,
    r3Ohms: thresholds[2].ohms,
    timing: { kind: 'single', ohms: 1 },
    capacitor: {
      farads,
      leakageAmps: capacitor.leakageAmps,
      leakageOhms: insulationSeconds === null ? null : insulationSeconds / farads,
    },
    comparator: {
      output: comparator.output,
      highOhms: comparator.highOhms,
      lowOhms: comparator.lowOhms,
      pullUpOhms: pullUp?.ohms ?? null,
      delayLowHighSeconds: comparator.delayLowHighSeconds,
      delayHighLowSeconds: comparator.delayHighLowSeconds,
      invertingBiasAmps: comparator.inputBiasAmps,
      // The buffering section's input hangs on the reference node too.
      nonInvertingBiasAmps: (buffered ? 2 : 1) * comparator.inputBiasAmps,
      hysteresisVolts: comparator.hysteresisVolts,
    },
    load:
      brief.load && ledResistor
        ? { volts: brief.load.forwardVolts, ohms: ledResistor.ohms, buffered }
        : null,
  });
}
