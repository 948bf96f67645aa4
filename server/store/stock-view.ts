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
 * The parts with those of the ids as newly read, and without those no longer there (ids undefined:
 * all were read). Keeps each object that says the same as before, and the array itself when all do.
 */
function renewed(before: Catalogue, ids: readonly number[] | undefined, fresh: Catalogue) {
  const kept = fresh.map((part) => sameAs(before[positionOf(before, part.id)], part));
  if (ids === undefined) {
    const same = kept.length === before.length && kept.every((part, k) => part === before[k]);
    return same ? before : Object.freeze(kept);
  }
  const read = new Map(kept.map((part) => [part.id, part]));
  const changed = ids.filter((id) => partWithId(before, id) !== read.get(id));
  if (changed.length === 0) return before;
  const after = before.slice();
  for (const id of changed) {
    const part = read.get(id);
    const at = positionOf(after, id);
    const stands = after[at]?.id === id;
    if (part && stands) after[at] = part;
    else after.splice(at, stands ? 1 : 0, ...(part ? [part] : []));
  }
  return Object.freeze(after);
}

function sameAs(before: CataloguePart | undefined, part: CataloguePart): CataloguePart {
  return isDeepStrictEqual(before, part) ? before! : Object.freeze(part);
}

function partWithId(parts: Catalogue, id: number): CataloguePart | undefined {
  const part = parts[positionOf(parts, id)];
  return part?.id === id ? part : undefined;
}

/** Where the first part stands whose id is not below; parts ascend by id. */
function positionOf(parts: Catalogue, id: number): number {
  let from = 0;
  let to = parts.length;
  while (from < to) {
    const middle = (from + to) >> 1;
    if (parts[middle]!.id < id) from = middle + 1;
    else to = middle;
  }
  return from;
}
