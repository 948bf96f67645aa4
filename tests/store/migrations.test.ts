import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '../../server/store/connection.ts';
import { isMigrated, migrateToLatest, migrationSource } from '../../server/store/migrate.ts';
import { openBareDatabase, openTestDatabase, type TestDatabase } from '../support/database.ts';

describe('the migrations', () => {
  describe('when they are run on an empty database, and once more', () => {
    it('bring it up to date, and change nothing the second time', async () => {
      const bare = await openBareDatabase();
      const db = openDatabase(bare.url, 2);
      expect(await isMigrated(db)).toBe(false);
      await migrateToLatest(bare.url);
      expect(await isMigrated(db)).toBe(true);
      await migrateToLatest(bare.url);
      expect(await isMigrated(db)).toBe(true);
      await db.destroy();
      await bare.drop();
    });
  });

  describe('when all are undone', () => {
    let test: TestDatabase;
    beforeAll(async () => {
      test = await openTestDatabase();
    });
    afterAll(() => test.drop());

    it('leave no table of the shop behind, and can be run again', async () => {
      await test.db.migrate.rollback({ migrationSource }, true);
      const names = await test.db
        .withSchema('pg_catalog')
        .from('pg_tables')
        .where({ schemaname: 'public' })
        .pluck<string[]>('tablename');
      const tables = names.filter((name) => !name.startsWith('knex_migrations'));
      expect(tables).toEqual([]);
      await test.db.migrate.latest({ migrationSource });
      expect(await isMigrated(test.db)).toBe(true);
    });
  });
});
