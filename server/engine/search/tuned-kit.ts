import { aimFrame, type Frame } from './aim.ts';
import type { ResistorDemand } from './demand.ts';
import type { GuaranteedBand } from './guaranteed-band.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { promise, type RankedPack } from './promise.ts';
import { lowestTimingOhms } from './rules.ts';
import type { SearchBrief } from './shelf.ts';
import type { SingleTimingParts } from './timing-choice.ts';
import { gridCandidates } from './tuned.ts';

/** One kit with its very capacitor measured and its timing resistance chosen for it. */
export type TunedKit = RankedPack & { timing: SingleTimingParts };

/** All of a kit but R4 is kept for it already, so nothing more is taken beside R4. */
const nothingElse: ResistorDemand = { ids: [], counts: [] };

/**
 * The kits that a measured capacitor can become, nearest to the target first: the stocked resistances
 * of a class of tolerance next below and above what the reading, in farads, asks for. `frame` is the
 * sold pack's, `limit` its class as a fraction (`tunedClassOf`). Each has the promise of that one kit:
 * the nominal rate for the reading, and a guaranteed band in which the capacitor stands within ± the
 * meter's uncertainty of the reading and R4 within its own tolerance. Empty when no allowed resistance
 * gives the target, or the shelf holds none. Throws a RangeError unless `farads` is above zero and
 * finite. Neglects that the meter may be off by a fixed amount beside the share.
 */
export function tunedKits(
  frame: Frame,
  farads: number,
  limit: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): TunedKit[] {
  if (!(farads > 0 && farads < Number.POSITIVE_INFINITY)) {
    throw new RangeError(`A capacitor reads more than 0 F, not ${farads}.`);
  }
  const one: SearchBrief = { ...brief, quantity: 1, care: 'as-stocked' };
  const measured = measuredFrame(frame, farads, one, shelf);
  const { ohms, reaches } = aimFrame(measured, one);
  if (!reaches) return [];
  return gridCandidates(measured, ohms, limit, one, shelf).map((candidate) => ({
    ...promise(candidate, one, shelf),
    timing: candidate.timing,
  }));
}

/** The sold frame with its capacitor as it was measured, and the least timing resistance it may have. */
function measuredFrame(
  { head, capacitor }: Frame,
  farads: number,
  brief: SearchBrief,
  { smallestWatts }: PreparedShelf,
): Frame {
  const { comparator, pullUp } = head;
  const minTimingOhms = lowestTimingOhms(comparator, pullUp?.ohms ?? null, brief, smallestWatts);
  return {
    head: { ...head, demand: nothingElse, minTimingOhms },
    capacitor: { ...capacitor, farads, tolerance: brief.meterUncertainty, deviation: null },
  };
}

/** Share by which two bands worked out on different ways may differ in their last figures. */
const sameEnd = 1e-12;

/** True when a band, in hertz, lies inside another or reaches to its ends. */
export function liesInside(band: GuaranteedBand, outer: GuaranteedBand): boolean {
  return band.minHz >= outer.minHz * (1 - sameEnd) && band.maxHz <= outer.maxHz * (1 + sameEnd);
}
