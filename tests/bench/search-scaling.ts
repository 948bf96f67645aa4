import { aimFrames, closestByCapacitor } from '../../server/engine/search/closest.ts';
import { framePeriod } from '../../server/engine/search/aim.ts';
import { findPacks } from '../../server/engine/search/find-packs.ts';
import { headsFor, type Head } from '../../server/engine/search/heads.ts';
import { prepareShelf, type PreparedShelf } from '../../server/engine/search/prepared-shelf.ts';
import { capacitorSuits } from '../../server/engine/search/rules.ts';
import { isMakeable, listOffers } from '../../server/engine/search/timing-choice.ts';
import { briefAt } from '../engine/search/workshop-shelf.ts';
import { largeShelf } from './large-shelf.ts';
import { printTable, quantile, timed } from './tables.ts';

const limitsMs: Record<number, number> = { 10_000: 50, 50_000: 250 };

const clockBrief = (targetHz: number) => briefAt(targetHz, { meterUncertainty: 0.0025 });

/** Counts how often a head's circuit is evaluated, by a field that every evaluation reads once. */
function countEvaluations(heads: readonly Head[]): () => number {
  let count = 0;
  for (const { prepared } of heads) {
    const { inputAmps } = prepared;
    Object.defineProperty(prepared, 'inputAmps', {
      get: () => {
        count += 1;
        return inputAmps;
      },
    });
  }
  return () => count;
}

/**
 * Exhaustive search for the closest pack on the seeded stock against the shop's own: the same answer,
 * with how many circuits each evaluated and how long it took. Returns whether the answers agree.
 */
export function compareWithExhaustive(shelf: PreparedShelf): boolean {
  const offers = listOffers(shelf.values, 1);
  const stock = { table: shelf.table, offers, quantity: 1 };
  let agree = true;
  const rows = [1.5, 440, 20_000].map((targetHz) => {
    const brief = clockBrief(targetHz);
    const capacitors = shelf.shelf.capacitors.filter((part) => capacitorSuits(part, brief));
    let least = Number.POSITIVE_INFINITY;
    let tried = 0;
    const exhaustiveMs = timed(() => {
      for (const head of headsFor(shelf, brief)) {
        const own = { ...stock, demand: head.demand };
        for (let k = 0; k < shelf.table.ohms.length; k += 1) {
          const ohms = shelf.table.ohms[k]!;
          if (ohms < head.minTimingOhms || !isMakeable(own, k)) continue;
          for (const capacitor of capacitors) {
            tried += 1;
            const away = Math.abs(Math.log(framePeriod({ head, capacitor }, ohms) * targetHz));
            if (away < least) least = away;
          }
        }
      }
    });
    const heads = headsFor(shelf, brief);
    const evaluated = countEvaluations(heads);
    const [ours] = closestByCapacitor(aimFrames(heads, capacitors, stock, brief), brief);
    const count = evaluated();
    const oursMs = quantile(
      Array.from({ length: 9 }, () => timed(() => findPacks(shelf, brief, 'closest', 10))),
      0.5,
    );
    const same = Math.abs((ours?.distance ?? Infinity) - least) < 1e-12;
    agree &&= same;
    return [
      `${targetHz} Hz`,
      same ? 'same' : 'DIFFERS',
      least.toExponential(2),
      tried.toLocaleString('en'),
      count.toLocaleString('en'),
      `${Math.round(tried / count).toLocaleString('en')}`,
      `${exhaustiveMs.toFixed(0)} ms`,
      `${oursMs.toFixed(1)} ms`,
    ];
  });
  printTable(
    'Closest pack on the seeded stock: exhaustive search against ours (its time is for all three ranks)',
    ['target', 'answer', 'distance', 'circuits tried', 'ours', 'times fewer', 'exhaustive', 'ours'],
    rows,
  );
  return agree;
}

/** Solve times on invented stocks of growing size. Returns whether the limits at 10 000 and 50 000 hold. */
export function searchScaling(): boolean {
  const rates = Array.from({ length: 120 }, (_, k) => 0.05 * 1e6 ** (k / 119));
  let holds = true;
  let before: { pairs: number; p50: number } | null = null;
  const rows = [500, 2000, 10_000, 50_000].map((lines) => {
    let shelf: PreparedShelf | null = null;
    const preparedMs = timed(() => (shelf = prepareShelf(largeShelf(lines))));
    const solve = (hz: number) => findPacks(shelf!, clockBrief(hz), 'best-value', 10);
    rates.filter((_, k) => k % 4 === 0).forEach(solve);
    const times = rates.map((hz) => timed(() => solve(hz)));
    const [p50, p95] = [quantile(times, 0.5), quantile(times, 0.95)];
    const resistors = largeShelf(lines).resistors.length;
    const pairs = resistors * (resistors + 1);
    const growth =
      before === null
        ? ''
        : (Math.log(p50 / before.p50) / Math.log(pairs / before.pairs)).toFixed(2);
    before = { pairs, p50 };
    const limit = limitsMs[lines];
    if (limit !== undefined && p95 > limit) holds = false;
    return [
      lines.toLocaleString('en'),
      shelf!.values.ohms.length.toLocaleString('en'),
      pairs.toLocaleString('en'),
      `${preparedMs.toFixed(0)} ms`,
      `${p50.toFixed(1)} ms`,
      `${p95.toFixed(1)} ms`,
      limit === undefined ? '' : `${limit} ms`,
      growth,
    ];
  });
  printTable(
    'Search scaling: solve with all three ranks and ten promises, 120 rates from 0.05 Hz to 50 kHz',
    [
      'stock lines',
      'values',
      'pairs of lines',
      'preparing',
      'p50',
      'p95',
      'wanted p95',
      'exponent in pairs',
    ],
    rows,
  );
  return holds;
}
