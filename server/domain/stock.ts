/** A lot as the shelf sees it. Counts are single pieces. */
export interface LotStock {
  id: number;
  partId: number;
  onHand: number;
  reserved: number;
}

/** Pieces of one part that somebody wants. */
export interface PartDemand {
  partId: number;
  quantity: number;
}

export interface LotShare {
  lotId: number;
  partId: number;
  quantity: number;
}

export type Allocation =
  | { kind: 'allocated'; shares: LotShare[] }
  | { kind: 'short'; short: { partId: number; wanted: number; available: number }[] };

/** Adds up demands for the same part; ascending by part, so that locks are taken in one order. */
export function mergeDemands(demands: readonly PartDemand[]): PartDemand[] {
  const byPart = new Map<number, number>();
  for (const { partId, quantity } of demands) {
    byPart.set(partId, (byPart.get(partId) ?? 0) + quantity);
  }
  return [...byPart]
    .map(([partId, quantity]) => ({ partId, quantity }))
    .sort((a, b) => a.partId - b.partId);
}

/**
 * Shares demands out over lots, oldest lot (lowest id) first, all or nothing. Says what is short, and
 * by how much, when the unreserved stock does not reach.
 */
export function allocate(demands: readonly PartDemand[], lots: readonly LotStock[]): Allocation {
  const shares: LotShare[] = [];
  const short: { partId: number; wanted: number; available: number }[] = [];
  for (const { partId, quantity } of mergeDemands(demands)) {
    let missing = quantity;
    const own = lots.filter((lot) => lot.partId === partId).sort((a, b) => a.id - b.id);
    for (const lot of own) {
      const taken = Math.min(missing, lot.onHand - lot.reserved);
      if (taken <= 0) continue;
      shares.push({ lotId: lot.id, partId, quantity: taken });
      missing -= taken;
    }
    if (missing > 0) short.push({ partId, wanted: quantity, available: quantity - missing });
  }
  return short.length > 0 ? { kind: 'short', short } : { kind: 'allocated', shares };
}

/**
 * How many kits the unreserved stock allows: the least whole number over all parts. A part used by
 * two roles counts twice. Zero for an empty list.
 */
export function makeableKits(
  perKit: readonly PartDemand[],
  availableOf: (partId: number) => number,
): number {
  const merged = mergeDemands(perKit);
  if (merged.length === 0) return 0;
  return Math.min(
    ...merged.map(({ partId, quantity }) => Math.floor(availableOf(partId) / quantity)),
  );
}

/** Pieces of one lot that are kept for an order; `picked` of them are in its tray. */
export interface KeptPieces {
  id: number;
  lotId: number;
  partId: number;
  quantity: number;
  picked: number;
}

/** What changes when parts take the place of others: what goes back and what is wanted instead. */
export function exchangeOf(
  from: readonly number[],
  to: readonly number[],
): { back: number[]; wanted: PartDemand[] } {
  const wanted = [...to];
  const back = from.filter((partId) => {
    const at = wanted.indexOf(partId);
    if (at >= 0) wanted.splice(at, 1);
    return at < 0;
  });
  return { back, wanted: mergeDemands(wanted.map((partId) => ({ partId, quantity: 1 }))) };
}

/**
 * Takes single pieces off what is kept for an order: of lots with a piece not yet in the tray first,
 * then of the newest. Gives the lots that changed, at their new counts, and the lots whose piece has to
 * come out of the tray. Throws when the order has no such piece.
 */
export function giveBack<Lot extends KeptPieces>(
  partIds: readonly number[],
  kept: readonly Lot[],
): { changed: Lot[]; fromTray: Lot[] } {
  const now = new Map(kept.map((lot) => [lot.id, lot]));
  const fromTray: Lot[] = [];
  for (const partId of partIds) {
    const isOpen = (lot: Lot) => Number(lot.picked < lot.quantity);
    const [lot] = [...now.values()]
      .filter((one) => one.partId === partId && one.quantity > 0)
      .sort((a, b) => isOpen(b) - isOpen(a) || b.lotId - a.lotId);
    if (!lot) throw new Error(`The order keeps no piece of part ${partId}.`);
    if (lot.picked === lot.quantity) fromTray.push(lot);
    const quantity = lot.quantity - 1;
    now.set(lot.id, { ...lot, quantity, picked: Math.min(lot.picked, quantity) });
  }
  return { changed: [...now.values()].filter((lot) => !kept.includes(lot)), fromTray };
}
