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
    if (Math.abs(next - amps) <= 2e-16 * next) return next;
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
    headroom: tripAmps > 0 ? (sign * (openVolts - tripVolts)) / diode.emissionVolts : 0,
    ...steeredRun(warm, path),
    timingAmpsAt: (volts) => sign * (ampsAt(path, volts) + diode.saturationAmps),
    outputVoltsAt,
    referenceVoltsAt: (volts) => feedback * outputVoltsAt(volts) + biasVolts,
  };
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
    if (Math.abs(next - span) <= 2e-16 * Math.abs(span)) return next;
    span = next;
  }
  return span;
}

/** dt = C(V) (R + Ro + n·V_t/A) A / (net current) dz, with z = ln(A at the start / A). */
function quadratureRun(warm: WarmCircuit, path: Path): Run {
  const { saturationAmps, emissionVolts } = path.diode;
  const { faradsAt, cornerVolts } = warm.capacitance;
  const total = path.ohms + path.sourceOhms;
  const rateFrom = (first: number) => (span: number) => {
    const whole = first * Math.exp(-span);
    const amps = Math.max(whole - saturationAmps, 0);
    const net = netAmps(warm, path, amps);
    if (net <= 0) return Infinity;
    return (faradsAt(voltsAt(path, amps)) * (total * whole + emissionVolts)) / net;
  };
  const wholeAt = (volts: number) => ampsAt(path, volts) + saturationAmps;
  const breaksFrom = (first: number) => cornerVolts.map((at) => Math.log(first / wholeAt(at)));
  return {
    secondsBetween: (from, to) => {
      const first = wholeAt(from);
      return integrate(rateFrom(first), 0, Math.log(first / wholeAt(to)), breaksFrom(first));
    },
    voltsAfter: (from, seconds) => {
      if (seconds === 0) return from;
      const first = wholeAt(from);
      const limit = furthestSpan(warm, path, first);
      const span = invertIntegral(rateFrom(first), 0, limit, seconds, breaksFrom(first));
      return voltsAt(path, Math.max(first * Math.exp(-span) - saturationAmps, 0));
    },
  };
}

/**
 * Where a run ends: the forward current has gone, or bias and leakage have eaten all of it, which
 * takes forever; then the end is set a rounding step short of it. The net current falls with the
 * forward current, so bisection finds the place.
 */
function furthestSpan(warm: WarmCircuit, path: Path, first: number): number {
  const { saturationAmps } = path.diode;
  const end = Math.log(first / saturationAmps);
  const net = (span: number) =>
    netAmps(warm, path, Math.max(first * Math.exp(-span) - saturationAmps, 0));
  if (net(end) > 0) return end;
  let low = 0;
  let high = end;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (net(middle) > 0) low = middle;
    else high = middle;
  }
  return low;
}
