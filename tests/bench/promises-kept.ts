import { analyseCycle } from '../../server/engine/cycle.ts';
import { createRandom } from '../../server/engine/random.ts';
import { periodAt, prepareChecked } from '../../server/engine/prepared-single.ts';
import type { CataloguePart } from '../../server/domain/catalogue.ts';
import type { ShopSettings } from '../../server/store/settings.ts';
import { packFor } from '../support/packs-in-hand.ts';
import { variedBriefs } from '../support/varied-briefs.ts';
import { tryKits, type RateOf } from '../support/virtual-kits.ts';
import { printTable } from './tables.ts';

const kitsEach = 100_000;
/** A steered circuit takes a hundred times as long; its kits are fewer, which widens the standard error. */
const steeredKits = 4000;

const engineRate: RateOf = (circuit) => {
  if (circuit.timing.kind === 'single') {
    return 1 / periodAt(prepareChecked(circuit), circuit.timing.ohms);
  }
  const cycle = analyseCycle(circuit);
  return cycle.kind === 'oscillates' ? cycle.frequencyHz : NaN;
};

/**
 * Builds a hundred thousand kits for each of thirty varied briefs and tries every one at all ends of
 * temperature and supply. Returns whether every promise was kept: nothing outside a guaranteed band,
 * and every stated share within three standard errors (of the run and of the method).
 */
export function promisesKept(book: {
  catalogue: readonly CataloguePart[];
  settings: ShopSettings;
}): boolean {
  let kept = true;
  const rows = variedBriefs.map((input, k) => {
    const { pack, search, shelf, sentence } = packFor(book, input);
    const kits = pack.topology === 'steered' ? steeredKits : kitsEach;
    const run = tryKits(pack, search, shelf, kits, createRandom(9000 + k), engineRate);
    const stated = pack.yieldWithinBand;
    const built = run.within / run.kits;
    const error = Math.hypot(
      Math.sqrt(Math.max(stated * (1 - stated), 1 / kits) / kits),
      pack.yieldStandardError,
    );
    const off = (built - stated) / error;
    if (run.outsideGuarantee > 0 || Math.abs(off) > 3) kept = false;
    const end = (hertz: number) => ((hertz / search.targetHz - 1) * 100).toFixed(2);
    return [
      sentence.slice(0, 52),
      search.care,
      pack.topology.split('-')[0]!,
      `${end(pack.guaranteed.minHz)} … ${end(pack.guaranteed.maxHz)} %`,
      String(run.outsideGuarantee),
      `${(100 * stated).toFixed(2)} %`,
      `${(100 * built).toFixed(2)} %`,
      off.toFixed(1),
    ];
  });
  printTable(
    `Promises kept: ${kitsEach.toLocaleString('en')} kits each (${steeredKits.toLocaleString('en')} where steered), by the full model`,
    ['brief', 'care', 'topology', 'guaranteed', 'outside', 'stated', 'built', 'standard errors'],
    rows,
  );
  return kept;
}
