import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { seedDemoShop } from '../../seeds/demo-shop.ts';
import { seedReference } from '../../seeds/reference.ts';
import { createRandom } from '../../server/engine/random.ts';
import { loadCatalogue } from '../../server/store/parts.ts';
import { shopSettings } from '../../server/store/settings.ts';
import { integrateCycle } from '../engine/independent-integrator.ts';
import { openTestDatabase, type TestDatabase } from '../support/database.ts';
import { packFor, type PackInHand } from '../support/packs-in-hand.ts';
import { variedBriefs } from '../support/varied-briefs.ts';
import { tryKits, type KitRun } from '../support/virtual-kits.ts';

const kitsEach = 2000;
const integrated = (circuit: Parameters<typeof integrateCycle>[0]) =>
  1 / (integrateCycle(circuit, { tolerance: 1e-7 })?.periodSeconds ?? NaN);

let database: TestDatabase;
let packs: PackInHand[];

beforeAll(async () => {
  database = await openTestDatabase();
  await seedReference(database.db);
  await seedDemoShop(database.db);
  const catalogue = await loadCatalogue(database.db);
  const settings = await shopSettings(database.db);
  packs = variedBriefs.map((brief) => packFor({ catalogue, settings }, brief));
});
afterAll(() => database.drop());

describe('findPacks', () => {
  describe(`when ${kitsEach} kits of each of ${variedBriefs.length} varied briefs are built and integrated apart from the engine`, () => {
    it('finds none outside its guaranteed band, and the stated share within the asked one', () => {
      const runs = packs.map((pack, k) => {
        const random = createRandom(1000 + k);
        return {
          pack,
          run: tryKits(pack.pack, pack.search, pack.shelf, kitsEach, random, integrated),
        };
      });
      console.log(table(runs));
      for (const { pack, run } of runs) {
        expect(run.outsideGuarantee, pack.sentence).toBe(0);
        const stated = pack.pack.yieldWithinBand;
        const share = run.within / run.kits;
        const error = Math.sqrt(Math.max(stated * (1 - stated), 1 / run.kits) / run.kits);
        expect(Math.abs(share - stated), pack.sentence).toBeLessThanOrEqual(3 * error);
      }
      // Briefs that every kit holds, and briefs that only some hold, both must have been tried.
      expect(runs.filter(({ run }) => run.within === run.kits).length).toBeGreaterThan(5);
      expect(runs.filter(({ run }) => run.within < 0.99 * run.kits).length).toBeGreaterThan(5);
    }, 240_000);
  });
});

function table(runs: { pack: PackInHand; run: KitRun }[]): string {
  const lines = runs.map(({ pack, run }) => {
    const { guaranteed, yieldWithinBand, topology } = pack.pack;
    const end = (hertz: number) => `${((hertz / pack.search.targetHz - 1) * 100).toFixed(2)} %`;
    return [
      pack.sentence.slice(0, 60).padEnd(60),
      pack.search.care.padEnd(14),
      topology.padEnd(18),
      `${end(guaranteed.minHz)} … ${end(guaranteed.maxHz)}`.padEnd(20),
      `outside ${run.outsideGuarantee}`,
      `stated ${(100 * yieldWithinBand).toFixed(2)} %`,
      `built ${((100 * run.within) / run.kits).toFixed(2)} %`,
    ].join('  ');
  });
  return `\nPromises kept\n${lines.join('\n')}\n`;
}
