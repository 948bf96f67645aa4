import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { installDebianPackage } from './debian-package.mjs';
import { runCommand } from './run-command.mjs';
import { PlainFailure } from './step.mjs';

const debianFolder = '/usr/lib/postgresql';
const needed = ['initdb', 'postgres', 'psql'];

const isComplete = (folder) => needed.every((name) => existsSync(path.join(folder, name)));

function candidates() {
  const versions = existsSync(debianFolder) ? readdirSync(debianFolder) : [];
  const debian = versions
    .sort((a, b) => Number(b) - Number(a))
    .map((version) => path.join(debianFolder, version, 'bin'));
  return [...debian, ...(process.env.PATH ?? '').split(path.delimiter).filter(Boolean)];
}

async function majorOf(folder) {
  const { output } = await runCommand(path.join(folder, 'postgres'), ['--version'], { cwd: '/' });
  return /(\d+)/.exec(output)?.[1] ?? '';
}

/**
 * The folder of PostgreSQL's programs, installed from Debian when there is none. `major` asks for the
 * release a data folder was made by, which no other release can read.
 */
export async function ensurePostgresBinaries(major = null) {
  const found = await findBinaries(major);
  if (found) return found;
  await installDebianPackage(major ? `postgresql-${major}` : 'postgresql', 'PostgreSQL');
  const installed = await findBinaries(major);
  if (installed) return installed;
  throw new PlainFailure(
    'PostgreSQL was installed, but its server programs were not found.',
    `Look for initdb under ${debianFolder}, and add its folder to PATH.`,
  );
}

async function findBinaries(major) {
  for (const folder of candidates().filter(isComplete)) {
    if (major === null || (await majorOf(folder)) === major) return folder;
  }
  return null;
}
