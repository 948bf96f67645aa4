import type { PartHistory } from '../contracts/desk.ts';
import { auditText } from '../domain/audit-text.ts';
import { ledgerLine } from '../domain/ledger-text.ts';
import type { Deps } from '../ports.ts';
import { auditOf } from '../store/audit.ts';
import { findPart } from '../store/parts.ts';
import { newestLedger } from '../store/stock.ts';
import { Refusal } from './refusal.ts';

/** What happened to a part: its stock ledger and its lines in the audit log. */
export async function viewPartHistory(deps: Pick<Deps, 'db'>, id: number): Promise<PartHistory> {
  const part = await findPart(deps.db, id);
  if (part === null) throw new Refusal('not-found', 'The catalogue has no such part.');
  const [ledger, audit] = await Promise.all([
    newestLedger(deps.db, 200, id),
    auditOf(deps.db, 'part', part.facts.sku),
  ]);
  return {
    ledger: ledger.map((row) => ledgerLine(row, false)),
    audit: audit.map((row) => ({
      at: row.at.toISOString(),
      who: row.who,
      what: [row.action, row.note].filter(Boolean).join(': '),
      from: auditText(row.before),
      to: auditText(row.after),
    })),
  };
}
