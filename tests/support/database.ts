import { randomBytes } from 'node:crypto';
import type { Knex } from 'knex';
import pg from 'pg';
import { openDatabase } from '../../server/store/connection.ts';
import { migrateToLatest } from '../../server/store/migrate.ts';

const template = 'tockwell_template';
const templateLock = 4310;

export interface TestDatabase {
  url: string;
  db: Knex;
  drop(): Promise<void>;
}

/**
 * An empty, migrated database of the test file's own, cloned from a template that the first file to
 * ask makes. Open it in `beforeAll`, drop it in `afterAll`.
 */
export async function openTestDatabase(): Promise<TestDatabase> {
  const name = `tockwell_test_${randomBytes(6).toString('hex')}`;
  await asAdministrator(async (admin) => {
    // Advisory locks keep the files of a run from making the template, or copying it half made.
    await admin.query('select pg_advisory_lock($1)', [templateLock]);
    await ensureTemplate(admin);
    await admin.query(`create database ${name} template ${template}`);
  });
  const url = urlOf(name);
  const db = openDatabase(url, 5);
  const drop = async () => {
    await db.destroy();
    await asAdministrator((admin) => admin.query(`drop database ${name} with (force)`));
  };
  return { url, db, drop };
}

/** A database of its own without the schema, for what migrates by itself. */
export async function openBareDatabase(): Promise<{ url: string; drop(): Promise<void> }> {
  const name = `tockwell_bare_${randomBytes(6).toString('hex')}`;
  await asAdministrator((admin) => admin.query(`create database ${name}`));
  const drop = async () => {
    await asAdministrator((admin) => admin.query(`drop database ${name} with (force)`));
  };
  return { url: urlOf(name), drop };
}

async function ensureTemplate(admin: pg.Client): Promise<void> {
  const found = await admin.query('select 1 from pg_database where datname = $1', [template]);
  if (found.rowCount) return;
  const unfinished = `${template}_unfinished`;
  await admin.query(`drop database if exists ${unfinished} with (force)`);
  await admin.query(`create database ${unfinished}`);
  await migrateToLatest(urlOf(unfinished));
  await admin.query(`alter database ${unfinished} rename to ${template}`);
}

async function asAdministrator<Result>(work: (admin: pg.Client) => Promise<Result>) {
  const admin = new pg.Client({ connectionString: adminUrl() });
  await admin.connect();
  try {
    return await work(admin);
  } finally {
    await admin.end();
  }
}

function adminUrl(): string {
  const url = process.env.TEST_DATABASE_URL;
  if (!url) throw new Error('TEST_DATABASE_URL is not set; run the tests by `npm test`.');
  return url;
}

function urlOf(name: string): string {
  const url = new URL(adminUrl());
  url.pathname = `/${name}`;
  return url.href;
}
