import { periodWith, type PreparedSingle } from '../prepared-single.ts';
import { aimFrame, insulationSiemens, type Frame } from './aim.ts';
import type { Candidate, TrimmedTimingParts } from './candidate.ts';
import type { GuaranteedBand } from './guaranteed-band.ts';
import {
  capacitanceAt,
  drift,
  extremeCelsius,
  extremeRate,
  headCorners,
  passiveCorner,
  comparatorCorners,
  type Corner,
} from './head-corners.ts';
import { cornerReducer, type Head } from './heads.ts';
import { keptWith } from './kept-with.ts';
import { conditionsOf } from './kit-effects.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { limits } from './rules.ts';
import { holdsMore } from './demand.ts';
import type { SearchBrief, StockedResistor, StockedTrimmer } from './shelf.ts';

/**
 * The pack of a frame with a trimmer: the largest stocked resistor that is not too much at any
 * corner, and the smallest stocked trimmer that with it reaches the target at every corner of
 * tolerance, temperature and supply. Null when the shelf has no such two.
 */
export function trimmedPack(
  frame: Frame,
  brief: SearchBrief,
  shelf: PreparedShelf,
): Candidate<TrimmedTimingParts> | null {
  const range = neededOhms(frame, brief);
  if (range === null) return null;
  const fixed = largestFixed(shelf, frame, brief, range.least);
  if (fixed === null) return null;
  const reach = range.most - extremesOf(fixed, brief).least;
  const trimmer = smallestTrimmer(shelf.shelf.trimmers, brief, reach);
  if (trimmer === null) return null;
  return {
    frame,
    timing: { kind: 'trimmed', ohms: range.nominal, fixed, trimmer },
    frequencyHz: brief.targetHz,
    distance: 0,
    priceMinor:
      frame.head.priceMinor + frame.capacitor.priceMinor + fixed.priceMinor + trimmer.priceMinor,
  };
}

/** Timing resistances in ohms that the target needs at the slowest corner, nominally, and at the fastest. */
function neededOhms(
  frame: Frame,
  brief: SearchBrief,
): { least: number; nominal: number; most: number } | null {
  const { ohms, reaches } = aimFrame(frame, brief);
  if (!reaches) return null;
  const least = cornerOhms(frame, brief, 'slow', ohms);
  const most = cornerOhms(frame, brief, 'fast', ohms);
  if (least === null || most === null || least < frame.head.minTimingOhms) return null;
  return most <= limits.maxTimingOhms ? { least, nominal: ohms, most } : null;
}

const fixedPointSteps = 6;

/** Where the slowest (or fastest) kit meets the target; the rate is nearly 1/R, so steps converge fast. */
function cornerOhms(
  { head, capacitor }: Frame,
  brief: SearchBrief,
  corner: Corner,
  startOhms: number,
): number | null {
  const corners = headCorners(head, brief);
  let ohms = startOhms;
  for (let step = 0; step < fixedPointSteps; step += 1) {
    const rates = corners.celsius.map((celsius, t) =>
      extremeRate(corners, corner, t, ohms, capacitanceAt(capacitor, corner, celsius), capacitor),
    );
    const rate = corner === 'slow' ? Math.min(...rates) : Math.max(...rates);
    if (!(rate > 0)) return null;
    ohms *= rate / brief.targetHz;
    if (Math.abs(rate / brief.targetHz - 1) < 1e-9) break;
  }
  return ohms;
}

function largestFixed(
  { values }: PreparedShelf,
  frame: Frame,
  brief: SearchBrief,
  leastOhms: number,
): StockedResistor | null {
  for (let k = values.ohms.length - 1; k >= 0; k -= 1) {
    if (values.ohms[k]! < limits.minTimingOhms) break;
    const suiting = values.parts[k]!.find(
      (part) =>
        part.tolerance <= limits.thresholdTolerance * (1 + 1e-9) &&
        holdsMore(part, 1, frame.head.demand, brief.quantity) &&
        extremesOf(part, brief).most <= leastOhms,
    );
    if (suiting) return suiting;
  }
  return null;
}

/** Least and most that a part may have over its tolerance and the ambient range, in ohms. */
function extremesOf(
  part: StockedResistor | StockedTrimmer,
  brief: SearchBrief,
): { least: number; most: number } {
  const drifts = extremeCelsius(brief).map((celsius) =>
    drift(part.temperatureCoefficientPerKelvin, celsius),
  );
  return {
    least: part.ohms * (1 - part.tolerance) * Math.min(...drifts),
    most: part.ohms * (1 + part.tolerance) * Math.max(...drifts),
  };
}

function smallestTrimmer(
  trimmers: readonly StockedTrimmer[],
  brief: SearchBrief,
  reachOhms: number,
): StockedTrimmer | null {
  const suiting = trimmers.filter(
    (part) => part.available >= brief.quantity && extremesOf(part, brief).least >= reachOhms,
  );
  return suiting.reduce<StockedTrimmer | null>(
    (best, part) =>
      best === null ||
      part.ohms < best.ohms ||
      (part.ohms === best.ohms && (part.priceMinor - best.priceMinor || part.id - best.id) < 0)
        ? part
        : best,
    null,
  );
}

/** A head as one kit may have it, where it is set and at every condition of use. */
interface SetHead {
  atSetting: PreparedSingle;
  conditions: readonly { celsius: number; prepared: PreparedSingle }[];
}

/** For each extreme kit, the head at 25 °C and the nominal supply, and at the ends of both. */
const setHeads = keptWith((head: Head, brief: SearchBrief): readonly SetHead[] => {
  const reduce = cornerReducer(head, brief);
  const kits = comparatorCorners(head, brief).filter(
    (kit) => kit.supplyVolts === brief.minSupplyVolts,
  );
  return (['slow', 'fast'] as Corner[]).flatMap((corner) =>
    kits.map((kit): SetHead => {
      const at = (celsius: number, supplyVolts: number) =>
        reduce({ ...passiveCorner(head, corner, celsius), ...kit, supplyVolts });
      return {
        atSetting: at(25, brief.supplyVolts),
        conditions: conditionsOf(brief).map(({ celsius, volts }) => ({
          celsius,
          prepared: at(celsius, volts),
        })),
      };
    }),
  );
});

/** How far off a maker leaves a trimmed kit at most, as a fraction of the rate. */
export function settingError(ohms: number, trimmer: StockedTrimmer): number {
  return (limits.trimmerSetting * trimmer.ohms) / ohms;
}

/**
 * The band of a trimmed kit, set to the target at about 25 °C and the nominal supply: how well a
 * trimmer can be set (half a percent of its track), then drift of resistor, trimmer and capacitor by
 * their signed coefficients, what the dielectric changes beyond, and the supply, for every extreme
 * comparator and threshold set. Neglects how offset and bias change with temperature.
 */
export function trimmedBand(
  { head, capacitor }: Frame,
  timing: TrimmedTimingParts,
  brief: SearchBrief,
): GuaranteedBand {
  const band = { minHz: Number.POSITIVE_INFINITY, maxHz: 0 };
  const leakage = insulationSiemens(capacitor);
  const period = (prepared: PreparedSingle, ohms: number, farads: number) =>
    periodWith(prepared, ohms, farads, leakage, capacitor.leakageAmps);
  for (const { atSetting, conditions } of setHeads(head, brief)) {
    // The more a kit's capacitor has, the less is left for the trimmer, and the coarser it sets.
    for (const sign of [-1, 1]) {
      const own = capacitor.farads * (1 + sign * capacitor.tolerance);
      let ohms = timing.ohms / (1 + sign * capacitor.tolerance);
      for (let step = 0; step < 4; step += 1) ohms /= period(atSetting, ohms, own) * brief.targetHz;
      const setting = settingError(ohms, timing.trimmer);
      const trimmed = Math.max(0, ohms - timing.fixed.ohms);
      for (const { celsius, prepared } of conditions) {
        const warm =
          (ohms - trimmed) * drift(timing.fixed.temperatureCoefficientPerKelvin, celsius) +
          trimmed * drift(timing.trimmer.temperatureCoefficientPerKelvin, celsius);
        const farads = own * drift(capacitor.temperatureCoefficientPerKelvin, celsius);
        for (const spread of [-capacitor.temperatureSpread, capacitor.temperatureSpread]) {
          const hertz = 1 / period(prepared, warm, farads * (1 + spread));
          band.minHz = Math.min(band.minHz, hertz > 0 ? hertz * (1 - setting) : 0);
          band.maxHz = Math.max(band.maxHz, hertz > 0 ? hertz / (1 - setting) : 0);
        }
      }
    }
  }
  return band;
}
