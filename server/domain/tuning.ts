import type { ResolvedBrief } from '../contracts/brief.ts';
import type { PackRole } from '../contracts/packs.ts';
import { formatFarads } from '../engine/si-format.ts';
import type { Frame } from '../engine/search/aim.ts';
import type { SearchBrief } from '../engine/search/shelf.ts';
import { tunedClassOf } from '../engine/search/tuned-grid.ts';
import { toSearch, type Bench } from './brief.ts';
import { isKind, type CataloguePart, type PartOf } from './catalogue.ts';
import { candidateOf } from './pack-candidate.ts';
import type { PackChoice } from './pack-choice.ts';

/** Digits that a reading is shown with: a bench meter's. */
const readingDigits = 5;
/** Digits of a limit that a reading is held against. */
export const limitDigits = 4;

/** Roles of the timing resistance, one alone or two joined. */
export const timingRoles: readonly PackRole[] = ['R4', 'R4A', 'R4B'];

/** A sold pack as the bench needs it to tune its kits. */
export interface SoldPack {
  frame: Frame;
  /** Class of tolerance that R4 is taken from, as a fraction; see `tunedClassOf`. */
  limit: number;
  search: SearchBrief;
}

/**
 * Works a sold pack out anew from what was frozen with it: its brief, the parts of its roles and how
 * R4A and R4B are joined. Null when it is not bench-tuned, or a part is no longer what it was.
 */
export function soldPackOf(
  brief: ResolvedBrief,
  choice: PackChoice,
  parts: ReadonlyMap<number, CataloguePart>,
  bench: Bench,
): SoldPack | null {
  const lamp = choice.parts.LED === undefined ? undefined : parts.get(choice.parts.LED);
  const search = toSearch(brief, lamp && isKind(lamp, 'led') ? lamp : null, bench);
  const candidate = search.care === 'bench-tuned' ? candidateOf(choice, parts, search) : null;
  if (candidate?.timing.kind !== 'single') return null;
  return { frame: candidate.frame, limit: tunedClassOf(candidate.timing), search };
}

/**
 * What a meter may show of a sound capacitor, in farads: its printed tolerance, widened by the meter's
 * uncertainty (a fraction of the reading).
 */
export function readingRange(
  { farads, tolerance }: PartOf<'capacitor'>['facts'],
  { meterUncertainty }: Bench,
): { least: number; most: number } {
  return {
    least: farads * (1 - tolerance) * (1 - meterUncertainty),
    most: farads * (1 + tolerance) * (1 + meterUncertainty),
  };
}

/** A reading in words, "818.23 nF"; a limit for readings with fewer digits. */
export function readingWords(farads: number, digits = readingDigits): string {
  return formatFarads(farads, digits);
}

/** Parts as a kit sees them that gives back its own pieces: those count as unreserved. */
export function withOwnPieces(
  catalogue: readonly CataloguePart[],
  own: readonly number[],
): CataloguePart[] {
  return catalogue.map((part) => {
    const pieces = own.filter((id) => id === part.id).length;
    return pieces === 0 ? part : { ...part, available: part.available + pieces };
  });
}

/** The kits of bench-tuned lines without a reading that stands, in the order of lines and numbers. */
export function unmeasured<
  Line extends { id: string; quantity: number; brief: Pick<ResolvedBrief, 'careLevel'> },
>(
  lines: readonly Line[],
  tunings: readonly { lineId: string; unit: number; stands: boolean }[],
): { line: Line; unit: number }[] {
  const done = new Set(
    tunings.filter((one) => one.stands).map((one) => `${one.lineId} ${one.unit}`),
  );
  return lines
    .filter((line) => line.brief.careLevel === 'bench-tuned')
    .flatMap((line) => Array.from({ length: line.quantity }, (_, k) => ({ line, unit: k + 1 })))
    .filter(({ line, unit }) => !done.has(`${line.id} ${unit}`));
}
