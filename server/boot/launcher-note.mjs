import { readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { isAlive } from './postgres-leftovers.mjs';
import { readJson, writeJson } from './project.mjs';
import { PlainFailure } from './step.mjs';

/** Claims a data folder for this launcher; a second one on the same folder is refused. */
export function claimDataFolder(dataDir) {
  const file = path.join(dataDir, 'launcher.json');
  const earlier = readJson(file)?.pid;
  if (earlier && earlier !== process.pid && isAlive(earlier) && isLauncher(earlier)) {
    throw new PlainFailure(
      `Tockwell already runs on ${dataDir} (process ${earlier}).`,
      `Stop that one first (kill ${earlier}), or set DATA_DIR to another folder.`,
    );
  }
  writeJson(file, { pid: process.pid });
  return () => rmSync(file, { force: true });
}

function isLauncher(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('server/boot/');
  } catch {
    return false;
  }
}
