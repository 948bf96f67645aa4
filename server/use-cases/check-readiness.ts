import type { Deps } from '../ports.ts';
import { isMigrated } from '../store/migrate.ts';

/** Whether the shop can serve: the database answers and its schema is the newest. */
export async function checkReadiness(deps: Pick<Deps, 'db'>): Promise<boolean> {
  try {
    await deps.db.raw('select 1');
    return await isMigrated(deps.db);
  } catch {
    return false;
  }
}
