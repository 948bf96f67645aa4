import { describe, expect, it } from 'vitest';
import { createNormal, createRandom } from '../../../server/engine/random.ts';
import { findPacks } from '../../../server/engine/search/find-packs.ts';
import { promise, type Rank, type RankedPack } from '../../../server/engine/search/promise.ts';
import { guaranteedBand, worseEnd } from '../../../server/engine/search/guaranteed-band.ts';
import { kitYield } from '../../../server/engine/search/kit-yield.ts';
import { prepareShelf } from '../../../server/engine/search/prepared-shelf.ts';
import type { SearchBrief, Shelf } from '../../../server/engine/search/shelf.ts';
import { drawKit, kitHz, placesOf, type Draw, type Kit } from './drawn-kits.ts';
import { benchGrid, drawTrimmedKit, drawTunedKit } from './serviced-kits.ts';
import { briefAt, lotChecked, redLed, workshop, workshopWith } from './workshop-shelf.ts';

/** Draws kits of a pack as its care level makes them. */
function kitsOf(pack: RankedPack, shelf: Shelf, brief: SearchBrief, seed: number): () => Kit {
  const random = createRandom(seed);
  const normal = createNormal(random);
  const draw: Draw = (low, high) => low + (high - low) * random();
  if (brief.care === 'trimmer-fitted') return () => drawTrimmedKit(pack, brief, draw, normal);
  if (brief.care !== 'bench-tuned') return () => drawKit(pack, brief, draw, normal);
  const grid = benchGrid(pack, shelf, brief);
  return () => drawTunedKit(pack, grid, brief, draw, normal);
}

/** Share of kits that hold the band at every place, by the full model. */
function shareOf(pack: RankedPack, shelf: Shelf, brief: SearchBrief, count: number): number {
  const next = kitsOf(pack, shelf, brief, 2026);
  const places = placesOf(brief);
  const { targetHz, band } = brief;
  let inside = 0;
  for (let k = 0; k < count; k += 1) {
    const kit = next();
    const holds = (hertz: number) => Math.abs(hertz / targetHz - 1) <= band;
    if (places.every((place) => holds(kitHz(kit, brief, place)))) inside += 1;
  }
  return inside / count;
}

interface Row {
  name: string;
  shelf: Shelf;
  brief: SearchBrief;
  rank: Rank;
  /** The asked band as a share of the guaranteed band's worse end. */
  share: number;
}

const row = (
  name: string,
  share: number,
  brief: SearchBrief,
  { shelf = workshop, rank = 'closest' }: { shelf?: Shelf; rank?: Rank } = {},
): Row => ({ name, shelf, brief, rank, share });

const tuned = { care: 'bench-tuned' } as const;
const trimmed = { care: 'trimmer-fitted' } as const;
const lots = { shelf: lotChecked };

const rows: Row[] = [
  row('one resistor', 0.6, briefAt(250), { rank: 'best-value' }),
  row('two joined resistors', 0.7, briefAt(33)),
  row('precise parts over a wide range', 0.8, briefAt(90, { minCelsius: -20, maxCelsius: 70 }), {
    rank: 'steadiest',
  }),
  row('an open-drain output', 0.65, briefAt(440), { shelf: workshopWith(2) }),
  row('an LED on the output itself', 0.6, briefAt(1.5, { load: redLed }), {
    shelf: workshopWith(1),
  }),
  row('a buffered LED', 0.5, briefAt(1.5, { load: redLed }), { shelf: workshopWith(4) }),
  row('a fast clock with stray and delay', 0.55, briefAt(4e4)),
  row('shifted thresholds', 0.6, briefAt(100, { duty: 0.3 }), { shelf: workshopWith(1) }),
  row('steered timing', 0.6, briefAt(33, { duty: 0.1 })),
  row('steered timing over a wide range', 0.7, briefAt(400, { duty: 0.9, maxCelsius: 60 })),
  row('measured lots', 0.55, briefAt(70, { care: 'lot-checked' }), lots),
  row('measured lots of the steadiest', 0.7, briefAt(600, { care: 'lot-checked' }), {
    ...lots,
    rank: 'steadiest',
  }),
  row('a measured capacitor', 0.6, briefAt(70, tuned), { rank: 'best-value' }),
  row('a measured capacitor and precise resistors', 0.75, briefAt(700, tuned), {
    rank: 'steadiest',
  }),
  row('a fitted trimmer', 0.6, briefAt(70, trimmed)),
  row('a fitted trimmer over a wide range', 0.8, briefAt(5, { ...trimmed, maxCelsius: 60 })),
];

const kits = 6000;

describe('kitYield', () => {
  const yields: number[] = [];

  it.each(rows)(
    'agrees with kits by the full model for $name',
    ({ shelf, rank, share, ...rest }) => {
      const prepared = prepareShelf(shelf);
      const wanted = (found: RankedPack) =>
        rest.name.startsWith('steered') ? found.timing.kind === 'steered' : true;
      const found = findPacks(prepared, rest.brief, rank, 60).packs.find(wanted)!;
      const end = worseEnd(found.guaranteed, rest.brief.targetHz);
      const brief = { ...rest.brief, band: share * end };
      const pack = promise(found, brief, prepared);
      const promised = pack.yieldWithinBand;
      yields.push(promised);
      const counted = shareOf(pack, shelf, brief, kits);
      const error = Math.sqrt(Math.max(counted * (1 - counted), 1 / kits) / kits);
      // A tuned kit may get any resistor of its class; the promise counts on the worst of them.
      const better = brief.care === 'bench-tuned' ? 0.01 : 0;
      expect(counted - promised).toBeLessThan(3 * error + 0.002 + better);
      expect(promised - counted).toBeLessThan(3 * error + 0.002);
      expect(pack.yieldStandardError).toBeGreaterThan(0);
    },
  );

  it('has been asked for low and for high shares', () => {
    expect(yields).toHaveLength(rows.length);
    expect(Math.min(...yields)).toBeLessThan(0.6);
    expect(Math.max(...yields)).toBeGreaterThan(0.98);
    expect(yields.every((each) => each > 0.3 && each < 0.9995)).toBe(true);
  });

  it('is exactly all kits where the guaranteed band lies inside the asked one', () => {
    const brief = briefAt(100, { band: 0.2 });
    const [pack] = findPacks(prepareShelf(workshop), brief, 'steadiest', 1).packs;
    expect(worseEnd(pack!.guaranteed, brief.targetHz)).toBeLessThan(0.2);
    expect(pack!.yieldWithinBand).toBe(1);
    expect(pack!.yieldStandardError).toBe(0);
  });

  it('is none where a kit may stop', () => {
    const brief = briefAt(100);
    const prepared = prepareShelf(workshop);
    const [pack] = findPacks(prepared, brief, 'closest', 1).packs;
    const { maxHz } = guaranteedBand(pack!, brief, prepared);
    expect(kitYield(pack!, brief, prepared, { minHz: 0, maxHz }).yieldWithinBand).toBe(0);
  });
});
