import knex, { type Knex } from 'knex';
import pg from 'pg';

// Counts and sums come back as bigint text by default; every count here fits a double exactly.
pg.types.setTypeParser(pg.types.builtins.INT8, Number);
pg.types.setTypeParser(pg.types.builtins.NUMERIC, Number);

export type Database = Knex | Knex.Transaction;

/** Opens a pool on the shop's database; `destroy()` closes it. */
export function openDatabase(databaseUrl: string, maxConnections = 10): Knex {
  return knex({
    client: 'pg',
    connection: { connectionString: databaseUrl, application_name: 'tockwell' },
    pool: { min: 0, max: maxConnections },
    acquireConnectionTimeout: 10_000,
  });
}
