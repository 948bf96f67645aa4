import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, realpathSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const projectFolder = fileURLToPath(new URL('../../', import.meta.url));

/** A path inside the checkout. */
export function inProject(...parts) {
  return path.join(projectFolder, ...parts);
}

/** Where the database, uploads, secrets and logs live; made when missing. */
export function dataFolder(env = process.env) {
  const folder = path.resolve(projectFolder, env.DATA_DIR || '.data');
  mkdirSync(folder, { recursive: true });
  return folder;
}

export function sha256(...contents) {
  const hash = createHash('sha256');
  for (const content of contents) hash.update(content);
  return hash.digest('hex');
}

/** Reads a small JSON file; null when it is missing or cut short. */
export function readJson(file) {
  if (!existsSync(file)) return null;
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}

export function writeJson(file, value, mode = 0o644) {
  writeFileSync(file, `${JSON.stringify(value, null, 2)}\n`, { mode });
}

/** True for the script that Node was asked to run, false for an import. */
export function isEntryPoint(moduleUrl) {
  const script = process.argv[1];
  return script !== undefined && realpathSync(script) === fileURLToPath(moduleUrl);
}
