import type { SearchBrief, StockedCapacitor, StockedComparator, StockedResistor } from './shelf.ts';

/**
 * The rules that bound the choice. They make the space of packs finite, so that an exhaustive search
 * can check the fast one. Sources: timing resistance and capacitance limits, decoupling and bias
 * from common practice, no source; leakage of electrolytics from the 0.01·C·V rule's consequences.
 */
export const limits = {
  /** Board leakage rules above, output resistance below. */
  minTimingOhms: 1e3,
  /** Timing and threshold resistors stay this many times above the output's own resistance or pull-up. */
  minOverOutput: 20,
  maxTimingOhms: 1e7,
  /** Stray capacitance, up to 5 pF, would swamp less than this. */
  minTimingFarads: 1e-10,
  strayFarads: 5e-12,
  /** A resistor is run at no more than this share of its rated power. */
  powerShare: 0.5,
  /** Delays may take this part of a period before another comparator must do the work. */
  maxDelayShare: 0.1,
  /**
   * Share of the way from the upper threshold to the supply that the LED may pull the output down:
   * more, and the lit share and the rate hang on the output's own resistance.
   */
  maxLoadDrop: 0.12,
  minThresholdOhms: 1e4,
  maxThresholdOhms: 1e6,
  /** Tolerance of resistors that may set thresholds. */
  thresholdTolerance: 0.01,
  preciseTolerance: 0.001,
  /** Electrolytics are offered only where the maker accepts at least this band. */
  electrolyticBand: 0.2,
  /** A capacitor is run at no more than this share of its rated voltage. */
  ratedVoltsShare: 0.8,
  minDuty: 0.05,
  maxDuty: 0.95,
  /** A duty this near one half needs no shifted thresholds. */
  equalDutyTolerance: 0.005,
  /** Shifted thresholds may miss the asked duty by this much. */
  dutyTolerance: 0.01,
  /** Steered timing is looked at from this far beside one half; nearer, shifted thresholds do better. */
  steeredDutyDistance: 0.1,
  /** A diode's saturation current lies within this factor of the catalogue's; common practice, no source. */
  saturationFactor: 2,
  /** Input capacitance at the reference node, farads; from memory, typical of small comparators. */
  inputFarads: 1e-11,
  /** Inputs of idle sections are held apart through resistors between these (facts on unused sections). */
  minIdleOhms: 1e3,
  maxIdleOhms: 1e4,
  /** A maker sets a trimmer to within this share of its track; common practice, no source. */
  trimmerSetting: 0.005,
  /** With more distinct values than this on the shelf, only those of E24 and E192 pair up. */
  maxPairedValues: 2000,
} as const;

/** True when a comparator can run this brief: supply, speed and output current. */
export function comparatorSuits(part: StockedComparator, brief: SearchBrief): boolean {
  const delays = part.delayLowHighSeconds + part.delayHighLowSeconds;
  return (
    part.available >= brief.quantity &&
    part.minSupplyVolts <= brief.minSupplyVolts &&
    part.maxSupplyVolts >= brief.maxSupplyVolts &&
    delays * brief.targetHz <= limits.maxDelayShare &&
    (brief.load === null || (part.output === 'push-pull' && part.maxOutputAmps >= brief.load.amps))
  );
}

/**
 * True when the LED's current leaves the output high enough for these thresholds: its drop over the
 * typical output resistance is at most 12 % of the supply above the upper threshold. Without an LED
 * always true.
 */
export function bearsLoad(
  part: StockedComparator,
  thresholds: { r1: StockedResistor; r2: StockedResistor; r3: StockedResistor },
  brief: SearchBrief,
): boolean {
  if (brief.load === null) return true;
  const { r1, r2, r3 } = thresholds;
  const pull = 1 / r1.ohms + 1 / r3.ohms;
  const upper = pull / (pull + 1 / r2.ohms);
  return brief.load.amps * part.highOhms <= limits.maxLoadDrop * (1 - upper) * brief.supplyVolts;
}

/** True when a comparator has a section to spare that can drive the LED. */
export function buffersLoad(part: StockedComparator, brief: SearchBrief): boolean {
  return brief.load !== null && part.sections >= 2;
}

/** True when a capacitor may set the time for this brief. Class-2 ceramics never do. */
export function capacitorSuits(part: StockedCapacitor, brief: SearchBrief): boolean {
  return (
    part.available >= brief.quantity &&
    part.farads >= limits.minTimingFarads &&
    part.dielectric !== 'X7R' &&
    (part.dielectric !== 'electrolytic' || brief.band >= limits.electrolyticBand) &&
    part.ratedVolts * limits.ratedVoltsShare >= brief.maxSupplyVolts
  );
}

/**
 * Ideal value of R1–R3, in ohms: as high as 1 MΩ to save current, lowered until the bias current of
 * both inputs shifts the thresholds by less than 0.2 % of the supply and until the input capacitance
 * costs less than 0.2 % of the period, and never under 10 kΩ, a hundred times the output resistance
 * or twenty times the pull-up.
 */
export function idealThresholdOhms(part: StockedComparator, brief: SearchBrief): number {
  const byBias = (0.006 * brief.minSupplyVolts) / Math.max(Math.abs(part.maxInputBiasAmps), 1e-15);
  const bySpeed = 0.006 / (brief.targetHz * limits.inputFarads);
  const pullUp = part.output === 'open-drain' ? idealPullUpOhms(brief) : 0;
  const floor = Math.max(
    limits.minThresholdOhms,
    100 * Math.max(part.highOhms, part.lowOhms),
    limits.minOverOutput * pullUp,
  );
  return Math.max(floor, Math.min(limits.maxThresholdOhms, byBias, bySpeed));
}

/** Ideal pull-up of an open-drain output, in ohms: half a milliampere at the nominal supply. */
export function idealPullUpOhms(brief: SearchBrief): number {
  return brief.supplyVolts / 5e-4;
}

/**
 * Lowest timing resistance, in ohms: it keeps the duty near the asked one against output resistance
 * and pull-up, and even with the whole supply across it takes half the power that the shelf's
 * smallest resistor is rated for.
 */
export function lowestTimingOhms(
  part: StockedComparator,
  pullUpOhms: number | null,
  brief: SearchBrief,
  smallestWatts: number,
): number {
  const output = Math.max(part.highOhms, part.lowOhms, pullUpOhms ?? 0);
  return Math.max(
    limits.minTimingOhms,
    limits.minOverOutput * output,
    brief.maxSupplyVolts ** 2 / (limits.powerShare * smallestWatts),
  );
}

/** True when a resistor across up to `volts` stays under its share of rated power. */
export function bearsPower(part: StockedResistor, volts: number): boolean {
  return volts ** 2 <= limits.powerShare * part.ratedWatts * part.ohms;
}

/** Ideal series resistor of the LED, in ohms; not positive when the supply is too low for the LED. */
export function idealLedOhms(part: StockedComparator, brief: SearchBrief): number {
  if (brief.load === null) return Number.POSITIVE_INFINITY;
  return (brief.supplyVolts - brief.load.forwardVolts) / brief.load.amps - part.highOhms;
}
