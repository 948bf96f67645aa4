import type { Candidate, SteeredTimingParts } from './candidate.ts';
import type { UniformEffect } from './density.ts';
import type { GuaranteedBand } from './guaranteed-band.ts';
import {
  atCorner,
  capacitanceAt,
  comparatorCorners,
  extremeCelsius,
  passiveCorner,
  type Corner,
} from './head-corners.ts';
import type { Head, HeadCorner } from './heads.ts';
import {
  conditionsOf,
  delaysAt,
  stopped,
  warmThresholds,
  type ConditionShift,
  type KitEffect,
} from './kit-effects.ts';
import { limits } from './rules.ts';
import type { SearchBrief, StockedResistor } from './shelf.ts';
import { steeredCycle, steeredValues, type SteeredValues } from './steered.ts';

type SteeredCandidate = Candidate<SteeredTimingParts>;

/**
 * The guaranteed band of a steered pack. As for a single timing resistor, with the diodes' saturation
 * current between half and twice the catalogue's; less of it slows every kit, so it stands at the
 * corner's own end. Corners are worked out without bias and leakage, in closed form; what those do to
 * the nominal kit, at the most bias of either sign, is put on top, which misses up to 5e-4 of the rate
 * where they do much.
 */
export function steeredBand(candidate: SteeredCandidate, brief: SearchBrief): GuaranteedBand {
  const { frame, timing } = candidate;
  const band = { minHz: Number.POSITIVE_INFINITY, maxHz: 0 };
  for (const corner of ['slow', 'fast'] as Corner[]) {
    const slow = corner === 'slow';
    const sign = slow ? 1 : -1;
    for (const celsius of extremeCelsius(brief)) {
      const values: SteeredValues = {
        chargeOhms: atCorner(timing.charge.ohms, timing.charge, sign, celsius),
        dischargeOhms: atCorner(timing.discharge.ohms, timing.discharge, sign, celsius),
        farads: capacitanceAt(frame.capacitor, corner, celsius),
        celsius,
        saturationAmps: timing.diode.saturationAmps * limits.saturationFactor ** -sign,
        drained: false,
      };
      const passive = passiveCorner(frame.head, corner, celsius);
      for (const kit of cornerKits(frame.head, brief)) {
        const all = { ...passive, ...kit };
        const hertz = steeredCycle(frame, timing.diode, values, brief, all)?.frequencyHz ?? 0;
        if (slow) band.minHz = Math.min(band.minHz, hertz);
        else band.maxHz = Math.max(band.maxHz, hertz);
      }
    }
  }
  const { least, most } = drainFactors(candidate, brief);
  return { minHz: band.minHz * least, maxHz: band.maxHz * most };
}

/** The comparator's corners; without bias both its signs are the same. */
function cornerKits(head: Head, brief: SearchBrief): HeadCorner[] {
  const seen = new Set<string>();
  return comparatorCorners(head, brief).filter((kit) => {
    const { supplyVolts, outputFactor, offsetVolts, forwardVolts } = kit;
    const key = `${supplyVolts} ${outputFactor} ${offsetVolts} ${forwardVolts}`;
    const isNew = !seen.has(key);
    seen.add(key);
    return isNew;
  });
}

/** What bias and leakage multiply the nominal rate by, at the least and the most. */
function drainFactors(
  { frame, timing }: SteeredCandidate,
  brief: SearchBrief,
): { least: number; most: number } {
  const values = steeredValues(timing, frame);
  const dry = steeredCycle(frame, timing.diode, { ...values, drained: false }, brief);
  const factors = [-1, 1].map((sign) => {
    const biasAmps = sign * frame.head.comparator.maxInputBiasAmps;
    const wet = steeredCycle(frame, timing.diode, values, brief, { biasAmps });
    return (wet?.frequencyHz ?? 0) / (dry?.frequencyHz ?? 1);
  });
  return { least: Math.min(1, ...factors), most: Math.max(1, ...factors) };
}

/** What makes the kits of a steered pack differ, as `frameEffects` and `timingEffects` together. */
export function steeredEffects(candidate: SteeredCandidate, brief: SearchBrief): KitEffect[] {
  const { frame, timing } = candidate;
  const nominal = { ...steeredValues(timing, frame), drained: false };
  const { comparator: part, thresholds } = frame.head;
  const dryHz = steeredCycle(frame, timing.diode, nominal, brief)?.frequencyHz ?? NaN;
  const logAt = (values: Partial<SteeredValues>, corner: HeadCorner = {}) => {
    const cycle = steeredCycle(frame, timing.diode, { ...nominal, ...values }, brief, corner);
    return cycle === null ? stopped : Math.log(cycle.frequencyHz / dryHz);
  };
  const along = (at: (u: number) => number): UniformEffect => ({
    kind: 'uniform',
    low: at(-1),
    middle: at(0),
    high: at(1),
  });
  const within = (value: number, tolerance: number) => (u: number) => value * (1 + u * tolerance);
  const threshold = (name: 'r1Ohms' | 'r2Ohms' | 'r3Ohms', { ohms, tolerance }: StockedResistor) =>
    along((u) => logAt({}, { [name]: within(ohms, tolerance)(u) }));
  const timed = (name: 'chargeOhms' | 'dischargeOhms', { ohms, tolerance }: StockedResistor) =>
    along((u) => logAt({ [name]: within(ohms, tolerance)(u) }));
  const { capacitor } = frame;
  const capacity = (tolerance: number) =>
    along((u) => logAt({ farads: within(capacitor.farads, tolerance)(u) }));
  const effects: [KitEffect['cause'], UniformEffect][] = [
    ['thresholds', threshold('r1Ohms', thresholds.r1)],
    ['thresholds', threshold('r2Ohms', thresholds.r2)],
    ['thresholds', threshold('r3Ohms', thresholds.r3)],
    ['timing', timed('chargeOhms', timing.charge)],
    ['timing', timed('dischargeOhms', timing.discharge)],
    ['capacitor', capacity(capacitor.tolerance)],
    ['capacitor', capacity(capacitor.temperatureSpread)],
    [
      'stray',
      along((u) => logAt({ farads: capacitor.farads + (limits.strayFarads * (1 + u)) / 2 })),
    ],
    [
      'timing',
      along((u) =>
        logAt({ saturationAmps: nominal.saturationAmps * limits.saturationFactor ** u }),
      ),
    ],
    ['comparator', along((u) => logAt({}, { offsetVolts: u * part.maxOffsetVolts }))],
    ['comparator', along((u) => biased(candidate, u * part.maxInputBiasAmps, brief))],
    ['comparator', along((u) => logAt({}, { outputFactor: 1.25 + 0.75 * u }))],
    ['comparator', along((u) => logAt({}, delaysAt(frame.head, u)))],
  ];
  return effects.map(([cause, effect]) => ({ cause, effect }));
}

/** ln of the rate with another input bias over that with the typical one. */
function biased(
  { frame, timing, frequencyHz }: SteeredCandidate,
  biasAmps: number,
  brief: SearchBrief,
) {
  const values = steeredValues(timing, frame);
  const cycle = steeredCycle(frame, timing.diode, values, brief, { biasAmps });
  return cycle === null ? stopped : Math.log(cycle.frequencyHz / frequencyHz);
}

/** As `conditionShifts`, with the drift of the steering resistors and the diodes in it. */
export function steeredShifts(candidate: SteeredCandidate, brief: SearchBrief): ConditionShift[] {
  const { frame, timing } = candidate;
  const nominal = { ...steeredValues(timing, frame), drained: false };
  const dryHz = steeredCycle(frame, timing.diode, nominal, brief)?.frequencyHz ?? NaN;
  const { capacitor } = frame;
  const warm = (part: StockedResistor, celsius: number) => atCorner(part.ohms, part, 0, celsius);
  return conditionsOf(brief).map(({ volts, celsius }) => {
    const values = {
      ...nominal,
      chargeOhms: warm(timing.charge, celsius),
      dischargeOhms: warm(timing.discharge, celsius),
      farads: atCorner(capacitor.farads, capacitor, 0, celsius),
      celsius,
    };
    const corner = { supplyVolts: volts, ...warmThresholds(frame.head, celsius) };
    const cycle = steeredCycle(frame, timing.diode, values, brief, corner);
    const shift = cycle === null ? Number.NEGATIVE_INFINITY : Math.log(cycle.frequencyHz / dryHz);
    return { volts, celsius, shift };
  });
}
