import { launch } from './launch.mjs';
import { ensureDatabase, startPostgres } from './postgres.mjs';
import { inProject } from './project.mjs';
import { runCommand } from './run-command.mjs';
import { migrate } from './shop.mjs';
import { throwAwayFolder } from './throw-away.mjs';

const source = (file) => ['--import', 'tsx', inProject(file)];

await launch(async (children) => {
  const server = await startPostgres(children, throwAwayFolder(), { throwAway: true });
  const env = { ...process.env, DEMO: '1', DATABASE_URL: await ensureDatabase(server, 'tockwell') };
  await migrate(source('server/migrate.ts'), env);
  const args = [...source('tests/bench/main.ts'), ...process.argv.slice(2)];
  return (await runCommand(process.execPath, args, { show: true, env, cwd: inProject() })).code;
});
