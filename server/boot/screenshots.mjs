import { ensureChromium } from './chromium.mjs';
import { freePort } from './free-port.mjs';
import { launch } from './launch.mjs';
import { inProject } from './project.mjs';
import { runCommand } from './run-command.mjs';
import { startShop } from './start.mjs';
import { throwAwayFolder } from './throw-away.mjs';

await launch(async (children) => {
  const CHROMIUM_PATH = await ensureChromium();
  const given = { ...process.env, PORT: String(await freePort()), DEMO: '1' };
  delete given.DATABASE_URL;
  const { url, env } = await startShop(children, throwAwayFolder(), given, { throwAway: true });
  const script = ['--import', 'tsx', inProject('tests/support/screenshots.ts')];
  const shotEnv = { ...env, CHROMIUM_PATH, BASE_URL: url };
  const args = [...script, ...process.argv.slice(2)];
  return (await runCommand(process.execPath, args, { show: true, env: shotEnv })).code;
});
