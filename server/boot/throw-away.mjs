import { chmodSync, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';

/** A data folder for one run; the database server removes it when it ends. */
export function throwAwayFolder() {
  const folder = mkdtempSync(path.join(tmpdir(), 'tockwell-'));
  // The database's own user has to pass through it.
  chmodSync(folder, 0o711);
  return folder;
}
