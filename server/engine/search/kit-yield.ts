import { aimFrame, type Frame } from './aim.ts';
import type { Candidate, SteeredTimingParts, TrimmedTimingParts } from './candidate.ts';
import {
  densityOfSum,
  distributionWith,
  distributionWithPart,
  integrals,
  rangeOf,
  type Effect,
  type Integrals,
} from './density.ts';
import { isWithin, type GuaranteedBand } from './guaranteed-band.ts';
import {
  conditionShifts,
  delayedHeads,
  delayThirds,
  frameEffects,
  frameMoves,
  shiftRange,
  timingCoefficient,
  timingSensitivity,
  timingShares,
  type ConditionShift,
  type FrameMoves,
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

/**
 * Standard error of the method, as a share: against a hundred thousand kits by the full model most
 * packs are within 1e-3, the worst seen, with a wide R4 on much input bias, was off by 5e-3.
 */
const methodError = 2e-3;

/** How the kits of a frame differ before its timing parts are chosen; see `frameEffects`. */
export interface FrameSpread {
  /** Distributions of all effects together in ln of the rate, to be averaged. */
  parts: readonly SpreadPart[];
  /** d ln f / d ln R4 of the nominal circuit. */
  sensitivity: number;
  shifts: readonly ConditionShift[];
}

interface SpreadPart {
  weight: number;
  of: Integrals;
  sensitivity: number;
}

/** Delays that move the rate by less than this do not change what the other causes weigh. */
const smallDelay = 0.004;

/**
 * The spread of a frame at about the timing resistance that meets the target. Where the comparator's
 * delays count, the other causes weigh less the longer they are, so each third of their range is
 * taken by itself. `moves` are the frame's `frameMoves` there, worked out when left out.
 */
export function frameSpread(
  frame: Frame,
  idealOhms: number,
  brief: SearchBrief,
  moves: FrameMoves = frameMoves(frame, idealOhms, brief),
): FrameSpread {
  const { effects: all, sensitivity, shifts } = moves;
  const delay = all.find(({ isDelay }) => isDelay);
  const [least, most] = delay ? rangeOf(delay.effect) : [0, 0];
  if (most - least < smallDelay) {
    const of = integrals(densityOfSum(all.map(({ effect }) => effect)));
    return { parts: [{ weight: 1, of, sensitivity }], sensitivity, shifts };
  }
  const parts = delayedHeads(frame.head, brief).map((head, k): SpreadPart => {
    const own = { ...frame, head };
    const effects = frameEffects(own, idealOhms, brief)
      .filter(({ isDelay }) => !isDelay)
      .map(({ effect }) => effect);
    const third = partOf(delay!.effect, delayThirds[k]! - 1 / 3, delayThirds[k]! + 1 / 3);
    return {
      weight: 1 / delayThirds.length,
      of: integrals(densityOfSum([...effects, third])),
      sensitivity: timingSensitivity(own, idealOhms),
    };
  });
  return { parts, sensitivity, shifts };
}

/** The part of an effect between two values of its u, as an effect of its own. */
function partOf(effect: Effect, from: number, to: number): Effect {
  if (effect.kind === 'points') return effect;
  const slope = (effect.high - effect.low) / 2;
  const bend = (effect.high + effect.low) / 2 - effect.middle;
  const at = (u: number) => effect.middle + slope * u + bend * u * u;
  return { kind: 'uniform', low: at(from), middle: at((from + to) / 2), high: at(to) };
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
  { parts, sensitivity, shifts }: FrameSpread,
  { offset, halves, coefficientPerKelvin }: TimingSpread,
  brief: SearchBrief,
): number {
  const { up, down } = shiftRange(shifts, coefficientPerKelvin, sensitivity);
  const upper = Math.log(1 + brief.band) - up - offset;
  const lower = Math.log(1 - brief.band) - down - offset;
  if (!(upper > lower)) return 0;
  return shareBetween(parts, lower, upper, halves);
}

/** A tolerance from which it counts that ln(1 + t·u) is not quite uniform. */
const skewedFrom = 0.02;

/** What a wide part's skew adds to a distribution that takes it as uniform. */
function skewOf(of: Integrals, value: number, tolerance: number, power: number): number {
  const uniform = distributionWith(of, value - (power * tolerance ** 2) / 6, power * tolerance, 0);
  return distributionWithPart(of, value, tolerance, power) - uniform;
}

/** Share of a spread's kits between two values of ln of the rate, with timing parts of these halves. */
export function shareBetween(
  parts: readonly SpreadPart[],
  lower: number,
  upper: number,
  [first, second]: readonly [number, number],
): number {
  let share = 0;
  for (const { weight, of, sensitivity } of parts) {
    // ln(1 + t·u) lies t²/6 below zero in the mean.
    const mean = -(sensitivity * (first ** 2 + second ** 2)) / 6;
    const [a, b] = [-sensitivity * first, -sensitivity * second];
    const wider = Math.max(first, second);
    const below = (value: number) => {
      const plain = distributionWith(of, value - mean, a, b);
      return wider < skewedFrom ? plain : plain + skewOf(of, value, wider, -sensitivity);
    };
    share += weight * (below(upper) - below(lower));
  }
  return Math.min(1, Math.max(0, share));
}

/**
 * Share of kits that stay within ± band of the target over the whole ambient range and from the
 * lowest to the highest supply: the distribution of the sum of all effects between the band's limits
 * less what the conditions add. Effects count as independent and as adding up in ln of the rate,
 * which holds to about 2e-3 of the share (`npm run bench` shows it against the full model). Exactly 1 where
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
  const parts = [{ weight: 1, of, sensitivity: -1 }];
  return shareWithin({ parts, sensitivity: -1, shifts }, none, brief);
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
  const sensitivity = timingSensitivity(frame, ohms);
  const spread = {
    parts: [{ weight: 1, of: integrals(densityOfSum(effects)), sensitivity }],
    sensitivity,
    shifts: conditionShifts(frame, ohms, brief),
  };
  return shareWithin(spread, { offset: 0, halves: [0, 0], coefficientPerKelvin }, brief);
}
