import type { Coverage } from '../../../server/contracts/desk.ts';
import { formatDigits, formatQuantity } from '../../lib/format-number.ts';
import { narrow } from '../../lib/spaces.ts';

type Point = Coverage['points'][number];

/** A stretch of neighbouring rates that today's shelves do not hold within the asked band. */
export interface Hole {
  fromHz: number;
  toHz: number;
  /** The worst guaranteed half-band inside, as a fraction; null where some rate has no pack at all. */
  worst: number | null;
  points: number;
}

export function isHeld(point: Point, band: number): boolean {
  return point.halfBand !== null && point.halfBand <= band;
}

/** The holes from low to high rates. */
export function holesOf({ points, band }: Coverage): Hole[] {
  const holes: Hole[] = [];
  let open: Hole | null = null;
  for (const point of points) {
    if (isHeld(point, band)) {
      open = null;
      continue;
    }
    if (open === null) {
      open = { fromHz: point.frequencyHz, toHz: point.frequencyHz, worst: 0, points: 0 };
      holes.push(open);
    }
    open.toHz = point.frequencyHz;
    open.points += 1;
    open.worst =
      open.worst === null || point.halfBand === null ? null : Math.max(open.worst, point.halfBand);
  }
  return holes;
}

export function widestHole(coverage: Coverage): Hole | null {
  const holes = holesOf(coverage);
  return holes.reduce<Hole | null>(
    (widest, hole) => (widest === null || hole.points > widest.points ? hole : widest),
    null,
  );
}

const loosest = 0.2;
const tightest = 0.02;

/** How high a half-band stands in the ribbon, 0 to 1: each halving of the band adds the same height. */
export function heightOf(halfBand: number): number {
  const share = Math.log(loosest / halfBand) / Math.log(loosest / tightest);
  return Math.min(1, Math.max(0.02, share));
}

/** Where a rate lies along the ribbon, 0 to 1. */
export function placeOf(frequencyHz: number, { points }: Pick<Coverage, 'points'>): number {
  const first = points[0]?.frequencyHz ?? 1;
  const last = points.at(-1)?.frequencyHz ?? first;
  if (last === first) return 0.5;
  return Math.log(frequencyHz / first) / Math.log(last / first);
}

/** A rate as the trade says it: 0.63 Hz rather than 630 mHz. */
export function rateWords(frequencyHz: number): string {
  if (frequencyHz < 1) return `${formatDigits(frequencyHz, 2)}${narrow}Hz`;
  return formatQuantity(frequencyHz, 'Hz', 2);
}
