import { nearestResistor } from './nearest-resistor.ts';
import { limits, idealThresholdOhms } from './rules.ts';
import { firstNotBelow, type ResistorValues } from './resistor-values.ts';
import type { SearchBrief, StockedComparator, StockedResistor } from './shelf.ts';

/** Three stocked resistors that set the thresholds; the same one thrice for equal thresholds. */
export interface ThresholdSet {
  r1: StockedResistor;
  r2: StockedResistor;
  r3: StockedResistor;
}

const swingLog = Math.LN2 * 2;
const setsKept = 3;

/**
 * The threshold sets a comparator may use for a brief, from resistors of 1 % or better of which the
 * shelf holds three for every kit. With a duty of one half, three of one SKU, nearest to the ideal
 * value, once among all of these and once among those of 0.1 % or better; with another duty, the
 * three sets nearest to the asked duty. Empty when there are none, or when the duty is outside
 * 5…95 %. What is found is kept in `known` by the ideal value in ohms.
 */
export function thresholdSets(
  values: ResistorValues,
  part: StockedComparator,
  brief: SearchBrief,
  known: Map<number, ThresholdSet[]> = new Map(),
): ThresholdSet[] {
  const ideal = idealThresholdOhms(part, brief);
  let sets = known.get(ideal);
  if (!sets) {
    sets = findSets(values, ideal, brief);
    known.set(ideal, sets);
  }
  return sets;
}

function findSets(values: ResistorValues, idealOhms: number, brief: SearchBrief): ThresholdSet[] {
  const { duty, quantity } = brief;
  if (isEqualDuty(duty)) return equalSets(values, idealOhms, quantity);
  if (duty < limits.minDuty || duty > limits.maxDuty) return [];
  return shiftedSets(values, idealOhms, duty, quantity);
}

/** Tells the resistors that may set thresholds: tight enough, and three of them for every kit. */
function maySetThresholds(tolerance: number, quantity: number) {
  return (part: StockedResistor) =>
    part.tolerance <= tolerance * (1 + 1e-9) && part.available >= 3 * quantity;
}

/** True for a duty so near one half that equal thresholds serve it. */
export function isEqualDuty(duty: number): boolean {
  return Math.abs(duty - 0.5) <= limits.equalDutyTolerance;
}

function equalSets(values: ResistorValues, idealOhms: number, quantity: number): ThresholdSet[] {
  const sets: ThresholdSet[] = [];
  for (const tolerance of [limits.thresholdTolerance, limits.preciseTolerance]) {
    const one = nearestResistor(values, idealOhms, maySetThresholds(tolerance, quantity));
    if (one !== null && sets[0]?.r1 !== one) sets.push({ r1: one, r2: one, r3: one });
  }
  return sets;
}

/** Duty of an ideal circuit with these three: ln(1+R2/R3) over the whole (model section 5). */
function idealDuty(set: ThresholdSet): number {
  const high = Math.log1p(set.r2.ohms / set.r3.ohms);
  const low = Math.log1p(set.r1.ohms / set.r3.ohms);
  return high / (high + low);
}

function shiftedSets(
  values: ResistorValues,
  idealOhms: number,
  duty: number,
  quantity: number,
): ThresholdSet[] {
  const passes = maySetThresholds(limits.thresholdTolerance, quantity);
  const sets: { set: ThresholdSet; miss: number }[] = [];
  const start = firstNotBelow(values.ohms, (idealOhms / 2) * (1 - 1e-12));
  for (let k = start; k < values.ohms.length && values.ohms[k]! <= 2 * idealOhms; k += 1) {
    for (const r3 of values.parts[k]!) {
      if (!passes(r3)) continue;
      const r1 = nearestResistor(values, r3.ohms * Math.expm1((1 - duty) * swingLog), passes)!;
      const r2 = nearestResistor(values, r3.ohms * Math.expm1(duty * swingLog), passes)!;
      const set = { r1, r2, r3 };
      const miss = Math.abs(idealDuty(set) - duty);
      if (miss <= limits.dutyTolerance) sets.push({ set, miss });
    }
  }
  sets.sort((a, b) => a.miss - b.miss || a.set.r3.id - b.set.r3.id);
  return sets.slice(0, setsKept).map((entry) => entry.set);
}
