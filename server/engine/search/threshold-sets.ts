import { limits, idealThresholdOhms, nearestResistor } from './rules.ts';
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
 * The threshold sets a comparator may use for a brief: with a duty of one half, three of one SKU,
 * nearest to the ideal value, once among resistors of 1 % or better and once among those of 0.1 % or
 * better; with another duty, the three sets of 1 % or better nearest to the asked duty.
 * Empty when the shelf has none, or when the duty is outside 20…80 %.
 */
export function thresholdSets(
  resistors: readonly StockedResistor[],
  part: StockedComparator,
  brief: SearchBrief,
): ThresholdSet[] {
  const ideal = idealThresholdOhms(part, brief);
  if (Math.abs(brief.duty - 0.5) <= limits.equalDutyTolerance) {
    return equalSets(resistors, ideal, brief.quantity);
  }
  if (brief.duty < limits.minDuty || brief.duty > limits.maxDuty) return [];
  return shiftedSets(resistors, ideal, brief);
}

function equalSets(
  resistors: readonly StockedResistor[],
  idealOhms: number,
  quantity: number,
): ThresholdSet[] {
  const sets: ThresholdSet[] = [];
  for (const tolerance of [limits.thresholdTolerance, limits.preciseTolerance]) {
    const one = nearestResistor(
      resistors,
      idealOhms,
      (part) => part.tolerance <= tolerance * (1 + 1e-9) && part.available >= 3 * quantity,
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
  resistors: readonly StockedResistor[],
  idealOhms: number,
  brief: SearchBrief,
): ThresholdSet[] {
  const usable = (part: StockedResistor) =>
    part.tolerance <= limits.thresholdTolerance * (1 + 1e-9) &&
    part.available >= 3 * brief.quantity;
  const sets: { set: ThresholdSet; miss: number }[] = [];
  for (const r3 of resistors) {
    if (!usable(r3) || r3.ohms > 2 * idealOhms || r3.ohms < idealOhms / 2) continue;
    const r1 = nearestResistor(
      resistors,
      r3.ohms * Math.expm1((1 - brief.duty) * swingLog),
      usable,
    );
    const r2 = nearestResistor(resistors, r3.ohms * Math.expm1(brief.duty * swingLog), usable);
    if (r1 === null || r2 === null) continue;
    const set = { r1, r2, r3 };
    const miss = Math.abs(idealDuty(set) - brief.duty);
    if (miss <= limits.dutyTolerance) sets.push({ set, miss });
  }
  sets.sort((a, b) => a.miss - b.miss || a.set.r3.id - b.set.r3.id);
  return sets.slice(0, setsKept).map((entry) => entry.set);
}
