import { aimFrame, type Frame } from './aim.ts';
import type { Candidate, SteeredTimingParts, TrimmedTimingParts } from './candidate.ts';
import {
  densityOfSum,
  distributionWith,
  integrals,
  type Effect,
  type Integrals,
} from './density.ts';
import { isWithin, type GuaranteedBand } from './guaranteed-band.ts';
import {
  conditionShifts,
  frameEffects,
  shiftRange,
  timingCoefficient,
  timingSensitivity,
  timingShares,
  type ConditionShift,
} from './kit-effects.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import type { SearchBrief } from './shelf.ts';
import { steeredEffects, steeredShifts } from './steered-band.ts';
import type { SingleTimingParts } from './timing-choice.ts';
import { settingError } from './trimmed.ts';
import { tunedClassOf, tunedGrid } from './tuned-grid.ts';

/** Share of kits inside the asked band, and how well it is known. */
export interface KitYield {
  yieldWithinBand: number;
  /** Of the method: 0 where the guaranteed band settles it. */
  yieldStandardError: number;
}

/** Largest difference seen against a hundred thousand kits by the full model, as a share. */
const methodError = 1e-3;

/** How the kits of a frame differ before its timing parts are chosen; see `frameEffects`. */
export interface FrameSpread {
  /** Distribution of all effects together, in ln of the rate. */
  of: Integrals;
  sensitivity: number;
  shifts: readonly ConditionShift[];
}

/**
 * The spread of a frame at about the timing resistance that meets the target; `effects` are its
 * `frameEffects` there, worked out when left out.
 */
export function frameSpread(
  frame: Frame,
  idealOhms: number,
  brief: SearchBrief,
  effects: readonly Effect[] = frameEffects(frame, idealOhms, brief).map(({ effect }) => effect),
): FrameSpread {
  return {
    of: integrals(densityOfSum(effects)),
    sensitivity: timingSensitivity(frame, idealOhms),
    shifts: conditionShifts(frame, idealOhms, brief),
  };
}

/** What timing parts add to a frame's spread. */
export interface TimingSpread {
  /** ln of the middle kit's rate over the target. */
  offset: number;
  /** Half-widths of up to two uniform causes, as fractions of the resistance. */
  halves: readonly [number, number];
  coefficientPerKelvin: number;
}

/** The spread of a single timing resistance, or of two joined. */
export function timingSpread(timing: SingleTimingParts, offset: number): TimingSpread {
  const [a, b] = timingShares(timing);
  return {
    offset,
    halves: [a * timing.first.tolerance, b * (timing.second?.tolerance ?? 0)],
    coefficientPerKelvin: timingCoefficient(timing),
  };
}

/** Share of kits in the band with a frame's and a timing's spread together. */
export function shareWithin(
  { of, sensitivity, shifts }: FrameSpread,
  { offset, halves, coefficientPerKelvin }: TimingSpread,
  brief: SearchBrief,
): number {
  const [first, second] = halves;
  // ln(1 + t·u) lies t²/6 below zero in the mean.
  const middle = offset - (sensitivity * (first ** 2 + second ** 2)) / 6;
  const { up, down } = shiftRange(shifts, coefficientPerKelvin, sensitivity);
  const upper = Math.log(1 + brief.band) - up - middle;
  const lower = Math.log(1 - brief.band) - down - middle;
  if (!(upper > lower)) return 0;
  const [a, b] = [-sensitivity * first, -sensitivity * second];
  const share = distributionWith(of, upper, a, b) - distributionWith(of, lower, a, b);
  return Math.min(1, Math.max(0, share));
}

/**
 * Share of kits that stay within ± band of the target over the whole ambient range and from the
 * lowest to the highest supply: the distribution of the sum of all effects between the band's limits
 * less what the conditions add. Effects count as independent and as adding up in ln of the rate,
 * which holds to 1e-3 of the share (`npm run bench` shows it against the full model). Exactly 1 where
 * the guaranteed band lies inside the asked one, 0 where a kit may stop.
 */
export function kitYield(
  candidate: Candidate,
  brief: SearchBrief,
  shelf: PreparedShelf,
  guaranteed: GuaranteedBand,
): KitYield {
  if (isWithin(guaranteed, brief)) return { yieldWithinBand: 1, yieldStandardError: 0 };
  if (!(guaranteed.minHz > 0)) return { yieldWithinBand: 0, yieldStandardError: 0 };
  return { yieldWithinBand: shareOf(candidate, brief, shelf), yieldStandardError: methodError };
}

function shareOf(candidate: Candidate, brief: SearchBrief, shelf: PreparedShelf): number {
  const { frame, timing, frequencyHz } = candidate;
  if (timing.kind === 'trimmed') return trimmedShare(frame, timing, brief);
  const offset = Math.log(frequencyHz / brief.targetHz);
  if (timing.kind === 'steered') return steeredShare({ ...candidate, timing }, offset, brief);
  const ideal = aimFrame(frame, brief).ohms;
  const spread = frameSpread(frame, ideal, brief);
  const grid =
    brief.care === 'bench-tuned' ? tunedGrid(frame, tunedClassOf(timing), brief, shelf) : null;
  if (grid === null) return shareWithin(spread, timingSpread(timing, offset), brief);
  // A tuned kit is off by what its own place in the grid leaves, not by the nominal pack's.
  const left = Math.sqrt(3) * grid.rmsGap;
  const shares = grid.coefficientsPerKelvin.map((coefficientPerKelvin) =>
    shareWithin(spread, { offset: 0, halves: [grid.tolerance, left], coefficientPerKelvin }, brief),
  );
  return Math.min(...shares);
}

function steeredShare(
  candidate: Candidate<SteeredTimingParts>,
  offset: number,
  brief: SearchBrief,
): number {
  const effects = steeredEffects(candidate, brief).map(({ effect }) => effect);
  const of = integrals(densityOfSum(effects));
  const shifts = steeredShifts(candidate, brief);
  const none = { offset, halves: [0, 0] as const, coefficientPerKelvin: 0 };
  return shareWithin({ of, sensitivity: -1, shifts }, none, brief);
}

const evenly = (half: number): Effect => ({ kind: 'uniform', low: -half, middle: 0, high: half });

/** A trimmed kit differs by its setting and its dielectric; conditions meet every kit alike. */
function trimmedShare(
  frame: Frame,
  { ohms, fixed, trimmer }: TrimmedTimingParts,
  brief: SearchBrief,
): number {
  const share = Math.min(1, fixed.ohms / ohms);
  const coefficientPerKelvin =
    share * fixed.temperatureCoefficientPerKelvin +
    (1 - share) * trimmer.temperatureCoefficientPerKelvin;
  const effects = [evenly(settingError(ohms, trimmer)), evenly(frame.capacitor.temperatureSpread)];
  const spread = {
    of: integrals(densityOfSum(effects)),
    sensitivity: timingSensitivity(frame, ohms),
    shifts: conditionShifts(frame, ohms, brief),
  };
  return shareWithin(spread, { offset: 0, halves: [0, 0], coefficientPerKelvin }, brief);
}
