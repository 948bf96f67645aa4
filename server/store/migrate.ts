import { runMigrations } from 'graphile-worker';
import type { Knex } from 'knex';
import { migrations } from '../../migrations/index.ts';
import { openDatabase } from './connection.ts';

type Migration = (typeof migrations)[number];

/** One source of migrations for the command line, the server, the tests and the bundle. */
export const migrationSource: Knex.MigrationSource<Migration> = {
  getMigrations: () => Promise.resolve(migrations),
  getMigrationName: (migration) => migration.name,
  getMigration: (migration) => Promise.resolve(migration),
};

/** Brings a database to the newest schema, job queue included; harmless when it already is. */
export async function migrateToLatest(databaseUrl: string): Promise<void> {
  const db = openDatabase(databaseUrl, 2);
  try {
    await db.migrate.latest({ migrationSource });
  } finally {
    await db.destroy();
  }
  await runMigrations({ connectionString: databaseUrl });
}

/** True when every migration this program knows has run. */
export async function isMigrated(db: Knex): Promise<boolean> {
  const [, pending] = (await db.migrate.list({ migrationSource })) as [unknown[], unknown[]];
  return pending.length === 0;
}
