import type { Knex } from 'knex';
import { migrationSource } from './server/store/migrate.ts';

const databaseUrl = process.env.DATABASE_URL;
if (!databaseUrl) throw new Error('DATABASE_URL is not set; give the database to migrate.');

/**
 * For Knex's own command line, which needs a loader for TypeScript:
 * node --import tsx node_modules/knex/bin/cli.js migrate:list
 */
const settings: Knex.Config = {
  client: 'pg',
  connection: databaseUrl,
  migrations: { migrationSource },
};

export default settings;
