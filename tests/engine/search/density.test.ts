import { describe, expect, it } from 'vitest';
import { createRandom } from '../../../server/engine/random.ts';
import {
  densityOfSum,
  distributionWith,
  integrals,
  rangeOf,
  type Effect,
} from '../../../server/engine/search/density.ts';
import { firstNotBelow } from '../../../server/engine/search/resistor-values.ts';

const uniform = (low: number, middle: number, high: number): Effect => ({
  kind: 'uniform',
  low,
  middle,
  high,
});
const box = (half: number) => uniform(-half, 0, half);

/** Distribution function of a sum of effects at a value, by the engine. */
function share(effects: readonly Effect[], value: number, a = 0, b = 0): number {
  return distributionWith(integrals(densityOfSum(effects)), value, a, b);
}

const draws = 60_000;

/** Places 0…1 in shuffled order, one in each of as many equal parts as there are draws. */
function shuffledPlaces(random: () => number): Float64Array {
  const places = Float64Array.from({ length: draws }, (_, k) => (k + random()) / draws);
  for (let k = draws - 1; k > 0; k -= 1) {
    const other = Math.floor(random() * (k + 1));
    [places[k], places[other]] = [places[other]!, places[k]!];
  }
  return places;
}

/** The same by counting sixty thousand sums. */
function counter(effects: readonly Effect[]): (value: number) => number {
  const random = createRandom(77);
  const sums = new Float64Array(draws);
  for (const effect of effects) {
    shuffledPlaces(random).forEach((place, k) => (sums[k]! += drawOf(effect, place)));
  }
  sums.sort();
  return (value) => firstNotBelow(sums, value) / draws;
}

/** What a cause adds at a place 0…1: the parabola through its three values, or one of its points. */
function drawOf(effect: Effect, place: number): number {
  if (effect.kind === 'points') {
    let left = place;
    const at = effect.weights.findIndex((weight) => (left -= weight) < 0);
    return effect.values[at < 0 ? effect.values.length - 1 : at]!;
  }
  const u = 2 * place - 1;
  const { low, middle, high } = effect;
  return (low * u * (u - 1)) / 2 + middle * (1 - u * u) + (high * u * (u + 1)) / 2;
}

/**
 * Distribution function of a sum of independent uniform causes of ± each half-width: the volume that a
 * plane cuts off a box, by inclusion and exclusion of its corners.
 */
function sumOfBoxes(halves: readonly number[], value: number): number {
  const n = halves.length;
  let volume = 0;
  for (let corner = 0; corner < 2 ** n; corner += 1) {
    let [edge, sign] = [0, 1];
    halves.forEach((half, k) => {
      const upper = (corner >> k) & 1;
      edge += upper ? half : -half;
      if (upper) sign = -sign;
    });
    volume += sign * Math.max(0, value - edge) ** n;
  }
  return halves.reduce((rest, half, k) => rest / (2 * half * (k + 1)), volume);
}

const steps = [-0.9, -0.7, -0.5, -0.3, -0.1, 0, 0.1, 0.3, 0.5, 0.7, 0.9];

describe('densityOfSum', () => {
  describe('when a single cause is uniform', () => {
    it('is a straight line between its ends', () => {
      for (const place of steps) expect(share([box(2)], 2 * place)).toBeCloseTo((1 + place) / 2, 3);
      expect(share([box(2)], -2.1)).toBe(0);
      expect(share([box(2)], 2.1)).toBeCloseTo(1, 12);
    });
  });

  describe('when two equal causes are uniform', () => {
    it('is the triangle that they add up to', () => {
      const exact = (x: number) => (x < 0 ? (2 + x) ** 2 / 8 : 1 - (2 - x) ** 2 / 8);
      for (const place of steps) {
        expect(Math.abs(share([box(1), box(1)], 2 * place) - exact(2 * place))).toBeLessThan(5e-4);
      }
    });
  });

  describe('when a wide and a narrow cause add up', () => {
    it('is the trapezium that they make', () => {
      // Between −2 and 2 flat, falling to nothing at ±4: widths 3 and 1.
      const exact = (x: number) => 1 - (x > 2 ? (4 - x) ** 2 / 24 : 0.5 - x / 6);
      for (const x of [0, 1, 1.9, 2.5, 3, 3.8]) {
        expect(Math.abs(share([box(3), box(1)], x) - exact(x))).toBeLessThan(5e-4);
      }
    });
  });

  describe('when a cause bends as a logarithm does', () => {
    it('has the exponential density of ln(1 + t·u)', () => {
      for (const t of [0.05, 0.2]) {
        const effect = uniform(Math.log1p(-t), 0, Math.log1p(t));
        for (const place of steps) {
          const value = Math.log1p(t * place);
          expect(Math.abs(share([effect], value) - (1 + place) / 2)).toBeLessThan(1e-3);
        }
      }
    });
  });

  describe('when a cause turns within its range', () => {
    it('counts both sides of the turning point', () => {
      // −u², as the rate goes with offset: P(−u² < x) = 1 − √−x.
      const turning = [box(0.5), uniform(-1, 0, -1)];
      const counted = counter(turning);
      for (const x of [-1.3, -0.9, -0.5, -0.2, 0, 0.2, 0.4]) {
        expect(Math.abs(share(turning, x) - counted(x))).toBeLessThan(5e-3);
      }
    });
  });

  describe('when a cause is given by points', () => {
    it('weighs each of them', () => {
      const points: Effect = { kind: 'points', values: [-1, 0.5, 2], weights: [0.2, 0.5, 0.3] };
      expect(share([points, box(0.1)], -0.5)).toBeCloseTo(0.2, 9);
      expect(share([points, box(0.1)], 1)).toBeCloseTo(0.7, 9);
      expect(share([points, box(0.1)], 0.5)).toBeCloseTo(0.45, 2);
      expect(rangeOf(points)).toEqual([-1, 2]);
    });
  });

  describe('when two to five uniform causes add up, some put on top by its integrals', () => {
    it('agrees with the exact distribution', () => {
      const halves = [1, 0.8, 0.35, 0.3, 0.25];
      for (let count = 2; count <= halves.length; count += 1) {
        const own = halves.slice(0, count);
        const effects = own.map(box);
        const whole = own.reduce((sum, half) => sum + half, 0);
        for (const place of steps) {
          const x = place * whole;
          const exact = sumOfBoxes(own, x);
          const [a, b] = [own.at(-1)!, own.at(-2)!];
          expect(Math.abs(share(effects, x) - exact)).toBeLessThan(5e-4);
          expect(Math.abs(share(effects.slice(0, -1), x, a) - exact)).toBeLessThan(5e-4);
          if (count === 2) continue;
          expect(Math.abs(share(effects.slice(0, -2), x, a, b) - exact)).toBeLessThan(5e-4);
        }
      }
    });
  });

  describe('when two narrow causes are put on top of a wide one', () => {
    it('hardly changes the distribution, however narrow they are', () => {
      for (const narrow of [1e-4, 2.6e-4, 5e-4, 1e-3, 3e-3]) {
        for (const other of [narrow / 2, narrow, 4 * narrow]) {
          for (const place of steps) {
            const exact = sumOfBoxes([1, 0.3], 1.3 * place);
            const found = share([box(1), box(0.3)], 1.3 * place, narrow, other);
            expect(Math.abs(found - exact)).toBeLessThan(6e-4);
          }
        }
      }
    });
  });

  const mixtures: [string, Effect[]][] = [
    ['three like causes', [box(1), box(1), box(1)]],
    ['causes off the middle', [uniform(-1, -0.4, 0.2), uniform(0, 0.25, 0.5), box(0.3)]],
    ['one wide and many narrow', [box(1), ...Array.from({ length: 12 }, () => box(0.03))]],
    ['narrow ones off the middle', [box(1), uniform(0, 0.015, 0.03), uniform(-0.02, -0.01, 0)]],
    ['bent, turning and plain', [uniform(-1, 0.1, 1), uniform(-0.4, 0, -0.3), box(0.5)]],
    ['falling instead of rising', [uniform(0.6, 0.05, -0.6), box(0.4)]],
    [
      'points and a box',
      [{ kind: 'points', values: [-0.5, 0, 0.6], weights: [0.25, 0.5, 0.25] }, box(0.4)],
    ],
  ];

  describe.each(mixtures)('when %s add up', (_, effects) => {
    it('agrees with sums counted one by one', () => {
      const counted = counter(effects);
      const [low, high] = effects
        .map(rangeOf)
        .reduce(([a, b], [c, d]) => [a + c, b + d] as const, [0, 0] as const);
      for (const place of steps) {
        const x = (low + high) / 2 + (place * (high - low)) / 2;
        expect(Math.abs(share(effects, x) - counted(x))).toBeLessThan(5e-3);
      }
    });

    it('agrees with one and two more uniform causes put on top by its integrals', () => {
      for (const [a, b] of [
        [0.7, 0],
        [0, 0.2],
        [0.5, 0.3],
        [0.25, 0.25],
      ] as const) {
        const together = [...effects, ...[a, b].filter((half) => half > 0).map(box)];
        const counted = counter(together);
        for (const x of [-1.2, -0.6, -0.2, 0.1, 0.5, 1, 1.6]) {
          expect(Math.abs(share(effects, x, a, b) - counted(x))).toBeLessThan(5e-3);
          expect(Math.abs(share(effects, x, a, b) - share(together, x))).toBeLessThan(5e-3);
        }
      }
    });
  });
});

describe('integrals', () => {
  const of = integrals(densityOfSum([box(1), uniform(-0.5, -0.1, 0.5)]));

  it('never fall, and end at one', () => {
    const { once, twice, thrice } = of;
    for (const table of [once, twice, thrice]) {
      expect(table.every((value, k) => k === 0 || value >= table[k - 1]!)).toBe(true);
    }
    expect(once.at(-1)).toBeCloseTo(1, 12);
  });

  it('go on beyond the grid as the distribution does', () => {
    expect(distributionWith(of, 50, 0, 0)).toBeCloseTo(1, 12);
    expect(distributionWith(of, 50, 1, 0)).toBeCloseTo(1, 9);
    expect(distributionWith(of, 50, 1, 0.5)).toBeCloseTo(1, 9);
    expect(distributionWith(of, -50, 1, 0.5)).toBe(0);
    expect(distributionWith(of, 1.4, 200, 0)).toBeCloseTo(0.5 + 1.4 / 400, 3);
  });
});
