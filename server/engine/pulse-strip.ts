import type { Circuit } from './circuit.ts';
import type { Cycle } from './cycle.ts';
import { sampleWaveform, type Point } from './waveform.ts';

/**
 * Two settled periods from a rising output edge in a unit box: x 0…1 in time, y 0…1 with 1 at the
 * supply. `thresholds` are the lower and the upper, as y.
 */
export interface PulseStrip {
  output: Point[];
  capacitor: Point[];
  thresholds: [low: number, high: number];
  periodSeconds: number;
  duty: number;
}

const periods = 2;
/** 2 periods × 2 states × 14 intervals and the first point: 57 points of the capacitor's trace. */
const pointsPerSegment = 14;

/**
 * The pulse strip of a circuit and its own cycle, rounded to three decimals and clipped to the box,
 * so that screen and paper draw the same. Throws a `RangeError` for a circuit that does not
 * oscillate.
 */
export function pulseStrip(circuit: Circuit, cycle: Cycle): PulseStrip {
  const waveform = sampleWaveform(circuit, cycle, { periods, pointsPerSegment });
  const width = periods * cycle.periodSeconds;
  const height = circuit.supplyVolts;
  const inBox = ([seconds, volts]: Point): Point => [
    rounded(seconds / width),
    rounded(volts / height),
  ];
  return {
    output: withoutFlatPoints(waveform.output.map(inBox)),
    capacitor: waveform.capacitor.map(inBox),
    thresholds: [
      rounded(cycle.thresholdLowVolts / height),
      rounded(cycle.thresholdHighVolts / height),
    ],
    periodSeconds: cycle.periodSeconds,
    duty: cycle.duty,
  };
}

function rounded(share: number): number {
  return Math.round(1000 * Math.min(Math.max(share, 0), 1)) / 1000;
}

/** Drops points in the middle of a level stretch; they draw nothing. */
function withoutFlatPoints(points: Point[]): Point[] {
  return points.filter(([, y], index) => {
    const before = points[index - 1];
    const after = points[index + 1];
    return !before || !after || before[1] !== y || after[1] !== y;
  });
}
