import { describe, expect, it } from 'vitest';
import { createNormal, createRandom } from '../../server/engine/random.ts';

const count = 200_000;

function moments(next: () => number) {
  const values = Array.from({ length: count }, next);
  const mean = values.reduce((sum, value) => sum + value, 0) / count;
  const power = (k: number) => values.reduce((sum, value) => sum + (value - mean) ** k, 0) / count;
  return { mean, variance: power(2), fourth: power(4), values };
}

describe('createRandom', () => {
  it('repeats its sequence for the same seed and not for another', () => {
    const draw = (seed: number) => Array.from({ length: 8 }, createRandom(seed));
    expect(draw(7)).toEqual(draw(7));
    expect(draw(7)).not.toEqual(draw(8));
  });

  it('has the mean and variance of the uniform distribution', () => {
    const { mean, variance, values } = moments(createRandom(1));
    expect(Math.abs(mean - 1 / 2)).toBeLessThan(5 * Math.sqrt(1 / 12 / count));
    expect(variance).toBeCloseTo(1 / 12, 3);
    expect(values.every((value) => value >= 0 && value < 1)).toBe(true);
  });

  it('fills a hundred bins evenly (chi-square with 99 degrees of freedom under 160)', () => {
    const bins = new Array<number>(100).fill(0);
    const random = createRandom(2);
    for (let k = 0; k < count; k++) {
      const bin = Math.floor(random() * 100);
      bins[bin] = (bins[bin] ?? 0) + 1;
    }
    const chiSquare = bins.reduce((sum, n) => sum + (n - count / 100) ** 2 / (count / 100), 0);
    expect(chiSquare).toBeLessThan(160);
    expect(chiSquare).toBeGreaterThan(50);
  });

  it('refuses a seed that is not a 32-bit whole number', () => {
    for (const seed of [-1, 0.5, NaN, 2 ** 32])
      expect(() => createRandom(seed)).toThrow(RangeError);
  });
});

describe('createNormal', () => {
  it('has the first four moments of the normal distribution', () => {
    const { mean, variance, fourth } = moments(createNormal(createRandom(3)));
    expect(Math.abs(mean)).toBeLessThan(5 / Math.sqrt(count));
    expect(variance).toBeCloseTo(1, 1);
    expect(Math.abs(fourth / 3 - 1)).toBeLessThan(0.03);
  });
});
