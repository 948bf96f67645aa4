import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { checkNodeVersion } from './node-version.mjs';
import { inProject, isEntryPoint, readJson, sha256 } from './project.mjs';
import { mustRun } from './run-command.mjs';
import { say, tellFailure } from './step.mjs';

/** True when every package of the lock is installed in the locked version; optional ones may lack. */
export function satisfiesLock(lock, installed) {
  if (!lock?.packages || !installed?.packages) return false;
  return Object.entries(lock.packages).every(([place, wanted]) => {
    if (place === '') return true;
    const found = installed.packages[place];
    return found ? found.version === wanted.version : Boolean(wanted.optional);
  });
}

/** Installs the npm packages when they are missing or no longer those of the lock file. */
export async function ensurePackages() {
  const lockFile = inProject('package-lock.json');
  const stampFile = inProject('node_modules', '.tockwell-lock');
  const lockHash = sha256(readFileSync(lockFile));
  if (existsSync(stampFile) && readFileSync(stampFile, 'utf8') === lockHash) return;
  const installed = readJson(inProject('node_modules', '.package-lock.json'));
  if (!satisfiesLock(readJson(lockFile), installed)) await installPackages();
  writeFileSync(stampFile, lockHash);
}

async function installPackages() {
  say('Installing npm packages (about a minute the first time) …');
  const npm = process.env.npm_execpath;
  // The build needs the development packages, whatever NODE_ENV says.
  const args = ['ci', '--include=dev', '--no-fund', '--no-audit'];
  await mustRun(
    'Installing the npm packages',
    'Check the network connection and that this folder may be written, then start again.',
    npm?.endsWith('.js') ? process.execPath : 'npm',
    npm?.endsWith('.js') ? [npm, ...args] : args,
    { cwd: inProject() },
  );
}

if (isEntryPoint(import.meta.url)) {
  try {
    checkNodeVersion();
    await ensurePackages();
  } catch (error) {
    tellFailure(error);
    process.exitCode = 1;
  }
}
