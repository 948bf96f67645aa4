import type { Actor } from './stock.ts';
import type { Database } from './connection.ts';

export interface AuditEntry {
  at: Date;
  actor: Actor;
  action: string;
  subjectKind: string;
  subjectId: string;
  before?: unknown;
  after?: unknown;
  note?: string;
}

/** Writes one line to the audit log. It can never be changed afterwards. */
export async function writeAudit(db: Database, entry: AuditEntry): Promise<void> {
  await db('audit').insert({
    at: entry.at,
    actor_id: entry.actor.id,
    actor_name: entry.actor.name,
    action: entry.action,
    subject_kind: entry.subjectKind,
    subject_id: entry.subjectId,
    before: entry.before === undefined ? null : JSON.stringify(entry.before),
    after: entry.after === undefined ? null : JSON.stringify(entry.after),
    note: entry.note ?? null,
  });
}

export interface AuditRow {
  at: Date;
  who: string;
  action: string;
  subjectKind: string;
  subjectId: string;
  before: unknown;
  after: unknown;
  note: string | null;
}

const auditColumns = [
  'at',
  'actor_name as who',
  'action',
  'subject_kind as subjectKind',
  'subject_id as subjectId',
  'before',
  'after',
  'note',
];

/** What the audit log says of one subject, newest first. */
export async function auditOf(
  db: Database,
  subjectKind: string,
  subjectId: string,
): Promise<AuditRow[]> {
  return db('audit')
    .where({ subject_kind: subjectKind, subject_id: subjectId })
    .orderBy('id', 'desc')
    .limit(200)
    .select(auditColumns);
}

/** A page of the whole audit log, newest first, searched by action, person and subject. */
export async function listAudit(
  db: Database,
  filter: { search?: string | undefined; page: number; pageSize: number },
): Promise<{ rows: AuditRow[]; total: number }> {
  const matching = db('audit').modify((query) => {
    if (!filter.search) return;
    const pattern = `%${filter.search.replace(/[\\%_]/g, '\\$&')}%`;
    query.where((either) => {
      either
        .whereILike('action', pattern)
        .orWhereILike('actor_name', pattern)
        .orWhereILike('subject_id', pattern)
        .orWhereILike('note', pattern);
    });
  });
  const [{ total }] = (await matching.clone().count({ total: '*' })) as [{ total: number }];
  const rows = await matching
    .clone()
    .orderBy('id', 'desc')
    .limit(filter.pageSize)
    .offset((filter.page - 1) * filter.pageSize)
    .select(auditColumns);
  return { rows, total };
}
