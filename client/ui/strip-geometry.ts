import type { PulseStripData } from '../../server/contracts/drawing.ts';

type Point = readonly [number, number];

/** An SVG path through points of the unit box, drawn into a box of the given size (y up → y down). */
export function pathIn(points: readonly Point[], width: number, height: number, inset = 0): string {
  return points
    .map(([x, y], index) => {
      const px = (x * width).toFixed(2);
      const py = (inset + (1 - y) * (height - 2 * inset)).toFixed(2);
      return `${index === 0 ? 'M' : 'L'}${px} ${py}`;
    })
    .join('');
}

/** The first of the two periods, stretched to x 0…1. */
export function onePeriod(points: readonly Point[]): Point[] {
  const inside = points.filter(([x]) => x <= 0.5).map(([x, y]): Point => [x * 2, y]);
  const last = inside.at(-1);
  if (last !== undefined && last[0] < 1) {
    const next = points.find(([x]) => x > 0.5);
    if (next !== undefined) {
      const before = points.filter(([x]) => x <= 0.5).at(-1) ?? next;
      const share = (0.5 - before[0]) / (next[0] - before[0] || 1);
      inside.push([1, before[1] + (next[1] - before[1]) * share]);
    }
  }
  return inside;
}

/** The height of a trace at x, straight between its points. */
export function heightAt(points: readonly Point[], x: number): number {
  let before = points[0] ?? [0, 0];
  for (const point of points) {
    if (point[0] >= x) {
      const span = point[0] - before[0];
      return span <= 0 ? point[1] : before[1] + ((point[1] - before[1]) * (x - before[0])) / span;
    }
    before = point;
  }
  return before[1];
}

/**
 * The strip of an ideal circuit with this duty, drawn while no pack has been found yet: rail-to-rail
 * output, period 1.386 R4·C1, thresholds set so that charging takes the duty's share of the beat.
 */
export function idealStrip(duty: number, periodSeconds: number): PulseStripData {
  const charge = Math.exp(duty * Math.LN2 * 2);
  const low = (charge - 1) / 3;
  const high = low * Math.exp((1 - duty) * Math.LN2 * 2);
  const steps = 24;
  const capacitor: [number, number][] = [];
  const output: [number, number][] = [];
  for (const start of [0, 0.5]) {
    const turn = start + duty / 2;
    output.push([start, 1], [turn, 1], [turn, 0], [start + 0.5, 0]);
    for (let step = 0; step <= steps; step += 1) {
      const decay = Math.exp((-Math.LN2 * 2 * duty * step) / steps);
      capacitor.push([start + (duty / 2) * (step / steps), 1 - (1 - low) * decay]);
    }
    for (let step = 1; step <= steps; step += 1) {
      const decay = Math.exp((-Math.LN2 * 2 * (1 - duty) * step) / steps);
      capacitor.push([turn + ((1 - duty) / 2) * (step / steps), high * decay]);
    }
    if (start === 0) output.push([0.5, 1]);
  }
  return { output, capacitor, thresholds: [low, high], periodSeconds, duty };
}
