import type { Knex } from 'knex';
import type { Database } from './connection.ts';

/** Runs work in one transaction; it commits when the work resolves and rolls back when it throws. */
export function inTransaction<Result>(
  db: Knex,
  work: (trx: Database) => Promise<Result>,
): Promise<Result> {
  return db.transaction(work);
}

/** True when a database error is the named constraint's. */
export function breaksConstraint(error: unknown, constraint: string): boolean {
  return error instanceof Error && 'constraint' in error && error.constraint === constraint;
}
