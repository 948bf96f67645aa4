import type { ReadingRequest, ReadingResponse } from '../contracts/bench.ts';
import { toPackPart } from '../domain/pack-parts.ts';
import { promiseOf } from '../domain/promise.ts';
import { shelfOf } from '../domain/shelf.ts';
import { readingWords, soldPackOf, withOwnPieces } from '../domain/tuning.ts';
import { prepareShelf } from '../engine/search/prepared-shelf.ts';
import { liesInside, tunedKits, type TunedKit } from '../engine/search/tuned-kit.ts';
import { formatOhms } from '../engine/si-format.ts';
import { readTypedFarads } from '../engine/typed-value.ts';
import type { Deps } from '../ports.ts';
import type { Database } from '../store/connection.ts';
import type { OrderLineRow } from '../store/orders.ts';
import { findParts } from '../store/parts.ts';
import { inTransaction } from '../store/transaction.ts';
import { writeTuning } from '../store/tunings.ts';
import type { BenchDeps, Packer } from './bench-order.ts';
import { exchangeTiming } from './exchange-timing.ts';
import {
  openKit,
  ownPieces,
  requirePlausible,
  type KitToTune,
  type Reading,
} from './kit-to-tune.ts';
import { openPackBook, type PackBook } from './pack-book.ts';
import { Refusal } from './refusal.ts';
import { searchShelf } from './search-shelf.ts';
import { viewBenchOrder } from './view-bench-order.ts';

type PutBack = ReadingResponse['putBack'];

/**
 * Tunes one kit to its measured capacitor: finds the R4 that makes this very kit hit, keeps it in
 * place of the one kept before, and writes the kit's own promise down, all in one transaction. The
 * same reading again changes nothing; another one takes its place.
 */
export async function tuneKit(
  deps: BenchDeps & Pick<Deps, 'stockView'>,
  packer: Packer,
  ref: string,
  input: ReadingRequest,
): Promise<ReadingResponse> {
  const { lineId, unit } = input;
  const farads = faradsOf(input);
  // Opened before the transaction, which counts the lots anew once it has locked them.
  const book = await openPackBook(deps);
  const putBack = await inTransaction(deps.db, async (trx) => {
    const kit = await openKit(trx, packer, ref, { lineId, unit, farads });
    return kit === null ? [] : tune(deps, trx, book, packer, kit);
  });
  const order = await viewBenchOrder(deps, packer, ref);
  const line = order.lines.find(({ id }) => id === lineId);
  const tuned = line?.tuning?.units.find((one) => one.unit === unit);
  if (!tuned || tuned.farads === null) {
    throw new Refusal('conflict', `${ref} was handed back meanwhile; measure the kit again.`);
  }
  return { ...tuned, lineId, putBack, order };
}

function faradsOf({ farads, reading }: ReadingRequest): number {
  const read = farads ?? readTypedFarads(reading ?? '');
  if (read !== null && read > 0) return read;
  const message = 'Write the reading with its unit, such as 818.2n, 0.8182 uF or 818n2.';
  throw new Refusal('invalid', message, [{ path: 'reading', message }]);
}

/** Chooses R4, exchanges what is kept, writes the kit down; gives what must go back to the bins. */
async function tune(
  deps: BenchDeps,
  trx: Database,
  book: PackBook,
  packer: Packer,
  kit: KitToTune,
): Promise<PutBack> {
  requirePlausible(kit, book);
  const own = ownPieces(kit);
  const kits = fittingKits(kit, book, own);
  const taken = await exchangeTiming(trx, kit.line.orderId, own, kits);
  const { timing, circuit } = taken.kit;
  await writeTuning(
    trx,
    {
      ...kit.reading,
      meterUncertainty: book.settings.meterUncertainty,
      firstPartId: timing.first.id,
      secondPartId: timing.second?.id ?? null,
      join: timing.join,
      promise: promiseOf(taken.kit, kit.line.brief),
      circuit,
    },
    { userId: packer.id, at: deps.clock.now() },
  );
  const role = own.length === 1 ? 'R4' : 'R4A';
  const parts = await findParts(trx, own);
  return taken.fromTray.map(({ partId, bin }) => ({
    ...toPackPart(
      role,
      parts.find(({ id }) => id === partId)!,
    ),
    bins: [bin],
  }));
}

/** The kits that R4s on the shelf make of this capacitor and that keep what was sold, nearest first. */
function fittingKits(kit: KitToTune, book: PackBook, own: readonly number[]): TunedKit[] {
  const { line, choice, parts, reading } = kit;
  const byId = new Map(parts.map((part) => [part.id, part]));
  const sold = soldPackOf(line.brief, choice, byId, book.settings);
  if (sold === null) {
    throw new Refusal(
      'conflict',
      'A part of this pack is no longer as it was sold; ask the owner.',
    );
  }
  const shelf = prepareShelf(
    shelfOf(withOwnPieces(book.catalogue, own), line.brief.mounting, null),
    searchShelf(book, line.brief),
  );
  const kits = tunedKits(sold.frame, reading.farads, sold.limit, sold.search, shelf);
  const fitting = kits.filter(({ guaranteed }) => liesInside(guaranteed, line.promise.band));
  if (fitting.length > 0) return fitting;
  throw new Refusal('promise-not-kept', whyNone(kits[0], line, reading));
}

function whyNone(nearest: TunedKit | undefined, line: OrderLineRow, { farads }: Reading): string {
  const advice = 'Put this capacitor back and measure another one.';
  if (!nearest) return `The shelf holds no R4 for ${readingWords(farads)}. ${advice}`;
  const own = promiseOf(nearest, line.brief).text;
  const { text } = line.promise;
  return (
    `With ${readingWords(farads)} the nearest R4 on the shelf, ${formatOhms(nearest.timing.ohms)}, ` +
    `would hold ${own.from} to ${own.to} ${own.unit}; ${text.from} to ${text.to} was promised. ${advice}`
  );
}
