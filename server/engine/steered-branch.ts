import type { ReducedState } from './output-stage.ts';
import { integrate, invertIntegral } from './quadrature.ts';
import type { StateBranch } from './state-branch.ts';
import type { WarmCircuit, WarmDiode } from './warm-circuit.ts';

const newtonSteps = 200;

interface Path {
  diode: WarmDiode;
  /** The steering resistor. */
  ohms: number;
  /** Resistance of the output node as the timing branch sees it. */
  sourceOhms: number;
  openVolts: number;
  sign: 1 | -1;
}

/**
 * Forward current i ≥ 0 that solves i·R + n·V_t·ln(1 + i/I_s) + Ro(i + I_s) = volts, by Newton's
 * method from a lower bound (the left side is concave and increasing, so it never overshoots).
 * Gives 0 when the voltage is too small for any forward current.
 */
export function steeredAmps(
  volts: number,
  ohms: number,
  sourceOhms: number,
  diode: WarmDiode,
): number {
  const { saturationAmps, emissionVolts } = diode;
  const drive = volts - sourceOhms * saturationAmps;
  if (!(drive > 0)) return 0;
  const total = ohms + sourceOhms;
  const diodeVolts = emissionVolts * Math.log1p(drive / (total * saturationAmps));
  let amps = Math.max(0, (drive - diodeVolts) / total);
  for (let step = 0; step < newtonSteps; step++) {
    const excess = amps * total + emissionVolts * Math.log1p(amps / saturationAmps) - drive;
    const change = excess / (total + emissionVolts / (amps + saturationAmps));
    const next = Math.max(amps - change, 0);
    if (Math.abs(next - amps) <= 1e-15 * next) return next;
    amps = next;
  }
  return amps;
}

/**
 * One state of the circuit with steered timing: `ohms` and the conducting diode from output to
 * capacitor, the opposite diode adding its saturation current. Closed form for a constant
 * capacitance without drain, else quadrature over the logarithm of the current. The reverse
 * current is taken as I_s throughout, which is 1e-5 off at a headroom of 5; the run stops where
 * the forward current vanishes, though a real capacitor would creep on by a few n·V_t.
 */
export function steeredBranch(
  warm: WarmCircuit,
  diode: WarmDiode,
  reduced: ReducedState,
  sign: 1 | -1,
): StateBranch {
  const { openVolts, ohms: sourceOhms, feedback, biasVolts } = reduced;
  const ohms = sign > 0 ? warm.chargeOhms : warm.dischargeOhms;
  const path: Path = { diode, ohms, sourceOhms, openVolts, sign };
  const { offsetVolts, hysteresisVolts } = warm.circuit.comparator;
  const shift = offsetVolts + (sign * hysteresisVolts) / 2;
  const tripAmps = steeredAmps(
    sign * (openVolts * (1 - feedback) - biasVolts - shift),
    ohms,
    sourceOhms * (1 - feedback),
    diode,
  );
  const tripVolts = tripAmps > 0 ? voltsAt(path, tripAmps) : NaN;
  const outputVoltsAt = (volts: number) =>
    openVolts - sign * sourceOhms * (ampsAt(path, volts) + diode.saturationAmps);
  return {
    tripVolts,
    settlingVolts: NaN,
    reachesTrip: tripAmps > 0 && netAmps(warm, path, tripAmps) > 0,
    tauSeconds: null,
    headroom: tripAmps > 0 ? headroomAt(sign * (openVolts - tripVolts), warm, diode, sign) : 0,
    ...steeredRun(warm, path),
    timingAmpsAt: (volts) => sign * (ampsAt(path, volts) + diode.saturationAmps),
    outputVoltsAt,
    referenceVoltsAt: (volts) => feedback * outputVoltsAt(volts) + biasVolts,
  };
}

/**
 * Voltage left at the trip across the conducting branch, less what the reversed diode's current drops
 * across its own resistor, over n·V_t: only with some of it left is that diode reversed at all.
 */
function headroomAt(volts: number, warm: WarmCircuit, diode: WarmDiode, sign: 1 | -1): number {
  const otherOhms = sign > 0 ? warm.dischargeOhms : warm.chargeOhms;
  return Math.max(0, volts - diode.saturationAmps * otherOhms) / diode.emissionVolts;
}

function voltsAt(path: Path, amps: number): number {
  const { diode, ohms, sourceOhms, openVolts, sign } = path;
  const across =
    amps * ohms +
    diode.emissionVolts * Math.log1p(amps / diode.saturationAmps) +
    sourceOhms * (amps + diode.saturationAmps);
  return openVolts - sign * across;
}

function ampsAt(path: Path, volts: number): number {
  return steeredAmps(path.sign * (path.openVolts - volts), path.ohms, path.sourceOhms, path.diode);
}

/** Current that moves the capacitor towards the trip: what is left after bias and leakage. */
function netAmps(warm: WarmCircuit, path: Path, amps: number): number {
  const drain = warm.drainAmps + voltsAt(path, amps) * warm.leakageSiemens;
  return amps + path.diode.saturationAmps - path.sign * drain;
}

type Run = Pick<StateBranch, 'secondsBetween' | 'voltsAfter'>;

function steeredRun(warm: WarmCircuit, path: Path): Run {
  const farads = warm.capacitance.constantFarads;
  const drained = warm.drainAmps !== 0 || warm.leakageSiemens !== 0;
  return farads !== null && !drained ? closedRun(path, farads) : quadratureRun(warm, path);
}

/** t = C [(R+Ro) ln(A1/A2) + n·V_t (1/A2 − 1/A1)], A the current with the reverse part added. */
function closedRun(path: Path, farads: number): Run {
  const { saturationAmps, emissionVolts } = path.diode;
  const total = path.ohms + path.sourceOhms;
  return {
    secondsBetween: (from, to) => {
      const first = ampsAt(path, from);
      const last = ampsAt(path, to) + saturationAmps;
      const fall = (first + saturationAmps - last) / last;
      return (
        farads * (total * Math.log1p(fall) + (emissionVolts * fall) / (first + saturationAmps))
      );
    },
    voltsAfter: (from, seconds) => {
      const first = ampsAt(path, from) + saturationAmps;
      const span = closedSpan(total, emissionVolts / first, seconds / farads);
      return voltsAt(path, Math.max(first * Math.exp(-span) - saturationAmps, 0));
    },
  };
}

/** Solves total·z + slope·(eᶻ − 1) = target for z ≥ 0 from an upper bound; convex, so monotone. */
function closedSpan(total: number, slope: number, target: number): number {
  let span = Math.min(target / total, Math.log1p(target / slope));
  for (let step = 0; step < newtonSteps; step++) {
    const excess = total * span + slope * Math.expm1(span) - target;
    const next = span - excess / (total + slope * Math.exp(span));
    if (Math.abs(next - span) <= 1e-15 * Math.abs(span)) return next;
    span = next;
  }
  return span;
}

/**
 * dt = C(V) (R + Ro + n·V_t/A) A / (net current) dz, with z = ln(A at the start / A). Where bias and
 * leakage bring the run to rest at z = rest, the integral runs over q with z = rest (1 − e^−q),
 * which takes the pole out.
 */
function quadratureRun(warm: WarmCircuit, path: Path): Run {
  const wholeAt = (volts: number) => ampsAt(path, volts) + path.diode.saturationAmps;
  const { cornerVolts } = warm.capacitance;
  const runFrom = (volts: number) => {
    const first = wholeAt(volts);
    const scale = spanScale(warm, path, first);
    const toScale = (to: number) => scale.fromSpan(Math.log(first / wholeAt(to)));
    const rate = (x: number) => scale.slope(x) * spanRate(warm, path, first, scale.toSpan(x));
    return { first, scale, toScale, rate, breaks: cornerVolts.map(toScale) };
  };
  return {
    secondsBetween: (from, to) => {
      const { rate, toScale, breaks } = runFrom(from);
      return integrate(rate, 0, toScale(to), breaks);
    },
    voltsAfter: (from, seconds) => {
      if (seconds === 0) return from;
      const { first, scale, rate, breaks } = runFrom(from);
      const x = invertIntegral(rate, 0, scale.limit, seconds, breaks);
      return voltsAt(path, ampsAfter(path, first, scale.reach(x)));
    },
  };
}

function ampsAfter(path: Path, first: number, span: number): number {
  return Math.max(first * Math.exp(-span) - path.diode.saturationAmps, 0);
}

function spanRate(warm: WarmCircuit, path: Path, first: number, span: number): number {
  const whole = first * Math.exp(-span);
  const amps = ampsAfter(path, first, span);
  const farads = warm.capacitance.faradsAt(voltsAt(path, amps));
  const ohms = path.ohms + path.sourceOhms;
  return (farads * (ohms * whole + path.diode.emissionVolts)) / netAmps(warm, path, amps);
}

/** The variable a run is integrated over, and its relation to the span z. */
interface SpanScale {
  limit: number;
  fromSpan(span: number): number;
  /** The span at which the rate is taken, and d span / dx there. */
  toSpan(x: number): number;
  slope(x: number): number;
  /** The span reached at x. */
  reach(x: number): number;
}

/** Beyond this q the approach to rest is taken as the exponential it has become. */
const settledAt = 10;

function spanScale(warm: WarmCircuit, path: Path, first: number): SpanScale {
  const end = Math.log(first / path.diode.saturationAmps);
  const net = (span: number) => netAmps(warm, path, ampsAfter(path, first, span));
  if (net(end) > 0) {
    const same = (span: number) => span;
    return { limit: end, fromSpan: same, toSpan: same, slope: () => 1, reach: same };
  }
  const rest = restingSpan(net, end);
  return {
    limit: Infinity,
    fromSpan: (span) => (span < rest ? -Math.log1p(-span / rest) : Infinity),
    toSpan: (x) => -rest * Math.expm1(-Math.min(x, settledAt)),
    slope: (x) => rest * Math.exp(-Math.min(x, settledAt)),
    reach: (x) => -rest * Math.expm1(-x),
  };
}

/** Where bias and leakage have eaten all of a falling current, by bisection. */
function restingSpan(net: (span: number) => number, end: number): number {
  let low = 0;
  let high = end;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (net(middle) > 0) low = middle;
    else high = middle;
  }
  return low;
}
