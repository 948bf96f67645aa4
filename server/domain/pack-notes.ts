import type { RankedPack } from '../engine/search/promise.ts';
import { limits } from '../engine/search/rules.ts';
import type { SearchBrief } from '../engine/search/shelf.ts';
import { formatFarads, formatOhms } from '../engine/si-format.ts';
import { percent } from './wording.ts';

export interface PackNote {
  code: string;
  text: string;
}

/** From these on a pack comes near a limit of the trade; common practice, no source, where not said. */
const near = {
  /** Board leakage begins to count above about this (facts on timing practice). */
  highOhms: 2e6,
  /** 5 pF of stray capacitance are half a percent of this. */
  smallFarads: 1e-9,
  delayShare: 0.02,
  biasShare: 0.002,
  leakageShare: 0.01,
  outputShare: 0.7,
  ratedShare: 0.6,
  driftPerKelvin: 3e-4,
} as const;

/** Where a pack comes near a limit of the trade: a code, and what it means for the maker. */
export function packNotes(pack: RankedPack, brief: SearchBrief): PackNote[] {
  const { head, capacitor } = pack.frame;
  const part = head.comparator;
  const ohms = largestTimingOhms(pack);
  const notes: PackNote[] = [];
  const say = (when: boolean, code: string, text: string) => when && notes.push({ code, text });
  say(
    ohms > near.highOhms,
    'high-resistance',
    `${formatOhms(ohms)} sets the time: wash flux off the board and keep fingers off it, since a film of moisture slows the kit.`,
  );
  say(
    capacitor.farads < near.smallFarads,
    'stray-capacitance',
    `C1 is only ${formatFarads(capacitor.farads)}; stray capacitance up to 5\u202fpF is counted in the promise. Build it on its board, not on a breadboard.`,
  );
  const delay = (part.delayLowHighSeconds + part.delayHighLowSeconds) * brief.targetHz;
  say(
    delay > near.delayShare,
    'delay',
    `The comparator’s delay makes ${percent(delay)} of each beat; it is counted, and its spread is in the promise.`,
  );
  const bias = (Math.abs(part.maxInputBiasAmps) * ohms) / brief.minSupplyVolts;
  say(
    bias > near.biasShare,
    'input-bias',
    `The comparator’s input current moves the thresholds by up to ${percent(bias)} of the supply; it is counted.`,
  );
  const leakage =
    (capacitor.insulationSeconds === null
      ? 0
      : (ohms * capacitor.farads) / capacitor.insulationSeconds) +
    (ohms * capacitor.leakageAmps) / brief.minSupplyVolts;
  say(
    leakage > near.leakageShare,
    'leakage',
    `Leakage of C1 takes up to ${percent(leakage)} of the charging current; it is counted at its catalogue figure.`,
  );
  const amps = brief.load?.amps ?? 0;
  say(
    amps > near.outputShare * part.maxOutputAmps,
    'output-current',
    `The LED takes ${percent(amps / part.maxOutputAmps)} of what the comparator can give.`,
  );
  say(
    capacitor.dielectric === 'electrolytic',
    'electrolytic',
    'An electrolytic capacitor drifts and ages: good for a slow blinker, not for a clock. Mind its polarity.',
  );
  say(
    brief.maxSupplyVolts > near.ratedShare * capacitor.ratedVolts,
    'rated-voltage',
    `C1 is run at up to ${percent(brief.maxSupplyVolts / capacitor.ratedVolts)} of its rated voltage; ${percent(limits.ratedVoltsShare)} is the limit here.`,
  );
  say(
    pack.topology === 'steered',
    'diode-drift',
    'The steering diodes’ voltage falls as they warm, so the rate rises with temperature and moves with the supply; both are in the promise.',
  );
  say(
    pack.timing.kind === 'single' && driftOf(pack) > near.driftPerKelvin,
    'drift',
    `R4 and C1 together drift ${Math.round(driftOf(pack) * 1e6)}\u202fppm for each kelvin; it is in the promise.`,
  );
  return notes;
}

function largestTimingOhms({ timing }: RankedPack): number {
  return timing.kind === 'steered'
    ? Math.max(timing.charge.ohms, timing.discharge.ohms)
    : timing.ohms;
}

function driftOf({ timing, frame }: RankedPack): number {
  if (timing.kind !== 'single') return 0;
  const resistor = timing.first.temperatureCoefficientPerKelvin;
  return Math.abs(resistor + frame.capacitor.temperatureCoefficientPerKelvin);
}

/** Why a pack is built the way it is. */
export function whyTopology(pack: RankedPack, brief: SearchBrief): string {
  const { head } = pack.frame;
  const buffer = head.buffered
    ? ' A spare section drives the LED, so the LED does not move the beat.'
    : '';
  return `${topologyWords(pack, brief)}${careWords(pack)}${buffer}`;
}

function topologyWords({ topology }: RankedPack, { duty }: SearchBrief): string {
  const share = percent(duty, 3);
  switch (topology) {
    case 'equal-thresholds':
      return 'Three like resistors set thresholds at a third and two thirds of the supply: they track each other, and the supply cancels out of the rate.';
    case 'shifted-thresholds':
      return `R1 to R3 shift both thresholds so that the output is high for ${share} of each beat with a single timing resistor; the supply still cancels out.`;
    case 'steered':
      return `Two diodes give charging and discharging a resistor each, which sets ${share} exactly where shifted thresholds would lie too near the rails.`;
  }
}

function careWords({ timing }: RankedPack): string {
  return timing.kind === 'trimmed'
    ? ' The trimmer reaches the target with every combination of parts, temperature and supply that the promise covers.'
    : '';
}
