import { chownSync, readFileSync } from 'node:fs';
import { spawnSync } from 'node:child_process';
import { PlainFailure } from './step.mjs';

/**
 * Who runs PostgreSQL: its server refuses root, so root hands it to the `postgres` user of Debian's
 * package; anybody else runs it as themselves.
 */
export function postgresAccount() {
  if (process.getuid?.() !== 0) return null;
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith('postgres:'));
  if (!line) {
    throw new PlainFailure(
      'There is no user "postgres" to run the database as.',
      'Install PostgreSQL from Debian (apt-get install postgresql), or start as a normal user.',
    );
  }
  const [, , uid, gid] = line.split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

/** Spawn options that run a program as that account, in a folder it can certainly enter. */
export function asAccount(account) {
  return account ? { ...account, cwd: '/' } : { cwd: '/' };
}

/** True when the account can enter the folder, through all of its parents. */
export function canEnter(account, folder) {
  return spawnSync('test', ['-x', folder], asAccount(account)).status === 0;
}

/** Gives a folder or file to the account; false where the file system does not allow that. */
export function giveTo(account, place) {
  if (!account) return true;
  try {
    chownSync(place, account.uid, account.gid);
    return true;
  } catch {
    return false;
  }
}
