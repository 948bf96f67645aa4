import path from 'node:path';
import { build } from './build.mjs';
import { tellReady } from './demo-signs.mjs';
import { launch } from './launch.mjs';
import { claimDataFolder } from './launcher-note.mjs';
import { dataFolder, inProject, isEntryPoint } from './project.mjs';
import * as shop from './shop.mjs';

const bundle = (name) => ['--enable-source-maps', inProject('dist', 'server', `${name}.js`)];

/** Builds and starts the whole shop on a data folder; answers its address. */
export async function startShop(children, dataDir, givenEnv, options) {
  const port = await shop.choosePort(givenEnv.PORT);
  await build();
  const databaseUrl = await shop.openDatabase(children, dataDir, givenEnv, options);
  const env = await shop.shopEnvironment({ dataDir, databaseUrl, port, env: givenEnv });
  const logTo = (name) => path.join(dataDir, 'logs', `${name}.log`);
  const scripts = { payments: bundle('stripe-mock'), mail: bundle('mail-stand-in') };
  // Neither waits for the other, so they run side by side.
  await Promise.all([
    shop.startStandIns(children, scripts, env, givenEnv, logTo),
    shop.migrate(bundle('migrate'), env),
  ]);
  children.start('server', bundle('main'), { env, logFile: logTo('server') });
  await shop.waitFor(`http://${env.HOST}:${port}/api/ready`, 'server');
  return { url: `http://127.0.0.1:${port}`, env };
}

if (isEntryPoint(import.meta.url)) {
  await launch(async (children) => {
    const dataDir = dataFolder();
    process.on('exit', claimDataFolder(dataDir));
    const { url, env } = await startShop(children, dataDir, process.env);
    tellReady(url, env);
  });
}
