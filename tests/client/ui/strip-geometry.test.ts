import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { heightAt, idealStrip, onePeriod } from '../../../client/ui/strip-geometry.ts';

const duties = fc.double({ min: 0.05, max: 0.95, noNaN: true });

describe('idealStrip', () => {
  it('turns at a third and two thirds of the supply for equal thresholds', () => {
    const { thresholds } = idealStrip(0.5, 1);
    expect(thresholds[0]).toBeCloseTo(1 / 3, 10);
    expect(thresholds[1]).toBeCloseTo(2 / 3, 10);
  });

  it('charges for the lit share and discharges for the rest, at one time constant', () => {
    fc.assert(
      fc.property(duties, (duty) => {
        const [low, high] = idealStrip(duty, 1).thresholds;
        const charge = Math.log((1 - low) / (1 - high));
        const discharge = Math.log(high / low);
        expect(charge / (charge + discharge)).toBeCloseTo(duty, 8);
      }),
    );
  });

  it('draws the capacitor without a jump and inside its thresholds', () => {
    fc.assert(
      fc.property(duties, (duty) => {
        const { capacitor, thresholds } = idealStrip(duty, 1);
        const [low, high] = thresholds;
        for (const [, y] of capacitor) {
          expect(y).toBeGreaterThanOrEqual(low - 1e-9);
          expect(y).toBeLessThanOrEqual(high + 1e-9);
        }
        const steps = capacitor.slice(1).map(([, y], index) => Math.abs(y - capacitor[index]![1]));
        expect(Math.max(...steps)).toBeLessThan((high - low) / 4);
      }),
    );
  });
});

describe('onePeriod', () => {
  it('stretches the first beat to the whole width and ends where it began', () => {
    const beat = onePeriod(idealStrip(0.3, 1).capacitor);
    expect(beat[0]?.[0]).toBe(0);
    expect(beat.at(-1)?.[0]).toBeCloseTo(1, 10);
    expect(beat.at(-1)?.[1]).toBeCloseTo(beat[0]![1], 8);
  });
});

describe('heightAt', () => {
  it('reads straight between two points', () => {
    expect(
      heightAt(
        [
          [0, 0],
          [1, 2],
        ],
        0.25,
      ),
    ).toBeCloseTo(0.5);
  });
});
