import { byCloseness, type Candidate } from './candidate.ts';
import { formCandidate, type AimedFrame } from './closest.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import type { SearchBrief } from './shelf.ts';
import { cheapestChoice } from './timing-choice.ts';
import { classOffers, gridAround, tunedClasses, tunedClassOf, tunedGrid } from './tuned-grid.ts';

/**
 * The tuned packs of frames: for every class whose resistors reach over all that the capacitor may
 * need, the pack nearest to the target at the capacitor's middle value.
 */
export function tunedPacks(
  aimed: readonly AimedFrame[],
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate[] {
  const classes = tunedClasses.filter((limit) =>
    classOffers(shelf, limit, brief.quantity).some((parts) => parts.length > 0),
  );
  return aimed
    .filter(({ reaches }) => reaches)
    .flatMap((frame) =>
      classes.flatMap((limit) => {
        if (tunedGrid(frame, limit, brief, shelf) === null) return [];
        return nearestOnGrid(frame, limit, brief, shelf) ?? [];
      }),
    );
}

/** Null when the nearest is of a tighter class, which has it too. */
function nearestOnGrid(
  frame: AimedFrame,
  limit: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate | null {
  const stock = { ...frame.stock, offers: classOffers(shelf, limit, brief.quantity) };
  const found = gridAround(frame.head, frame.idealOhms, limit, brief, shelf).flatMap((place) => {
    const timing = cheapestChoice(stock, place);
    return (timing && formCandidate(frame, timing, brief)) ?? [];
  });
  const [nearest] = found.sort(byCloseness);
  return nearest && tunedClassOf(nearest.timing) === limit ? nearest : null;
}
