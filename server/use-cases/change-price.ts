import type { DeskPart } from '../contracts/desk.ts';
import type { Money } from '../contracts/common.ts';
import { money } from '../domain/money.ts';
import type { Deps } from '../ports.ts';
import { writeAudit } from '../store/audit.ts';
import { findPart, lockPart, setPrice } from '../store/parts.ts';
import type { Actor } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { Refusal } from './refusal.ts';
import { viewDeskPart } from './view-desk-part.ts';

/** Sets the net price of a part and writes down who did it and why. */
export async function changePrice(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  partId: number,
  change: { unitPrice: Money; reason: string },
): Promise<DeskPart> {
  await inTransaction(deps.db, async (trx) => {
    const before = await lockPart(trx, partId);
    const part = before === null ? null : await findPart(trx, partId);
    if (before === null || part === null)
      throw new Refusal('not-found', 'The catalogue has no such part.');
    await setPrice(trx, partId, change.unitPrice.amount);
    await writeAudit(trx, {
      at: deps.clock.now(),
      actor,
      action: 'change price',
      subjectKind: 'part',
      subjectId: part.facts.sku,
      before: money(before.priceMinor),
      after: change.unitPrice,
      note: change.reason,
    });
  });
  return viewDeskPart(deps, partId);
}
