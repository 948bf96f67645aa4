import type { Circuit } from '../../server/engine/circuit.ts';

export type Level = 'high' | 'low';

type Steered = Extract<Circuit['timing'], { kind: 'steered' }>;

/** One output state as the capacitor's node sees it. */
export interface NodeState {
  /** Current that charges the capacitor when it stands at `volts`. */
  capacitorAmps(volts: number): number;
  /** Voltage of the non-inverting node when the capacitor stands at `volts`. */
  referenceVolts(volts: number): number;
  /**
   * Reverse voltage across the steering diode that this state turns off, in units of n·V_t;
   * negative when the diode conducts, null without one.
   */
  reverseBias(volts: number): number | null;
}

/** Everything joined to the output but R3 and the timing: a fixed voltage, or G and Σ G·E. */
interface OutputFeed {
  heldVolts: number | null;
  siemens: number;
  amps: number;
}

interface Nodes {
  outputVolts: number;
  referenceVolts: number;
}

interface Diode {
  saturationAmps: number;
  emissionVolts: number;
}

interface Factors {
  thresholds: number;
  timing: number;
}

const boltzmann = 1.380649e-23;
const elementaryCharge = 1.602176634e-19;
const zeroCelsius = 273.15;

/** The linear temperature laws of the resistors, or null where one would not be positive. */
export function resistorFactors(circuit: Circuit): Factors | null {
  const warmer = circuit.celsius - circuit.referenceCelsius;
  const {
    resistorTemperatureCoefficientPerKelvin: common,
    thresholdTemperatureCoefficientPerKelvin: threshold = common,
    timingTemperatureCoefficientPerKelvin: timing = common,
  } = circuit;
  const factors = { thresholds: 1 + threshold * warmer, timing: 1 + timing * warmer };
  return factors.thresholds > 0 && factors.timing > 0 ? factors : null;
}

/** Solves the circuit's nodes in one output state by Kirchhoff's current law. */
export function nodeState(circuit: Circuit, level: Level, factors: Factors): NodeState {
  const { timing, capacitor, comparator } = circuit;
  const feed = outputFeed(circuit, level);
  const leakSiemens = capacitor.leakageOhms === null ? 0 : 1 / capacitor.leakageOhms;
  const constantAmps = comparator.invertingBiasAmps + capacitor.leakageAmps;
  const drainAmps = (volts: number) => constantAmps + volts * leakSiemens;
  if (timing.kind === 'single') return singleState(circuit, feed, factors, timing.ohms, drainAmps);
  const branch = steeredBranch(circuit, feed, factors, timing, level === 'high' ? 1 : -1);
  return {
    capacitorAmps: (volts) => branch.amps(volts) - drainAmps(volts),
    referenceVolts: (volts) => branch.referenceVolts(branch.amps(volts)),
    reverseBias: branch.reverseBias,
  };
}

/** Linear nodes: two solutions give the whole line. */
function singleState(
  circuit: Circuit,
  feed: OutputFeed,
  factors: Factors,
  ohms: number,
  drainAmps: (volts: number) => number,
): NodeState {
  const siemens = 1 / (ohms * factors.timing);
  const span = circuit.supplyVolts;
  const empty = solveNodes(circuit, feed, factors, siemens, 0, 0);
  const full = solveNodes(circuit, feed, factors, siemens, span, 0);
  const atEmpty = empty.outputVolts * siemens - drainAmps(0);
  const atFull = (full.outputVolts - span) * siemens - drainAmps(span);
  const ampsPerVolt = (atFull - atEmpty) / span;
  const referencePerVolt = (full.referenceVolts - empty.referenceVolts) / span;
  return {
    capacitorAmps: (volts) => atEmpty + ampsPerVolt * volts,
    referenceVolts: (volts) => empty.referenceVolts + referencePerVolt * volts,
    reverseBias: () => null,
  };
}

function outputFeed(circuit: Circuit, level: Level): OutputFeed {
  const { comparator, supplyVolts, load } = circuit;
  const feed: OutputFeed = { heldVolts: null, siemens: 0, amps: 0 };
  const join = (volts: number, ohms: number) => {
    feed.siemens += 1 / ohms;
    feed.amps += volts / ohms;
  };
  const high = level === 'high';
  if (!(high && comparator.output === 'open-drain')) {
    const volts = high ? (comparator.highVolts ?? supplyVolts) : comparator.lowVolts;
    const ohms = high ? comparator.highOhms : comparator.lowOhms;
    if (ohms === 0) return { ...feed, heldVolts: volts };
    join(volts, ohms);
  }
  if (comparator.pullUpOhms !== null) join(supplyVolts, comparator.pullUpOhms);
  if (high && load && !load.buffered && feed.amps / feed.siemens > load.volts) {
    join(load.volts, load.ohms);
  }
  return feed;
}

/**
 * Output and reference node with a conductance from the output to the capacitor's voltage and a
 * current drawn from the output besides.
 */
function solveNodes(
  circuit: Circuit,
  feed: OutputFeed,
  factors: Factors,
  timingSiemens: number,
  capacitorVolts: number,
  drawnAmps: number,
): Nodes {
  const g1 = 1 / (circuit.r1Ohms * factors.thresholds);
  const g2 = 1 / (circuit.r2Ohms * factors.thresholds);
  const g3 = 1 / (circuit.r3Ohms * factors.thresholds);
  const atReference = g1 + g2 + g3;
  const intoReference = circuit.supplyVolts * g1 - circuit.comparator.nonInvertingBiasAmps;
  if (feed.heldVolts !== null) {
    const referenceVolts = (intoReference + g3 * feed.heldVolts) / atReference;
    return { outputVolts: feed.heldVolts, referenceVolts };
  }
  const atOutput = feed.siemens + g3 + timingSiemens;
  const intoOutput = feed.amps + timingSiemens * capacitorVolts - drawnAmps;
  const determinant = atOutput * atReference - g3 * g3;
  return {
    outputVolts: (intoOutput * atReference + g3 * intoReference) / determinant,
    referenceVolts: (atOutput * intoReference + g3 * intoOutput) / determinant,
  };
}

function steeredBranch(
  circuit: Circuit,
  feed: OutputFeed,
  factors: Factors,
  timing: Steered,
  sign: 1 | -1,
) {
  const chargeOhms = timing.chargeOhms * factors.timing;
  const dischargeOhms = timing.dischargeOhms * factors.timing;
  const diode = warmDiode(circuit, timing.diode);
  const idle = solveNodes(circuit, feed, factors, 0, 0, 0);
  const drawn = solveNodes(circuit, feed, factors, 0, 0, 1);
  const sourceOhms = idle.outputVolts - drawn.outputVolts;
  const transferOhms = idle.referenceVolts - drawn.referenceVolts;
  const amps = (volts: number) => {
    const drive = idle.outputVolts - volts;
    return drive < 0
      ? -branchAmps(-drive, dischargeOhms, chargeOhms, sourceOhms, diode)
      : branchAmps(drive, chargeOhms, dischargeOhms, sourceOhms, diode);
  };
  return {
    amps,
    reverseBias: (volts: number) => {
      const across = sign * (idle.outputVolts - sourceOhms * amps(volts) - volts);
      const ohms = sign > 0 ? dischargeOhms : chargeOhms;
      const dropped = across < 0 ? 0 : reverseAmps(across, ohms, diode) * ohms;
      return (across - dropped) / diode.emissionVolts;
    },
    referenceVolts: (amps: number) => idle.referenceVolts - transferOhms * amps,
  };
}

function warmDiode(circuit: Circuit, given: Steered['diode']): Diode {
  const kelvins = circuit.celsius + zeroCelsius;
  const ratio = kelvins / (circuit.referenceCelsius + zeroCelsius);
  const emissionVolts = (given.emissionCoefficient * boltzmann * kelvins) / elementaryCharge;
  const growth =
    Math.exp(((ratio - 1) * given.energyGapElectronVolts) / emissionVolts) *
    Math.pow(ratio, given.saturationTemperatureExponent / given.emissionCoefficient);
  return { saturationAmps: given.saturationAmps * growth, emissionVolts };
}

/**
 * Current through both branches, driven by `drive` ≥ 0 behind `sourceOhms`: one diode conducts,
 * the other is reversed, and both follow i = I_s (e^(v / n·V_t) − 1) behind their resistors.
 * Newton on the conducting diode's voltage, kept inside a bracket.
 */
function branchAmps(
  drive: number,
  forwardOhms: number,
  reverseOhms: number,
  sourceOhms: number,
  diode: Diode,
): number {
  const { saturationAmps, emissionVolts } = diode;
  const mostAmps = drive / (forwardOhms + sourceOhms);
  let least = 0;
  let most = Math.min(drive, emissionVolts * Math.log1p(mostAmps / saturationAmps));
  let volts = most;
  for (let step = 0; step < 200; step++) {
    const forward = saturationAmps * Math.expm1(volts / emissionVolts);
    const across = volts + forward * forwardOhms;
    const reverse = reverseAmps(across, reverseOhms, diode);
    const excess = across + sourceOhms * (forward + reverse) - drive;
    const forwardSlope = (forward + saturationAmps) / emissionVolts;
    const acrossSlope = 1 + forwardSlope * forwardOhms;
    const reverseSlope = (saturationAmps - reverse) / emissionVolts;
    const slope = forwardSlope + (acrossSlope * reverseSlope) / (1 + reverseOhms * reverseSlope);
    const change = -excess / (acrossSlope + sourceOhms * slope);
    if (Math.abs(change) <= 1e-8 * emissionVolts) return forward + reverse + change * slope;
    if (excess > 0) most = volts;
    else least = volts;
    const next = volts + change;
    volts = next > least && next < most ? next : (least + most) / 2;
  }
  throw new Error('The diode current was not found.');
}

/** Current that leaks backwards through a diode and its resistor with `volts` ≥ 0 across both. */
function reverseAmps(volts: number, ohms: number, diode: Diode): number {
  const { saturationAmps, emissionVolts } = diode;
  let amps = Math.min(saturationAmps, volts / ohms);
  for (let step = 0; step < 100; step++) {
    const back = saturationAmps * Math.exp((amps * ohms - volts) / emissionVolts);
    const change = (amps - saturationAmps + back) / (1 + (back * ohms) / emissionVolts);
    amps -= change;
    if (Math.abs(change) <= 1e-12 * saturationAmps) return amps;
  }
  throw new Error('The reverse current was not found.');
}
