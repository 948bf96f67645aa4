import { rmSync } from 'node:fs';
import path from 'node:path';
import { build } from './build.mjs';
import { ensureChromium } from './chromium.mjs';
import { launch } from './launch.mjs';
import { startPostgres } from './postgres.mjs';
import { inProject, readJson } from './project.mjs';
import { runCommand } from './run-command.mjs';
import { say, tellFailure } from './step.mjs';
import { needsBuild, tallyOf } from './test-tally.mjs';
import { throwAwayFolder } from './throw-away.mjs';

const asked = process.argv.slice(2);
const watching = asked.includes('--watch');
const vitest = inProject('node_modules', 'vitest', 'vitest.mjs');

await launch(async (children) => {
  const dataDir = throwAwayFolder();
  try {
    const { url } = await startPostgres(children, dataDir, { throwAway: true });
    const CHROMIUM_PATH = await ensureChromium();
    if (needsBuild(asked)) await build();
    const env = { ...process.env, TEST_DATABASE_URL: `${url}/postgres`, CHROMIUM_PATH };
    return watching ? await watch(env) : await runOnce(env, path.join(dataDir, 'results.json'));
  } catch (error) {
    tellFailure(error);
    say('0 passed, 1 failed');
    return 1;
  } finally {
    await children.stopAll();
    rmSync(dataDir, { recursive: true, force: true });
  }
});

async function watch(env) {
  const args = [vitest, ...asked.filter((argument) => argument !== '--watch')];
  return (await runCommand(process.execPath, args, { show: true, env, cwd: inProject() })).code;
}

async function runOnce(env, resultFile) {
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${resultFile}`];
  const args = [vitest, 'run', ...reporters, ...asked];
  const { code } = await runCommand(process.execPath, args, { show: true, env, cwd: inProject() });
  const { passed, failed } = tallyOf(readJson(resultFile), code);
  say(`${passed} passed, ${failed} failed`);
  return code;
}
