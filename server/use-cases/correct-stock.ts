import type { DeskPart, stockReasons } from '../contracts/desk.ts';
import type { Deps } from '../ports.ts';
import { writeAudit } from '../store/audit.ts';
import { findPart } from '../store/parts.ts';
import { lockLot, postToLedger, type Actor } from '../store/stock.ts';
import { inTransaction } from '../store/transaction.ts';
import { Refusal } from './refusal.ts';
import { viewDeskPart } from './view-desk-part.ts';

export interface StockCorrection {
  lotId: string;
  onHand: number;
  reason: (typeof stockReasons)[number];
  note: string;
}

/**
 * Sets what a lot has on hand by posting the difference to the ledger, with a reason. Pieces that are
 * promised to orders cannot be corrected away.
 */
export async function correctStock(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  partId: number,
  correction: StockCorrection,
): Promise<DeskPart> {
  await inTransaction(deps.db, async (trx) => {
    const lotId = Number(correction.lotId);
    const lot = Number.isSafeInteger(lotId) && lotId < 2 ** 31 ? await lockLot(trx, lotId) : null;
    const part = await findPart(trx, partId);
    if (lot === null || part === null || lot.partId !== partId) {
      throw new Refusal('not-found', 'This part has no such lot.');
    }
    if (correction.onHand < lot.reserved) {
      const message = `${lot.reserved} of this lot are promised to orders; cancel or refund those first, or count again.`;
      throw new Refusal('conflict', message, [{ path: 'onHand', message }]);
    }
    const delta = correction.onHand - lot.onHand;
    if (delta === 0) return;
    const at = deps.clock.now();
    await postToLedger(trx, [
      { lotId, delta, reason: correction.reason, actor, at, note: correction.note },
    ]);
    await writeAudit(trx, {
      at,
      actor,
      action: `correct stock (${correction.reason})`,
      subjectKind: 'part',
      subjectId: part.facts.sku,
      before: { lot: lot.code, 'on hand': lot.onHand },
      after: { lot: lot.code, 'on hand': correction.onHand },
      note: correction.note,
    });
  });
  return viewDeskPart(deps, partId);
}
