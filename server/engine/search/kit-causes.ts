import { aimFrame } from './aim.ts';
import type { Candidate } from './candidate.ts';
import { rangeOf } from './density.ts';
import {
  conditionShifts,
  frameEffects,
  timingCoefficient,
  timingSensitivity,
  type Cause,
  type ConditionShift,
  type KitEffect,
} from './kit-effects.ts';
import { logDrift } from './head-corners.ts';
import { timingSpread } from './kit-yield.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import type { SearchBrief } from './shelf.ts';
import { steeredEffects, steeredShifts } from './steered-band.ts';
import { settingError } from './trimmed.ts';
import { tunedClassOf, tunedGrid } from './tuned-grid.ts';

export type SpreadCause = Cause | 'temperature' | 'supply';

/** How far one cause alone moves the rate, half from end to end, as a fraction. */
export interface CauseWidth {
  cause: SpreadCause;
  fraction: number;
}

/**
 * What makes a pack's kits differ and a kit wander, each cause alone, widest first. The sum exceeds
 * the guaranteed band's half a little, since not all causes pull the same way at once.
 */
export function spreadCauses(
  candidate: Candidate,
  brief: SearchBrief,
  shelf: PreparedShelf,
): CauseWidth[] {
  const { effects, shifts, timing } = causesOf(candidate, brief, shelf);
  const widths = new Map<SpreadCause, number>([
    ['timing', timing],
    ['temperature', widthOver(shifts, (a, b) => a.volts === b.volts)],
    ['supply', widthOver(shifts, (a, b) => a.celsius === b.celsius)],
  ]);
  for (const { cause, effect } of effects) {
    const [low, high] = rangeOf(effect);
    widths.set(cause, (widths.get(cause) ?? 0) + (high - low) / 2);
  }
  return [...widths]
    .map(([cause, fraction]): CauseWidth => ({ cause, fraction }))
    .filter(({ fraction }) => fraction > 1e-6)
    .sort((a, b) => b.fraction - a.fraction);
}

interface Causes {
  effects: readonly KitEffect[];
  shifts: readonly ConditionShift[];
  timing: number;
}

function causesOf(candidate: Candidate, brief: SearchBrief, shelf: PreparedShelf): Causes {
  const { frame, timing } = candidate;
  if (timing.kind === 'steered') {
    const own = { ...candidate, timing };
    return { effects: steeredEffects(own, brief), shifts: steeredShifts(own, brief), timing: 0 };
  }
  const power = -timingSensitivity(frame, timing.ohms);
  const plain = conditionShifts(frame, timing.ohms, brief);
  if (timing.kind === 'trimmed') {
    const spread = frame.capacitor.temperatureSpread;
    return {
      effects: [
        { cause: 'capacitor', effect: { kind: 'uniform', low: -spread, middle: 0, high: spread } },
      ],
      shifts: drifting(plain, timing.fixed.temperatureCoefficientPerKelvin, power),
      timing: settingError(timing.ohms, timing.trimmer),
    };
  }
  const effects = frameEffects(frame, aimFrame(frame, brief).ohms, brief);
  const shifts = drifting(plain, timingCoefficient(timing), power);
  const grid =
    brief.care === 'bench-tuned' ? tunedGrid(frame, tunedClassOf(timing), brief, shelf) : null;
  const [first, second] = timingSpread(timing, 0).halves;
  const width = grid === null ? power * (first + second) : power * grid.tolerance + grid.halfGap;
  return { effects, shifts, timing: width };
}

function drifting(
  shifts: readonly ConditionShift[],
  coefficientPerKelvin: number,
  power: number,
): ConditionShift[] {
  return shifts.map((each) => ({
    ...each,
    shift: each.shift - power * logDrift(coefficientPerKelvin, each.celsius),
  }));
}

/** Half the most that two conditions alike in one respect differ by. */
function widthOver(
  shifts: readonly ConditionShift[],
  alike: (a: ConditionShift, b: ConditionShift) => boolean,
): number {
  let widest = 0;
  for (const a of shifts) {
    for (const b of shifts) if (alike(a, b)) widest = Math.max(widest, a.shift - b.shift);
  }
  return widest / 2;
}
