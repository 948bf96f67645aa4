import { existsSync, readFileSync, readlinkSync, realpathSync, rmSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { PlainFailure } from './step.mjs';

/** True while a process of this id lives. */
export function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

/**
 * Clears what an earlier run left in a database folder: a server that still runs is stopped cleanly,
 * a note of one that was killed is removed. Its process id may by now be somebody else's, so the id
 * alone proves nothing: a server works inside its own data folder.
 */
export async function clearLeftovers(folder) {
  const note = path.join(folder, 'postmaster.pid');
  if (!existsSync(note)) return;
  const pid = Number(readFileSync(note, 'utf8').split('\n')[0]);
  if (pid > 0 && isAlive(pid) && worksIn(pid, folder)) await stopServer(pid);
  rmSync(note, { force: true });
}

function worksIn(pid, folder) {
  try {
    return readlinkSync(`/proc/${pid}/cwd`) === realpathSync(folder);
  } catch {
    return false;
  }
}

async function stopServer(pid) {
  // PostgreSQL's words: SIGINT is the fast stop, SIGQUIT the immediate one.
  for (const [signal, patienceMs] of [
    ['SIGINT', 20_000],
    ['SIGQUIT', 10_000],
  ]) {
    process.kill(pid, signal);
    const end = Date.now() + patienceMs;
    while (isAlive(pid) && Date.now() < end) await sleep(50);
    if (!isAlive(pid)) return;
  }
  throw new PlainFailure(
    `An earlier database server (process ${pid}) does not stop.`,
    `End it with: kill -9 ${pid}`,
  );
}
