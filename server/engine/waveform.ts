import type { Circuit } from './circuit.ts';
import { solveCircuit, type Cycle } from './cycle.ts';
import type { StateBranch } from './state-branch.ts';

export type Point = [x: number, y: number];

export interface WaveformOptions {
  /** Whole cycles to draw, at least 1. */
  periods: number;
  /** Intervals a state is cut into, at least 1; each state gives one point more. */
  pointsPerSegment: number;
  /** From power-up with an empty capacitor instead of from a rising output edge. */
  fromStart?: boolean;
}

/**
 * Output and capacitor voltage against seconds, both ascending in time. The output has two points
 * at every edge, one on each side of it; the capacitor has one.
 */
export interface Waveform {
  output: Point[];
  capacitor: Point[];
  thresholdLowVolts: number;
  thresholdHighVolts: number;
}

interface Segment {
  branch: StateBranch;
  startVolts: number;
  seconds: number;
}

/**
 * Samples the solved circuit's waveforms: exact at every point, delays and overshoot included; the
 * output moves within a state when its resistance lets it. `cycle` is that circuit's own. Throws a
 * `RangeError` for a circuit that does not oscillate, or counts under 1. Neglects rise and fall
 * times.
 */
export function sampleWaveform(circuit: Circuit, cycle: Cycle, options: WaveformOptions): Waveform {
  const { periods, pointsPerSegment, fromStart = false } = options;
  if (!(periods >= 1 && pointsPerSegment >= 1 && Number.isFinite(periods * pointsPerSegment))) {
    throw new RangeError('A waveform needs at least one period and one point a segment.');
  }
  const output: Point[] = [];
  const capacitor: Point[] = [];
  let start = 0;
  for (const segment of segmentsOf(circuit, cycle, Math.floor(periods), fromStart)) {
    for (let k = 0; k <= pointsPerSegment; k++) {
      const elapsed = (segment.seconds * k) / pointsPerSegment;
      const volts = segment.branch.voltsAfter(segment.startVolts, elapsed);
      output.push([start + elapsed, segment.branch.outputVoltsAt(volts)]);
      if (k > 0 || start === 0) capacitor.push([start + elapsed, volts]);
    }
    start += segment.seconds;
  }
  const { thresholdLowVolts, thresholdHighVolts } = cycle;
  return { output, capacitor, thresholdLowVolts, thresholdHighVolts };
}

function segmentsOf(
  circuit: Circuit,
  cycle: Cycle,
  periods: number,
  fromStart: boolean,
): Segment[] {
  const solved = solveCircuit(circuit);
  if (solved.kind === 'no-oscillation') throw new RangeError(solved.reason);
  const { high, low } = solved;
  const rise = { branch: high, startVolts: cycle.valleyVolts, seconds: cycle.highSeconds };
  const fall = { branch: low, startVolts: cycle.peakVolts, seconds: cycle.lowSeconds };
  const first = { branch: high, startVolts: 0, seconds: cycle.firstHighSeconds };
  return Array.from({ length: periods }, (_, index) => [
    index === 0 && fromStart ? first : rise,
    fall,
  ]).flat();
}
