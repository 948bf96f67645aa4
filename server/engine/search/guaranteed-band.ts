import type { Frame } from './aim.ts';
import type { Candidate } from './candidate.ts';
import { atCorner, capacitanceAt, extremeRate, headCorners, type Corner } from './head-corners.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { joinedOhms } from './resistor-values.ts';
import type { SearchBrief } from './shelf.ts';
import { steeredBand } from './steered-band.ts';
import type { SingleTimingParts } from './timing-choice.ts';
import { trimmedBand } from './trimmed.ts';
import { tunedClassOf, tunedGrid, type TunedGrid } from './tuned-grid.ts';

/** The rates between which every kit of a pack stays. */
export interface GuaranteedBand {
  minHz: number;
  maxHz: number;
}

/**
 * The guaranteed band of a candidate: the slowest and fastest rate over the corners of tolerance,
 * drift over the ambient range by the signed coefficients, supply from empty to fresh, output
 * resistance (half to twice the typical), delay (half the typical to the maximum), bias and offset
 * (none to the maximum, both signs), LED voltage, and up to 5 pF of stray capacitance. Every part
 * stands at its own corner (see `headCorners`), so the bounds are reached, not just estimated.
 * With bench tuning the capacitor is known to the meter's uncertainty and R4 is what the grid of
 * stocked resistances leaves; a trimmer is set on the running kit. A corner that cannot oscillate
 * gives 0 Hz at the slow end. Neglects ageing, dielectric absorption, the scatter of temperature
 * coefficients and of leakage.
 */
export function guaranteedBand(
  candidate: Candidate,
  brief: SearchBrief,
  shelf: PreparedShelf,
): GuaranteedBand {
  const { timing, frame } = candidate;
  if (timing.kind === 'steered') return steeredBand({ ...candidate, timing }, brief);
  if (timing.kind === 'trimmed') return trimmedBand(frame, timing, brief);
  const grid =
    brief.care === 'bench-tuned' ? tunedGrid(frame, tunedClassOf(timing), brief, shelf) : null;
  return grid ? tunedBand(frame, grid, brief) : singleBand(frame, timing, brief);
}

/** Timing resistance at its corner, in ohms; two parts keep their own tolerances and coefficients. */
export function timingAt(
  { first, second, join }: Pick<SingleTimingParts, 'first' | 'second' | 'join'>,
  sign: number,
  celsius: number,
): number {
  const a = atCorner(first.ohms, first, sign, celsius);
  if (second === null) return a;
  return joinedOhms(a, atCorner(second.ohms, second, sign, celsius), join === 'parallel');
}

function singleBand(frame: Frame, timing: SingleTimingParts, brief: SearchBrief): GuaranteedBand {
  return bandOver(frame, brief, (sign, celsius) => [timingAt(timing, sign, celsius)]);
}

/**
 * With the very capacitor measured, its tolerance gives way to the meter's uncertainty, and the
 * resistor comes from the grid: any of its parts, half the widest gap off at most. Bias and leakage
 * weigh more beside the large resistance of a small capacitor, output resistance and strays beside
 * the small one of a large, so the band holds both ends of what the capacitor may read.
 */
function tunedBand(frame: Frame, grid: TunedGrid, brief: SearchBrief): GuaranteedBand {
  const { tolerance } = grid;
  const bands = grid.readings.map(({ farads, ohms }) => {
    const capacitor = { ...frame.capacitor, farads, tolerance: brief.meterUncertainty };
    return bandOver({ ...frame, capacitor }, brief, (sign, celsius) =>
      grid.coefficientsPerKelvin.map((temperatureCoefficientPerKelvin) =>
        atCorner(ohms, { tolerance, temperatureCoefficientPerKelvin }, sign, celsius),
      ),
    );
  });
  return {
    minHz: Math.min(...bands.map((band) => band.minHz)) * Math.exp(-grid.halfGap),
    maxHz: Math.max(...bands.map((band) => band.maxHz)) * Math.exp(grid.halfGap),
  };
}

/** Hull over corners and temperatures; `ohmsAt` gives the resistances that a corner may have. */
function bandOver(
  { head, capacitor }: Frame,
  brief: SearchBrief,
  ohmsAt: (sign: number, celsius: number) => readonly number[],
): GuaranteedBand {
  const corners = headCorners(head, brief);
  const band = { minHz: Number.POSITIVE_INFINITY, maxHz: 0 };
  corners.celsius.forEach((celsius, t) => {
    for (const corner of ['slow', 'fast'] as Corner[]) {
      const farads = capacitanceAt(capacitor, corner, celsius);
      for (const ohms of ohmsAt(corner === 'slow' ? 1 : -1, celsius)) {
        const hertz = extremeRate(corners, corner, t, ohms, farads, capacitor);
        if (corner === 'slow') band.minHz = Math.min(band.minHz, hertz);
        else band.maxHz = Math.max(band.maxHz, hertz);
      }
    }
  });
  return band;
}

/** The worse end of a band, as a fraction away from the target. */
export function worseEnd(band: GuaranteedBand, targetHz: number): number {
  return Math.max(Math.abs(band.maxHz / targetHz - 1), Math.abs(band.minHz / targetHz - 1));
}

/** True when the whole band lies within ± the asked fraction of the target. */
export function isWithin(band: GuaranteedBand, { targetHz, band: asked }: SearchBrief): boolean {
  return band.minHz >= targetHz * (1 - asked) && band.maxHz <= targetHz * (1 + asked);
}
