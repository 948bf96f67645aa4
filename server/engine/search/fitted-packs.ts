import type { Candidate } from './candidate.ts';
import type { AimedFrame } from './closest.ts';
import { inOrder } from './in-order.ts';
import { conditionShifts, shiftRange } from './kit-effects.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { limits } from './rules.ts';
import type { SearchBrief } from './shelf.ts';
import { steadier, steadyOf, type Steady } from './steadiest.ts';
import { trimmedPack } from './trimmed.ts';
import { tunedPacks } from './tuned.ts';

/** The packs of care levels that fit the timing to each kit; null for those that do not. */
export function fittedPacks(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate[] | null {
  if (brief.care === 'bench-tuned') return tunedPacks(aimed, brief, shelf);
  if (brief.care !== 'trimmer-fitted') return null;
  return aimed.flatMap((frame) => (frame.reaches ? (trimmedPack(frame, brief, shelf) ?? []) : []));
}

/** Trimmed packs of the steadiest frames differ by their settings alone; so many are looked at. */
const trimmedLooked = 24;

/**
 * A steady trimmed pack alone: of the frames that supply, drift and dielectric leave the least, the
 * steadiest of the first two dozen packs.
 */
export function steadiestTrimmed(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Steady | null {
  const fixed = shelf.shelf.resistors.filter(
    (part) => part.tolerance <= limits.thresholdTolerance * (1 + 1e-9),
  );
  const parts = [...fixed, ...shelf.shelf.trimmers];
  const coefficients = [...new Set(parts.map((part) => part.temperatureCoefficientPerKelvin))];
  const boundOf = (frame: AimedFrame) => {
    const shifts = conditionShifts(frame, frame.idealOhms, brief);
    // Set at 25 °C, a kit is as far off as it drifts to either side.
    const ends = coefficients.map((coefficient) => {
      const { up, down } = shiftRange(shifts, coefficient, -1);
      return Math.max(up, -down);
    });
    return 0.85 * frame.capacitor.temperatureSpread + 0.95 * Math.min(...ends);
  };
  const queue = inOrder(
    aimed.filter(({ reaches }) => reaches).map((frame) => ({ frame, bound: boundOf(frame) })),
    ({ bound }) => bound,
  );
  let best: Steady | null = null;
  let looked = 0;
  for (const { frame, bound } of queue) {
    if (best !== null && (bound > best.end || looked >= trimmedLooked)) break;
    const pack = trimmedPack(frame, brief, shelf);
    if (pack === null) continue;
    looked += 1;
    best = steadier(best, steadyOf(pack, brief, shelf));
  }
  return best;
}
