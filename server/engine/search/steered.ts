import type { Circuit } from '../circuit.ts';
import { analyseCycle, type Cycle } from '../cycle.ts';
import { warmDiode } from '../warm-circuit.ts';
import { circuitCapacitor, type Frame } from './aim.ts';
import type { Candidate, SteeredTimingParts } from './candidate.ts';
import { holdsMore, withOneMore, type ResistorDemand } from './demand.ts';
import { headCircuit, headsFor, type Head, type HeadCorner } from './heads.ts';
import { nearestResistor } from './nearest-resistor.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import { limits } from './rules.ts';
import type { SearchBrief, StockedCapacitor, StockedDiode } from './shelf.ts';
import type { Offers } from './timing-choice.ts';

/** What a steered circuit has besides its head; ohms and farads as they are at `celsius`. */
export interface SteeredValues {
  chargeOhms: number;
  dischargeOhms: number;
  farads: number;
  celsius: number;
  saturationAmps: number;
  /** False to leave bias and leakage out, which makes the cycle a closed form. */
  drained: boolean;
}

/** The nominal values of a steered pack. */
export function steeredValues(
  { charge, discharge, diode }: SteeredTimingParts,
  { capacitor }: Frame,
): SteeredValues {
  return {
    chargeOhms: charge.ohms,
    dischargeOhms: discharge.ohms,
    farads: capacitor.farads,
    celsius: 25,
    saturationAmps: diode.saturationAmps,
    drained: true,
  };
}

/** The circuit of a steered pack, nominal or at a corner of its head. */
export function steeredCircuit(
  { head, capacitor }: Frame,
  diode: StockedDiode,
  values: SteeredValues,
  brief: SearchBrief,
  corner: HeadCorner = {},
): Circuit {
  const base = headCircuit(head, brief, values.drained ? corner : { ...corner, biasAmps: 0 });
  return {
    ...base,
    celsius: values.celsius,
    timing: {
      kind: 'steered',
      chargeOhms: values.chargeOhms,
      dischargeOhms: values.dischargeOhms,
      diode: {
        saturationAmps: values.saturationAmps,
        emissionCoefficient: diode.emissionCoefficient,
        energyGapElectronVolts: diode.energyGapElectronVolts,
        saturationTemperatureExponent: diode.saturationTemperatureExponent,
      },
    },
    capacitor: {
      ...base.capacitor,
      ...(values.drained ? circuitCapacitor(capacitor, values.farads) : { farads: values.farads }),
    },
  };
}

/** Steering resistors stay between these, where diode leakage and output resistance hardly matter. */
const steeredOhms = { least: 2e3, most: 1e6 };
const aimSteps = 24;

/**
 * The steered packs that the rules allow: equal thresholds of the SKU nearest to the ideal, one for
 * each comparator, capacitor and diode. RC is the stocked resistor nearest by ratio to what the asked
 * high time needs, RD to what the asked low time needs, both without bias and leakage, between 2 kΩ
 * and 1 MΩ and above the head's own limit. Rates are those of the full model. Left out are packs whose
 * duty misses the asked one by more than the duty tolerance, and those whose reversed diode could
 * leak too much when hot (`leaksLittle`).
 */
export function steeredPacks(
  shelf: PreparedShelf,
  capacitors: readonly StockedCapacitor[],
  offers: Offers,
  brief: SearchBrief,
): Candidate<SteeredTimingParts>[] {
  if (Math.abs(brief.duty - 0.5) < limits.steeredDutyDistance) return [];
  if (brief.duty < limits.minDuty || brief.duty > limits.maxDuty) return [];
  const diodes = shelf.shelf.diodes.filter((part) => part.available >= 2 * brief.quantity);
  if (diodes.length === 0) return [];
  return firstSets(headsFor(shelf, { ...brief, duty: 0.5 })).flatMap((head) =>
    diodes.flatMap((diode) =>
      capacitors.flatMap((capacitor) => {
        const pack = steeredPack({ head, capacitor }, diode, shelf, offers, brief);
        return pack === null ? [] : [pack];
      }),
    ),
  );
}

/** The reversed diode may take this share of the least drive across the other resistor. */
const leakageShare = 0.02;

/**
 * True when the reversed diode, at the hottest and leakiest, would drop at most a fiftieth of the
 * drive across its own resistor. The model takes its current as the saturation current throughout,
 * which holds only then.
 */
function leaksLittle(
  { charge, discharge, diode }: SteeredTimingParts,
  brief: SearchBrief,
): boolean {
  const hottest = warmDiode(diode, Math.max(brief.maxCelsius, 25), 25).saturationAmps;
  const drop = limits.saturationFactor * hottest * Math.max(charge.ohms, discharge.ohms);
  return drop <= (leakageShare * brief.minSupplyVolts) / 3;
}

/** Of each comparator's heads only the first, whose threshold resistors are nearest to the ideal. */
function firstSets(heads: readonly Head[]): Head[] {
  return heads.filter((head, k) => heads[k - 1]?.comparator.id !== head.comparator.id);
}

function steeredPack(
  frame: Frame,
  diode: StockedDiode,
  shelf: PreparedShelf,
  offers: Offers,
  brief: SearchBrief,
): Candidate<SteeredTimingParts> | null {
  const ideal = idealOhms(frame, diode, brief);
  if (ideal === null) return null;
  const nearest = (ohms: number, demand: ResistorDemand) =>
    nearestResistor({ ohms: shelf.values.ohms, parts: offers }, ohms, (part) =>
      holdsMore(part, 1, demand, brief.quantity),
    );
  const charge = nearest(ideal.chargeOhms, frame.head.demand);
  if (charge === null) return null;
  const discharge = nearest(ideal.dischargeOhms, withOneMore(frame.head.demand, charge));
  if (discharge === null) return null;
  const timing: SteeredTimingParts = { kind: 'steered', charge, discharge, diode };
  if (!leaksLittle(timing, brief)) return null;
  const cycle = steeredCycle(frame, diode, steeredValues(timing, frame), brief);
  if (cycle === null || Math.abs(cycle.duty - brief.duty) > limits.dutyTolerance) return null;
  return {
    frame,
    timing,
    frequencyHz: cycle.frequencyHz,
    distance: Math.abs(Math.log(cycle.frequencyHz / brief.targetHz)),
    priceMinor:
      frame.head.priceMinor +
      frame.capacitor.priceMinor +
      charge.priceMinor +
      discharge.priceMinor +
      2 * diode.priceMinor,
  };
}

/** The cycle of a steered circuit, or null when it does not oscillate. */
export function steeredCycle(
  frame: Frame,
  diode: StockedDiode,
  values: SteeredValues,
  brief: SearchBrief,
  corner: HeadCorner = {},
): Cycle | null {
  const cycle = analyseCycle(steeredCircuit(frame, diode, values, brief, corner));
  return cycle.kind === 'oscillates' ? cycle : null;
}

/** Steering resistances in ohms for the asked high and low time; null outside the rules' range. */
function idealOhms(
  frame: Frame,
  diode: StockedDiode,
  brief: SearchBrief,
): { chargeOhms: number; dischargeOhms: number } | null {
  const high = brief.duty / brief.targetHz;
  const low = (1 - brief.duty) / brief.targetHz;
  // Equal thresholds take ln 2 of a time constant for each half; a diode's drop makes it longer.
  let chargeOhms = high / (Math.LN2 * frame.capacitor.farads);
  let dischargeOhms = low / (Math.LN2 * frame.capacitor.farads);
  const least = Math.max(steeredOhms.least, frame.head.minTimingOhms);
  const outside = (ohms: number, slack: number) =>
    ohms < least / slack || ohms > steeredOhms.most * slack;
  if (outside(chargeOhms, 4) || outside(dischargeOhms, 4)) return null;
  const values = {
    farads: frame.capacitor.farads,
    celsius: 25,
    saturationAmps: diode.saturationAmps,
    drained: false,
  };
  for (let step = 0; step < aimSteps; step += 1) {
    const cycle = steeredCycle(frame, diode, { ...values, chargeOhms, dischargeOhms }, brief);
    if (cycle === null) return null;
    const [up, down] = [high / cycle.highSeconds, low / cycle.lowSeconds];
    chargeOhms *= up;
    dischargeOhms *= down;
    if (Math.abs(up - 1) + Math.abs(down - 1) < 1e-4) break;
  }
  if (outside(chargeOhms, 1) || outside(dischargeOhms, 1)) return null;
  return { chargeOhms, dischargeOhms };
}

/** Half of what the supply's ends alone move ln of a steered pack's rate apart, without bias and leakage. */
export function supplyReach(frame: Frame, timing: SteeredTimingParts, brief: SearchBrief): number {
  const values = { ...steeredValues(timing, frame), drained: false };
  const logAt = (supplyVolts: number) =>
    Math.log(steeredCycle(frame, timing.diode, values, brief, { supplyVolts })?.frequencyHz ?? NaN);
  const reach = Math.abs(logAt(brief.maxSupplyVolts) - logAt(brief.minSupplyVolts)) / 2;
  return Number.isNaN(reach) ? 0 : reach;
}
