import type { AuditPage } from '../contracts/desk.ts';
import { auditText } from '../domain/audit-text.ts';
import type { Deps } from '../ports.ts';
import { listAudit } from '../store/audit.ts';

/** A page of the audit log. */
export async function listAuditPage(
  deps: Pick<Deps, 'db'>,
  filter: { search?: string | undefined; page: number; pageSize: number },
): Promise<AuditPage> {
  const { rows, total } = await listAudit(deps.db, filter);
  return {
    items: rows.map((row) => ({
      at: row.at.toISOString(),
      who: row.who,
      what: row.action,
      subject: `${row.subjectKind} ${row.subjectId}`,
      from: auditText(row.before),
      to: auditText(row.after),
      note: row.note,
    })),
    page: filter.page,
    pageSize: filter.pageSize,
    total,
  };
}
