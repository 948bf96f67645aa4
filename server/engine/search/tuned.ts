import type { Frame } from './aim.ts';
import { byCloseness, type Candidate } from './candidate.ts';
import { formCandidate, type AimedFrame } from './closest.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import type { SearchBrief } from './shelf.ts';
import { cheapestChoice, type SingleTimingParts } from './timing-choice.ts';
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
  const [nearest] = gridCandidates(frame, frame.idealOhms, limit, brief, shelf);
  return nearest && tunedClassOf(nearest.timing) === limit ? nearest : null;
}

/**
 * What the grid of a class makes of a frame: the resistances next below and above `ohms`, the nearest
 * to the target first.
 */
export function gridCandidates(
  frame: Frame,
  ohms: number,
  limit: number,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate<SingleTimingParts>[] {
  const { quantity } = brief;
  const offers = classOffers(shelf, limit, quantity);
  const stock = { table: shelf.table, offers, demand: frame.head.demand, quantity };
  return gridAround(frame.head, ohms, limit, brief, shelf)
    .flatMap((place) => {
      const timing = cheapestChoice(stock, place);
      return (timing && formCandidate(frame, timing, brief)) ?? [];
    })
    .sort(byCloseness);
}
