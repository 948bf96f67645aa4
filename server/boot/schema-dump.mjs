import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { launch } from './launch.mjs';
import { ensureDatabase, startPostgres } from './postgres.mjs';
import { inProject } from './project.mjs';
import { mustRun } from './run-command.mjs';
import { cleanDump, firstDifference } from './schema-text.mjs';
import { PlainFailure, say } from './step.mjs';
import { throwAwayFolder } from './throw-away.mjs';

const schemaFile = inProject('migrations', 'schema.sql');
const migrateOnly = `import { migrateToLatest } from '${inProject('server/store/migrate.ts')}';
await migrateToLatest(process.env.DATABASE_URL);`;

async function dump(children) {
  const server = await startPostgres(children, throwAwayFolder(), { throwAway: true });
  const DATABASE_URL = await ensureDatabase(server, 'schema');
  const args = ['--import', 'tsx', '--input-type=module', '-e', migrateOnly];
  const env = { ...process.env, DATABASE_URL, PGPASSWORD: server.password };
  await mustRun('Migrating', 'Mend the migration.', process.execPath, args, {
    env,
    cwd: inProject(),
  });
  // The job queue's tables are its package's own affair.
  // prettier-ignore
  const options = ['--schema-only', '--no-owner', '--no-privileges', '--no-comments', '-N', 'graphile_worker', '-h', '127.0.0.1', '-p', String(server.port), '-U', 'postgres', '-d', 'schema'];
  const pgDump = path.join(server.binaries, 'pg_dump');
  return cleanDump(await mustRun('Dumping', 'Start again.', pgDump, options, { env }));
}

await launch(async (children) => {
  const fresh = await dump(children);
  if (!process.argv.includes('--check')) {
    writeFileSync(schemaFile, fresh);
    say('Wrote migrations/schema.sql.');
    return 0;
  }
  const kept = existsSync(schemaFile) ? readFileSync(schemaFile, 'utf8') : '';
  if (kept === fresh) return 0;
  throw new PlainFailure(
    'migrations/schema.sql is not what the migrations make.',
    'Run npm run schema:dump and commit the result with the migration.',
    firstDifference(kept, fresh),
  );
});
