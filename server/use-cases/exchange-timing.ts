import { allocate, exchangeOf, giveBack } from '../domain/stock.ts';
import type { TunedKit } from '../engine/search/tuned-kit.ts';
import type { Database } from '../store/connection.ts';
import { keepMore, lockLotsOfParts, picksOfOrder, setKept, type PickRow } from '../store/stock.ts';
import { Refusal } from './refusal.ts';

/** The timing parts of a tuned kit, by id. */
function timingIds({ timing }: TunedKit): number[] {
  return timing.second === null ? [timing.first.id] : [timing.first.id, timing.second.id];
}

/**
 * Keeps for an order the timing parts of the first kit that the lots still allow, in place of those
 * that the kit had. Gives that kit, and the pieces that must come out of the tray.
 */
export async function exchangeTiming(
  trx: Database,
  orderId: number,
  own: readonly number[],
  kits: readonly TunedKit[],
): Promise<{ kit: TunedKit; fromTray: PickRow[] }> {
  const lots = await lockLotsOfParts(trx, [...new Set([...own, ...kits.flatMap(timingIds)])]);
  for (const kit of kits) {
    const { back, wanted } = exchangeOf(own, timingIds(kit));
    const allocation = allocate(wanted, lots);
    if (allocation.kind === 'short') continue;
    const { changed, fromTray } = giveBack(back, await picksOfOrder(trx, orderId));
    await setKept(trx, changed);
    await keepMore(trx, orderId, allocation.shares);
    return { kit, fromTray };
  }
  throw new Refusal(
    'out-of-stock',
    'Somebody was quicker with the last R4 for this reading; send the reading again.',
  );
}
