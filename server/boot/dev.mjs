import { watch } from 'node:fs';
import { tellReady } from './demo-signs.mjs';
import { freePort } from './free-port.mjs';
import { launch } from './launch.mjs';
import { claimDataFolder } from './launcher-note.mjs';
import { dataFolder, inProject } from './project.mjs';
import * as shop from './shop.mjs';
import { say } from './step.mjs';

const source = (file) => ['--import', 'tsx', inProject(file)];
const toTerminal = () => null;

/** Starts the server anew whenever a file of it changes. */
async function keepServerFresh(children, env) {
  const begin = () => children.start('server', source('server/main.ts'), { env });
  let server = begin();
  // One that ends by itself (an error in an edited file) waits for the next change.
  server.stopped = true;
  let pending = null;
  const restart = async () => {
    await children.stop(server);
    say('The server’s source changed; starting it anew.');
    server = begin();
    server.stopped = true;
  };
  for (const folder of ['server', 'migrations', 'seeds']) {
    watch(inProject(folder), { recursive: true }, () => {
      clearTimeout(pending);
      pending = setTimeout(() => void restart(), 200);
    });
  }
  await shop.waitFor(`http://${env.HOST}:${env.PORT}/api/ready`, 'server');
}

await launch(async (children) => {
  const dataDir = dataFolder();
  process.on('exit', claimDataFolder(dataDir));
  const publicPort = await shop.choosePort(process.env.PORT);
  const port = await freePort();
  const databaseUrl = await shop.openDatabase(children, dataDir, process.env);
  const options = { dataDir, databaseUrl, port, publicPort, env: process.env };
  const env = await shop.shopEnvironment(options);
  const scripts = {
    payments: source('server/stripe-mock/main.ts'),
    mail: source('server/mail-stand-in/main.ts'),
  };
  // Neither waits for the other, so they run side by side.
  await Promise.all([
    shop.startStandIns(children, scripts, env, process.env, toTerminal),
    shop.migrate(source('server/migrate.ts'), env),
  ]);
  await keepServerFresh(children, env);
  const url = `http://127.0.0.1:${publicPort}`;
  const viteEnv = { ...env, TOCKWELL_API_URL: `http://127.0.0.1:${port}` };
  // prettier-ignore
  const vite = [inProject('node_modules/vite/bin/vite.js'), '--host', '127.0.0.1', '--port', `${publicPort}`, '--strictPort', '--logLevel', 'warn'];
  children.start('client’s development server', vite, { env: viteEnv });
  await shop.waitFor(url, 'client’s development server');
  tellReady(url, env);
});
