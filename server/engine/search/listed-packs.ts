import { holdsBand, mayHold, rememberHopeless } from './best-value.ts';
import { byValue, type Candidate } from './candidate.ts';
import { conditionShifts, shiftRange, timingCoefficient } from './kit-effects.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import type { SearchBrief } from './shelf.ts';
import { quickBound, steadier, steadyOf, type Steady } from './steadiest.ts';
import { supplyReach } from './steered.ts';
import { settingError } from './trimmed.ts';
import { tunedClassOf } from './tuned-grid.ts';

/** The cheapest of a list that holds the band and is cheaper than the best so far. */
export function cheapestThatHolds(
  list: readonly Candidate[],
  before: Candidate | null,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate | null {
  const hopeless = rememberHopeless(brief);
  for (const candidate of [...list].sort(byValue)) {
    if (before !== null && byValue(candidate, before) >= 0) return before;
    if (candidate.distance > -Math.log1p(-brief.band)) continue;
    const { frame, timing } = candidate;
    if (timing.kind === 'single') {
      if (hopeless({ ...frame, idealOhms: timing.ohms })) continue;
      if (!mayHold({ ...candidate, timing }, brief)) continue;
    }
    if (holdsBand(candidate, brief, shelf)) return candidate;
  }
  return before;
}

/** The steadiest of a list, if it is steadier than the best so far; by lower bounds first. */
export function steadiestOf(
  list: readonly Candidate[],
  before: Steady | null,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Steady | null {
  const queue = list
    .map((candidate) => ({ candidate, bound: leastEnd(candidate, brief) }))
    .sort((a, b) => a.bound - b.bound);
  let best = before;
  for (const { candidate, bound } of queue) {
    if (best !== null && bound > best.end) break;
    best = steadier(best, steadyOf(candidate, brief, shelf));
  }
  return best;
}

/** Less than the worse end of a candidate: its tolerances, and nearly all of its drift. */
function leastEnd({ frame, timing }: Candidate, brief: SearchBrief): number {
  const { capacitor } = frame;
  if (timing.kind === 'steered') {
    const least = Math.min(timing.charge.tolerance, timing.discharge.tolerance);
    return joined(quickBound(frame, least), 0.9 * supplyReach(frame, timing, brief));
  }
  if (timing.kind === 'trimmed') {
    return 0.85 * (capacitor.temperatureSpread + settingError(timing.ohms, timing.trimmer));
  }
  const shifts = conditionShifts(frame, timing.ohms, brief);
  const { up, down } = shiftRange(shifts, timingCoefficient(timing), -1);
  const measured = { ...frame, capacitor: { ...capacitor, tolerance: brief.meterUncertainty } };
  const least = Math.min(tunedClassOf(timing), timing.first.tolerance);
  return joined(quickBound(measured, least), (0.9 * (up - down)) / 2);
}

/** The worse end of a band whose half-width in ln is that of `bound` and `half` together. */
function joined(bound: number, half: number): number {
  return Math.tanh(Math.atanh(Math.min(bound, 0.999)) + half);
}
