import type { Pack } from '../../../server/contracts/packs.ts';
import { bandOff } from './model.ts';

export interface PlacedTag {
  pack: Pack;
  /** 0…1, cheap to dear. */
  x: number;
  /** 0…1, steady (top) to wide. */
  y: number;
}

function spread(values: readonly number[]): (value: number) => number {
  const low = Math.min(...values);
  const span = Math.max(...values) - low;
  return (value) => (span === 0 ? 0.5 : (value - low) / span);
}

function collides(tag: PlacedTag, others: readonly PlacedTag[]): boolean {
  return others.some(
    (other) => Math.abs(other.x - tag.x) < 0.028 && Math.abs(other.y - tag.y) < 0.13,
  );
}

/**
 * Where each small tag stands: price across, guaranteed band (logarithmic) downwards. Tags that would
 * cover each other are moved along the price axis by the least that shows both.
 */
export function placeTags(packs: readonly Pack[], targetHz: number): PlacedTag[] {
  const across = spread(packs.map((pack) => pack.price.unit.amount));
  const down = spread(packs.map((pack) => Math.log(bandOff(pack, targetHz).worse)));
  const placed: PlacedTag[] = [];
  for (const pack of packs) {
    const home = across(pack.price.unit.amount);
    const tag = { pack, x: home, y: down(Math.log(bandOff(pack, targetHz).worse)) };
    for (let step = 1; step <= 60 && collides(tag, placed); step += 1) {
      const shift = Math.ceil(step / 2) * 0.03 * (step % 2 === 0 ? -1 : 1);
      tag.x = Math.max(0, Math.min(1, home + shift));
    }
    placed.push(tag);
  }
  return placed;
}
