import type { Candidate } from './candidate.ts';
import { closestOfFrame, withOffers, type AimedFrame } from './closest.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import type { SearchBrief } from './shelf.ts';
import { classStock, tunedClasses, tunedClassOf, tunedGrid } from './tuned-grid.ts';

/**
 * The tuned packs of frames: for every class whose resistors reach over all that the capacitor may
 * need, the pack nearest to the target at the capacitor's middle value.
 */
export function tunedPacks(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate[] {
  return aimed.flatMap((frame) =>
    tunedClasses.flatMap((limit) => {
      const { offers } = classStock(shelf, limit, brief.quantity);
      const own = withOffers(frame, offers, brief);
      const closest = closestOfFrame(own, brief);
      if (closest === null || tunedClassOf(closest.timing) !== limit) return [];
      return tunedGrid(frame, limit, brief, shelf) === null ? [] : [closest];
    }),
  );
}
