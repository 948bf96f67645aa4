import { isDeepStrictEqual } from 'node:util';
import type { Knex } from 'knex';
import type { CataloguePart } from '../domain/catalogue.ts';
import { loadCatalogue } from './parts.ts';
import { listenToShelves, type ShelfListener } from './shelf-notices.ts';

type Catalogue = readonly CataloguePart[];

export interface StockView {
  /**
   * Every active part with its stock, ascending by id, holding all that was committed before the
   * call. As long as nothing changes it is the same frozen array, so that what is worked out from it
   * can be kept under it; a part that did not change stays the same object.
   */
  current(): Promise<Catalogue>;
}

/** After a connection could not be opened, reads go without it for so long. */
const pauseMs = 1000;
/** While changes keep coming in, only what changed is read so often; then everything at once. */
const maxRounds = 5;

/**
 * Keeps the shelves in memory, current across processes. It opens a connection of its own at the
 * first call and listens for changes; each call asks over it whether any came in. Calls that wait
 * share one answer. While the connection is lost every call reads everything from `db`, and
 * `noteLoss` is told why.
 */
export function createStockView(
  databaseUrl: string,
  db: Knex,
  noteLoss: (error: Error) => void = () => undefined,
): StockView & { close(): Promise<void> } {
  let kept: Catalogue = Object.freeze([]);
  let listener: ShelfListener | null = null;
  let connectAfter = 0;
  let closed = false;
  let underWay: Promise<Catalogue> | null = null;
  let next: Promise<Catalogue> | null = null;

  function start(): Promise<Catalogue> {
    next = null;
    underWay = refresh().finally(() => (underWay = null));
    return underWay;
  }

  async function refresh(): Promise<Catalogue> {
    // A connection may have been lost long ago without anybody noticing: try a new one at once.
    for (let tries = 0; tries < 2 && performance.now() >= connectAfter; tries += 1) {
      if (closed) break;
      try {
        listener ??= await connect();
        await listener.fence();
        return await catchUp(listener);
      } catch (error) {
        listener?.close();
        listener = null;
        if (!closed) noteLoss(error as Error);
      }
    }
    if (closed) throw new Error('The stock view is closed.');
    return Object.freeze(await loadCatalogue(db));
  }

  async function connect(): Promise<ShelfListener> {
    try {
      return await listenToShelves(databaseUrl);
    } catch (error) {
      connectAfter = performance.now() + pauseMs;
      throw error;
    }
  }

  /** Reads until nothing came in meanwhile, so that parts changed together are seen together. */
  async function catchUp(from: ShelfListener): Promise<Catalogue> {
    for (let round = 1; ; round += 1) {
      const heard = from.take();
      if (heard === null) return kept;
      const ids = heard === 'all' || round > maxRounds ? undefined : heard;
      kept = renewed(kept, ids, await loadCatalogue(db, ids, from.client));
      if (ids === undefined) return kept;
    }
  }

  return {
    current() {
      // A check under way may have asked before this caller's changes: wait for the one after it.
      if (underWay === null && next === null) return start();
      next ??= underWay!.then(start, start);
      return next;
    },
    async close() {
      closed = true;
      listener?.close();
      await Promise.allSettled([underWay, next]);
      listener?.close();
    },
  };
}

/**
 * The parts as newly read in place of those before, for the ids read (undefined: all). Keeps each
 * object that says the same as before, and the array itself when all do. Both ascend by id.
 */
function renewed(before: Catalogue, ids: readonly number[] | undefined, fresh: Catalogue) {
  const wasRead = ids && new Set(ids);
  const after: CataloguePart[] = [];
  let changed = false;
  let k = 0;
  const takeBelow = (id: number) => {
    for (; k < fresh.length && fresh[k]!.id < id; k += 1) {
      after.push(Object.freeze(fresh[k]!));
      changed = true;
    }
  };
  for (const part of before) {
    takeBelow(part.id);
    if (fresh[k]?.id === part.id) {
      const same = isDeepStrictEqual(part, fresh[k]);
      after.push(same ? part : Object.freeze(fresh[k]!));
      changed ||= !same;
      k += 1;
    } else if (wasRead === undefined || wasRead.has(part.id)) changed = true;
    else after.push(part);
  }
  takeBelow(Infinity);
  return changed ? Object.freeze(after) : before;
}
