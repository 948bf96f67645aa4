import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  renameSync,
  rmdirSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { asAccount, canEnter, giveTo } from './postgres-account.mjs';
import { readJson, sha256, writeJson } from './project.mjs';
import { mustRun } from './run-command.mjs';
import { PlainFailure, say } from './step.mjs';

const elsewhere = '/var/lib';

/**
 * Where the database files lie: in the data folder, or, when the database's user cannot enter that
 * (a checkout in a private home), under /var/lib, remembered in the data folder.
 */
export function chooseFolder(dataDir, account) {
  const memory = path.join(dataDir, 'postgres-folder.json');
  const remembered = readJson(memory)?.folder;
  if (remembered) return remembered;
  const folder = canHold(dataDir, account)
    ? path.join(dataDir, 'postgres')
    : outsideFolder(dataDir);
  if (!folder.startsWith(dataDir)) {
    say(`The database's user cannot enter ${dataDir}; the database files go to ${folder}.`);
  }
  writeJson(memory, { folder });
  return folder;
}

function canHold(dataDir, account) {
  if (!canEnter(account, dataDir)) return false;
  const probe = mkdtempSync(path.join(dataDir, 'probe-'));
  const given = giveTo(account, probe) && canEnter(account, probe);
  rmSync(probe, { recursive: true });
  return given;
}

function outsideFolder(dataDir) {
  const base = path.join(elsewhere, `tockwell-${sha256(dataDir).slice(0, 10)}`);
  // An older folder of that name belongs to a data folder since deleted, whose password is gone.
  for (let turn = 1; ; turn += 1) {
    const folder = turn === 1 ? base : `${base}-${turn}`;
    if (!existsSync(folder)) return folder;
  }
}

/** The PostgreSQL release that made the folder; null when there is no database in it yet. */
export function majorOfFolder(folder) {
  const file = path.join(folder, 'PG_VERSION');
  return existsSync(file) ? readFileSync(file, 'utf8').trim() : null;
}

/** Makes an empty cluster under another name first, so that half a cluster is never taken for one. */
export async function initialise(folder, binaries, account, password, hasty) {
  if (majorOfFolder(folder)) return;
  const unfinished = `${folder}.unfinished`;
  rmSync(unfinished, { recursive: true, force: true });
  mkdirSync(path.dirname(folder), { recursive: true });
  mkdirSync(unfinished, { mode: 0o700 });
  giveTo(account, unfinished);
  await withPasswordFile(account, password, (passwordFile) =>
    mustRun(
      'Making the database folder',
      `Check that there is room on the disk and that ${path.dirname(folder)} may be written.`,
      path.join(binaries, 'initdb'),
      // prettier-ignore
      ['-D', unfinished, '-U', 'postgres', '-E', 'UTF8', '--locale=C.UTF-8', '-A', 'scram-sha-256', `--pwfile=${passwordFile}`, '--no-instructions', ...(hasty ? ['--no-sync'] : [])],
      asAccount(account),
    ),
  );
  refuseForeignFiles(folder);
  renameSync(unfinished, folder);
}

async function withPasswordFile(account, password, work) {
  const folder = mkdtempSync(path.join(tmpdir(), 'tockwell-initdb-'));
  const file = path.join(folder, 'password');
  writeFileSync(file, `${password}\n`, { mode: 0o600 });
  giveTo(account, file);
  giveTo(account, folder);
  try {
    return await work(file);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function refuseForeignFiles(folder) {
  if (!existsSync(folder)) return;
  try {
    // Succeeds on an empty folder only.
    rmdirSync(folder);
  } catch {
    throw new PlainFailure(
      `${folder} holds files, but no database.`,
      'Move them away, or set DATA_DIR to another folder.',
    );
  }
}
