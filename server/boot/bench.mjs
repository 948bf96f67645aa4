import path from 'node:path';
import { launch } from './launch.mjs';
import { ensureDatabase, startPostgres } from './postgres.mjs';
import { inProject } from './project.mjs';
import { runCommand } from './run-command.mjs';
import { migrate } from './shop.mjs';
import { throwAwayFolder } from './throw-away.mjs';

await launch(async (children) => {
  const server = await startPostgres(children, throwAwayFolder(), { throwAway: true });
  const env = { ...process.env, DEMO: '1', DATABASE_URL: await ensureDatabase(server, 'tockwell') };
  await migrate(['--import', 'tsx', inProject('server/migrate.ts')], env);
  const args = [await bundle(), ...process.argv.slice(2)];
  return (await runCommand(process.execPath, args, { show: true, env, cwd: inProject() })).code;
});

/** Bundles the benchmark as the server is bundled, so that what is timed is what is shipped. */
async function bundle() {
  const { build } = await import('esbuild');
  const outfile = inProject('dist', 'bench', 'main.mjs');
  await build({
    entryPoints: [inProject('tests/bench/main.ts')],
    outfile,
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    packages: 'external',
    logLevel: 'warning',
  });
  return path.relative(inProject(), outfile);
}
