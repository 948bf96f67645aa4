import type { Mounting } from '../contracts/common.ts';
import type { Part, PartKind } from '../contracts/parts.ts';

/** One delivery of a part on the shelf. The figures measured of a sample are SI; all null or none. */
export interface LotFacts {
  id: number;
  /** Pieces on hand less reserved, above zero. */
  available: number;
  measuredMean: number | null;
  /** Standard deviation of single pieces. */
  measuredDeviation: number | null;
  measuredCount: number | null;
}

/** A part as the shop keeps it: the public facts, and what only the house sees. */
export interface CataloguePart {
  id: number;
  kind: PartKind;
  mounting: Mounting;
  active: boolean;
  /** Net cost and net price of one piece in minor units. */
  costMinor: number;
  priceMinor: number;
  grams: number;
  onHand: number;
  reserved: number;
  /** On hand less reserved. */
  available: number;
  /** The lots with unreserved pieces, ascending by the day they were received, then by id. */
  lots: readonly LotFacts[];
  facts: PartFacts;
}

type Distributive<T> = T extends unknown ? Omit<T, 'available' | 'unitPrice' | 'mounting'> : never;

/** The kind's own figures, as the public catalogue shows them. */
export type PartFacts = Distributive<Part>;
export type FactsOf<Kind extends PartKind> = Extract<PartFacts, { kind: Kind }>;

/** A part of one kind. */
export type PartOf<Kind extends PartKind> = CataloguePart & { facts: FactsOf<Kind> };

/** Narrows a part to a kind. */
export function isKind<Kind extends PartKind>(
  part: CataloguePart,
  kind: Kind,
): part is PartOf<Kind> {
  return part.facts.kind === kind;
}

/** All parts of one kind, in the order given. */
export function partsOf<Kind extends PartKind>(
  parts: readonly CataloguePart[],
  kind: Kind,
): PartOf<Kind>[] {
  return parts.filter((part): part is PartOf<Kind> => isKind(part, kind));
}
