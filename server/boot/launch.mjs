import { Children } from './children.mjs';
import { checkNodeVersion } from './node-version.mjs';
import { ensurePackages } from './npm-packages.mjs';
import { endRunningCommands } from './run-command.mjs';
import { say, tellFailure } from './step.mjs';

/**
 * Runs a launch script: installs the packages, lets `work(children)` start what it needs, and ends all
 * of that when the work returns an exit code, when a signal asks for it, or when something breaks.
 * Work that returns undefined goes on until then.
 */
export async function launch(work) {
  const { promise: ended, resolve: end } = deferred();
  const children = new Children((loss) => end({ code: 1, error: loss }));
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => end({ code: 0, signal }));
  }
  const running = (async () => {
    checkNodeVersion();
    await ensurePackages();
    return await work(children);
  })();
  running.then(
    (code) => code !== undefined && end({ code }),
    (error) => end({ code: 1, error }),
  );
  const { code, error, signal } = await ended;
  if (error) tellFailure(error);
  if (signal) say('\nStopping …');
  endRunningCommands();
  // Work cut short must not start another child behind the back of the stop.
  children.closeForNew();
  await children.stopAll();
  if (signal) say('Tockwell has stopped.');
  process.exit(code);
}

function deferred() {
  let resolve;
  const promise = new Promise((done) => (resolve = done));
  return { promise, resolve };
}
