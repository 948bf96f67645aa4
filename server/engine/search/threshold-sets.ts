import { limits, idealThresholdOhms, nearestResistor } from './rules.ts';
import { firstNotBelow, groupByValue, type ResistorValues } from './resistor-values.ts';
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
 * The threshold sets a comparator may use for a brief, out of `usable`: the resistors of 1 % or
 * better of which the shelf holds three for every kit. With a duty of one half, three of one SKU,
 * nearest to the ideal value, once among all of these and once among those of 0.1 % or better; with
 * another duty, the three sets nearest to the asked duty. Empty when there are none, or when the duty
 * is outside 5…95 %. What is found is kept in `known` by the ideal value in ohms.
 */
export function thresholdSets(
  usable: readonly StockedResistor[],
  part: StockedComparator,
  brief: SearchBrief,
  known: Map<number, ThresholdSet[]> = new Map(),
): ThresholdSet[] {
  const ideal = idealThresholdOhms(part, brief);
  let sets = known.get(ideal);
  if (!sets) {
    sets = findSets(usable, ideal, brief.duty);
    known.set(ideal, sets);
  }
  return sets;
}

function findSets(
  usable: readonly StockedResistor[],
  idealOhms: number,
  duty: number,
): ThresholdSet[] {
  if (isEqualDuty(duty)) return equalSets(usable, idealOhms);
  if (duty < limits.minDuty || duty > limits.maxDuty) return [];
  return shiftedSets(usable, idealOhms, duty);
}

/** True for a duty so near one half that equal thresholds serve it. */
export function isEqualDuty(duty: number): boolean {
  return Math.abs(duty - 0.5) <= limits.equalDutyTolerance;
}

/** Equal thresholds, as for a duty of one half: nearest to the ideal value, then tighter ones. */
export function equalSets(usable: readonly StockedResistor[], idealOhms: number): ThresholdSet[] {
  const sets: ThresholdSet[] = [];
  for (const tolerance of [limits.thresholdTolerance, limits.preciseTolerance]) {
    const one = nearestResistor(
      usable,
      idealOhms,
      (part) => part.tolerance <= tolerance * (1 + 1e-9),
    );
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
  usable: readonly StockedResistor[],
  idealOhms: number,
  duty: number,
): ThresholdSet[] {
  const byValue = groupByValue(usable);
  const sets: { set: ThresholdSet; miss: number }[] = [];
  for (const r3 of usable) {
    if (r3.ohms > 2 * idealOhms || r3.ohms < idealOhms / 2) continue;
    const r1 = nearestOf(byValue, r3.ohms * Math.expm1((1 - duty) * swingLog));
    const r2 = nearestOf(byValue, r3.ohms * Math.expm1(duty * swingLog));
    const set = { r1, r2, r3 };
    const miss = Math.abs(idealDuty(set) - duty);
    if (miss <= limits.dutyTolerance) sets.push({ set, miss });
  }
  sets.sort((a, b) => a.miss - b.miss || a.set.r3.id - b.set.r3.id);
  return sets.slice(0, setsKept).map((entry) => entry.set);
}

/** The part nearest by ratio; among equals the cheaper, then the lower id, as in `nearestResistor`. */
function nearestOf({ ohms, parts }: ResistorValues, idealOhms: number): StockedResistor {
  const at = firstNotBelow(ohms, idealOhms);
  const near = [at - 1, at].flatMap((k) => parts[k]?.[0] ?? []);
  return nearestResistor(near, idealOhms, () => true)!;
}
