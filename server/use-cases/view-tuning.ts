import type { LineTuning, Take, TunedUnit } from '../contracts/bench.ts';
import type { PackRole } from '../contracts/packs.ts';
import type { Bench } from '../domain/brief.ts';
import { isKind, type CataloguePart } from '../domain/catalogue.ts';
import { labelOf, toPackPart } from '../domain/pack-parts.ts';
import { limitDigits, readingRange, readingWords, timingRoles } from '../domain/tuning.ts';
import type { OrderLineRow } from '../store/orders.ts';
import type { PickRow } from '../store/stock.ts';
import type { TuningRow } from '../store/tunings.ts';

/** What an order is made of, as it is kept: needs as sold, pieces as tuned. */
export interface OrderInHand {
  lines: readonly OrderLineRow[];
  needs: readonly { lineId: string; role: string; partId: number }[];
  tunings: readonly TuningRow[];
  picks: readonly PickRow[];
  parts: ReadonlyMap<number, CataloguePart>;
}

/** What the bench measured and chose for the kits of a line; null where it is not bench-tuned. */
export function lineTuning(
  line: OrderLineRow,
  order: OrderInHand,
  bench: Bench,
): LineTuning | null {
  if (line.brief.careLevel !== 'bench-tuned') return null;
  const need = order.needs.find(({ lineId, role }) => lineId === line.id && role === 'C1');
  const part = need && order.parts.get(need.partId);
  if (!part || !isKind(part, 'capacitor')) throw new Error('A tuned pack has a capacitor C1.');
  const { least, most } = readingRange(part.facts, bench);
  const standing = order.tunings.filter(({ lineId, stands }) => lineId === line.id && stands);
  const units = Array.from({ length: line.quantity }, (_, k) => {
    const tuning = standing.find(({ unit }) => unit === k + 1);
    return tuning ? tunedUnit(tuning, order) : { unit: k + 1, farads: null };
  });
  return {
    capacitor: labelOf(part),
    from: readingWords(least, limitDigits),
    to: readingWords(most, limitDigits),
    sold: line.promise,
    units,
  };
}

function tunedUnit(tuning: TuningRow, order: OrderInHand): TunedUnit {
  return {
    unit: tuning.unit,
    farads: tuning.farads,
    reading: readingWords(tuning.farads),
    take: rolesOf(tuning).map(([role, partId]) => takenPart(role, partId, order)),
    join: tuning.join,
    promise: tuning.promise,
  };
}

function takenPart(
  role: PackRole,
  partId: number,
  { picks, parts }: Pick<OrderInHand, 'picks' | 'parts'>,
): Take {
  const bins = picks.filter((pick) => pick.partId === partId).map(({ bin }) => bin);
  return { ...toPackPart(role, parts.get(partId)!), bins: [...new Set(bins)] };
}

/** R4 alone, or R4A and R4B, with the parts that a kit was tuned with. */
function rolesOf({ firstPartId, secondPartId }: TuningRow): [PackRole, number][] {
  if (secondPartId === null) return [['R4', firstPartId]];
  return [
    ['R4A', firstPartId],
    ['R4B', secondPartId],
  ];
}

/** What a part is for in an order: its roles as sold, but the timing of kits that were tuned as tuned. */
export function rolesOfPart(partId: number, { lines, needs, tunings }: OrderInHand): string[] {
  const roles = needs
    .filter((need) => need.partId === partId)
    .filter(({ role, lineId }) => {
      if (!timingRoles.some((timing) => timing === role)) return true;
      const kits = lines.find(({ id }) => id === lineId)?.quantity ?? 0;
      return tunings.filter((one) => one.lineId === lineId).length < kits;
    })
    .map(({ role }) => role);
  const tuned = tunings.flatMap(rolesOf).filter(([, id]) => id === partId);
  return [...new Set([...roles, ...tuned.map(([role]) => role)])];
}
