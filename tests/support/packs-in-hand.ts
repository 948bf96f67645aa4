import { solveRequestSchema, type SolveRequestInput } from '../../server/contracts/brief.ts';
import { resolveBrief } from '../../server/domain/brief.ts';
import type { CataloguePart } from '../../server/domain/catalogue.ts';
import { findPacks } from '../../server/engine/search/find-packs.ts';
import type { RankedPack } from '../../server/engine/search/promise.ts';
import type { PreparedShelf } from '../../server/engine/search/prepared-shelf.ts';
import type { SearchBrief } from '../../server/engine/search/shelf.ts';
import type { ShopSettings } from '../../server/store/settings.ts';
import { searchShelf } from '../../server/use-cases/search-shelf.ts';

/** The first pack of a brief, with all that decides what its kits do. */
export interface PackInHand {
  sentence: string;
  pack: RankedPack;
  search: SearchBrief;
  shelf: PreparedShelf;
}

/** Solves a brief on a catalogue as the shop does; throws where it has no pack. */
export function packFor(
  book: { catalogue: readonly CataloguePart[]; settings: ShopSettings },
  input: SolveRequestInput,
): PackInHand {
  const request = solveRequestSchema.parse(input);
  const inHand = resolveBrief(request, book.catalogue, book.settings);
  if (inHand.kind === 'impossible') throw new Error(inHand.errors[0]!.message);
  const shelf = searchShelf(book, inHand.brief);
  const [pack] = findPacks(shelf, inHand.search, request.rank, 1).packs;
  if (!pack) throw new Error(`No pack: ${inHand.brief.sentence}`);
  return { sentence: inHand.brief.sentence, pack, search: inHand.search, shelf };
}
