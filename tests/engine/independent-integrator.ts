import { createRequire } from 'node:module';
import type { Circuit } from '../../server/engine/circuit.ts';
import { nodeState, resistorFactors, type NodeState } from './independent-nodes.ts';

interface OdexSolver {
  absoluteTolerance: number;
  relativeTolerance: number;
  initialStepSize: number;
  maxExtrapolationColumns: number;
  solve(
    slopes: (x: number, y: number[]) => number[],
    from: number,
    start: readonly number[],
    to: number,
  ): { y: number[]; outcome: number };
}

interface Odex {
  Solver: new (dimension: number) => OdexSolver;
  Outcome: { Converged: number };
}

const require = createRequire(import.meta.url);
const { Solver, Outcome } = require('odex') as Odex;

/** A settled cycle as the differential equation gives it, between output edges. */
export interface IntegratedCycle {
  periodSeconds: number;
  highSeconds: number;
  lowSeconds: number;
  firstHighSeconds: number;
  peakVolts: number;
  valleyVolts: number;
  tripHighVolts: number;
  tripLowVolts: number;
  /** Least of the reversed steering diode's voltages at peak and valley, over n·V_t. */
  leastReverseBias: number | null;
}

/** Differential capacitance with the voltages at which its slope jumps, ascending. */
interface Capacitance {
  faradsAt: (volts: number) => number;
  knots: readonly number[];
}

/** A stretch of one state between two voltages. */
interface Stretch {
  state: NodeState;
  fromVolts: number;
  toVolts: number;
}

/**
 * The settled cycle of a circuit from its node equations and the general integrator odex (Gragg,
 * Bulirsch and Stoer's method), without any formula of the engine; null when it does not
 * oscillate. `tolerance` is odex's own, relative, 1e-10 unless given. Neglects what the circuit
 * cannot say, and takes the indicator as conducting or not for the whole state.
 */
export function integrateCycle(
  circuit: Circuit,
  options: { tolerance?: number } = {},
): IntegratedCycle | null {
  const factors = resistorFactors(circuit);
  const capacitance = capacitanceOf(circuit);
  if (factors === null || capacitance === null) return null;
  const { offsetVolts, hysteresisVolts } = circuit.comparator;
  const high = nodeState(circuit, 'high', factors);
  const low = nodeState(circuit, 'low', factors);
  const highTrip = tripVolts(high, offsetVolts + hysteresisVolts / 2, circuit.supplyVolts);
  const lowTrip = tripVolts(low, offsetVolts - hysteresisVolts / 2, circuit.supplyVolts);
  if (!(highTrip > 0 && highTrip > lowTrip)) return null;
  if (!(high.capacitorAmps(highTrip) > 0 && low.capacitorAmps(lowTrip) < 0)) return null;
  const tolerance = options.tolerance ?? 1e-10;
  return cycleBetween(circuit, capacitance, { high, low, highTrip, lowTrip }, tolerance);
}

interface Trips {
  high: NodeState;
  low: NodeState;
  highTrip: number;
  lowTrip: number;
}

function cycleBetween(
  circuit: Circuit,
  capacitance: Capacitance,
  { high, low, highTrip, lowTrip }: Trips,
  tolerance: number,
): IntegratedCycle {
  const { delayHighLowSeconds: fall, delayLowHighSeconds: rise } = circuit.comparator;
  const limit = circuit.supplyVolts;
  const peakVolts = voltsAfter(high, highTrip, fall, capacitance, limit, tolerance);
  const valleyVolts = voltsAfter(low, lowTrip, rise, capacitance, limit, tolerance);
  const [charge = NaN, discharge = NaN, first = NaN] = secondsOf(
    [
      { state: high, fromVolts: valleyVolts, toVolts: highTrip },
      { state: low, fromVolts: peakVolts, toVolts: lowTrip },
      { state: high, fromVolts: 0, toVolts: highTrip },
    ],
    capacitance,
    tolerance,
  );
  const highReverse = high.reverseBias(peakVolts);
  const lowReverse = low.reverseBias(valleyVolts);
  return {
    periodSeconds: charge + fall + discharge + rise,
    highSeconds: charge + fall,
    lowSeconds: discharge + rise,
    firstHighSeconds: first + fall,
    peakVolts,
    valleyVolts,
    tripHighVolts: highTrip,
    tripLowVolts: lowTrip,
    leastReverseBias:
      highReverse === null || lowReverse === null ? null : Math.min(highReverse, lowReverse),
  };
}

function capacitanceOf(circuit: Circuit): Capacitance | null {
  const { farads, temperatureCoefficientPerKelvin, biasCurve, biasHalvingVolts } =
    circuit.capacitor;
  const warmer = circuit.celsius - circuit.referenceCelsius;
  const warmFarads = farads * (1 + temperatureCoefficientPerKelvin * warmer);
  if (!(warmFarads > 0)) return null;
  if (biasCurve) {
    const { volts, fractions } = biasCurve;
    return {
      faradsAt: (bias) => warmFarads * onCurve(volts, fractions, Math.abs(bias)),
      knots: volts.flatMap((knot) => [-knot, knot]).sort((a, b) => a - b),
    };
  }
  if (biasHalvingVolts === null) return { faradsAt: () => warmFarads, knots: [] };
  const square = biasHalvingVolts * biasHalvingVolts;
  return { faradsAt: (bias) => (warmFarads * square) / (square + bias * bias), knots: [] };
}

function onCurve(volts: readonly number[], fractions: readonly number[], bias: number): number {
  const right = volts.findIndex((knot) => knot > bias);
  const last = fractions[fractions.length - 1] ?? NaN;
  if (right < 0) return last;
  const rightFraction = fractions[right] ?? NaN;
  if (right === 0) return rightFraction;
  const leftVolts = volts[right - 1] ?? NaN;
  const leftFraction = fractions[right - 1] ?? NaN;
  const share = (bias - leftVolts) / ((volts[right] ?? NaN) - leftVolts);
  return leftFraction * (1 - share) + rightFraction * share;
}

/**
 * The capacitor voltage that stands `shift` above the reference node, by false position (Illinois)
 * in a bracket widened until it holds the root; at once where the nodes are linear.
 */
function tripVolts(state: NodeState, shift: number, supplyVolts: number): number {
  const above = (volts: number) => volts - state.referenceVolts(volts) - shift;
  let left = 0;
  let right = supplyVolts;
  for (let width = supplyVolts; above(left) > 0; width *= 2) left -= width;
  for (let width = supplyVolts; above(right) < 0; width *= 2) right += width;
  let leftValue = above(left);
  let rightValue = above(right);
  let side = 0;
  let previous = NaN;
  for (let step = 0; step < 200; step++) {
    const volts = (left * rightValue - right * leftValue) / (rightValue - leftValue);
    const value = above(volts);
    if (value === 0 || Math.abs(volts - previous) <= 1e-15 * supplyVolts) return volts;
    previous = volts;
    if (value > 0) {
      right = volts;
      rightValue = value;
      if (side > 0) leftValue /= 2;
      side = 1;
    } else {
      left = volts;
      leftValue = value;
      if (side < 0) rightValue /= 2;
      side = -1;
    }
  }
  return previous;
}

/** Times of several stretches at once, each the sum over its pieces between knots. */
function secondsOf(
  stretches: readonly Stretch[],
  capacitance: Capacitance,
  tolerance: number,
): number[] {
  const lanes: Stretch[] = [];
  const ends: number[] = [];
  for (const stretch of stretches) {
    lanes.push(...splitAtKnots(stretch, capacitance.knots));
    ends.push(lanes.length);
  }
  const seconds = laneSeconds(lanes, capacitance, tolerance);
  return ends.map((end, index) =>
    seconds.slice(ends[index - 1] ?? 0, end).reduce((sum, part) => sum + part, 0),
  );
}

/**
 * dt/dV = C(V)/I(V), each lane scaled to 0…1 and to a time of about 1, so that one run of odex
 * carries them all.
 */
function laneSeconds(
  lanes: readonly Stretch[],
  { faradsAt }: Capacitance,
  tolerance: number,
): number[] {
  const scales = lanes.map(({ state, fromVolts, toVolts }) => {
    const middle = (fromVolts + toVolts) / 2;
    return faradsAt(middle) / state.capacitorAmps(middle);
  });
  const slopes = lanes.map(() => 0);
  const slopesAt = (x: number) => {
    for (let index = 0; index < lanes.length; index++) {
      const { state, fromVolts, toVolts } = lanes[index] as Stretch;
      const volts = fromVolts + x * (toVolts - fromVolts);
      slopes[index] = faradsAt(volts) / (state.capacitorAmps(volts) * (scales[index] as number));
    }
    return slopes;
  };
  const shares = solve(slopesAt, lanes.length, tolerance);
  return lanes.map(
    ({ fromVolts, toVolts }, index) =>
      (shares[index] as number) * (scales[index] as number) * (toVolts - fromVolts),
  );
}

function splitAtKnots(stretch: Stretch, knots: readonly number[]): Stretch[] {
  const { state, fromVolts, toVolts } = stretch;
  const inside = knots.filter((knot) => (knot - fromVolts) * (knot - toVolts) < 0);
  if (inside.length === 0) return [stretch];
  if (toVolts < fromVolts) inside.reverse();
  const ends = [...new Set([fromVolts, ...inside, toVolts])];
  return ends
    .slice(1)
    .map((end, index) => ({ state, fromVolts: ends[index] ?? NaN, toVolts: end }));
}

/** The voltage `seconds` after `volts`: past whole pieces of the curve first, then dV/dt = I/C. */
function voltsAfter(
  state: NodeState,
  volts: number,
  seconds: number,
  capacitance: Capacitance,
  supplyVolts: number,
  tolerance: number,
): number {
  if (seconds === 0) return volts;
  const direction = Math.sign(state.capacitorAmps(volts));
  const ahead = capacitance.knots.filter((knot) => direction * (knot - volts) > 0);
  if (direction < 0) ahead.reverse();
  let start = volts;
  let left = seconds;
  for (const knot of ahead) {
    if (!(direction * state.capacitorAmps(knot) > 0)) break;
    const stretch = { state, fromVolts: start, toVolts: knot };
    const [taken = NaN] = secondsOf([stretch], capacitance, tolerance);
    if (!(taken < left)) break;
    left -= taken;
    start = knot;
  }
  return voltsWithin(state, start, left, capacitance, supplyVolts, tolerance);
}

function voltsWithin(
  state: NodeState,
  volts: number,
  seconds: number,
  { faradsAt }: Capacitance,
  supplyVolts: number,
  tolerance: number,
): number {
  const moved = (state.capacitorAmps(volts) / faradsAt(volts)) * seconds;
  const width = Math.sign(moved) * Math.min(Math.abs(moved), supplyVolts);
  const slope = [0];
  const slopeAt = (_x: number, y: number[]) => {
    const at = volts + (y[0] as number) * width;
    slope[0] = ((state.capacitorAmps(at) / faradsAt(at)) * seconds) / width;
    return slope;
  };
  return volts + (solve(slopeAt, 1, tolerance)[0] as number) * width;
}

const solvers = new Map<number, { solver: OdexSolver; start: number[] }>();

/** Integrates from 0 to 1 with every component 0 at the start. */
function solve(
  slopes: (x: number, y: number[]) => number[],
  dimension: number,
  tolerance: number,
): number[] {
  let kept = solvers.get(dimension);
  if (!kept) {
    kept = { solver: new Solver(dimension), start: Array<number>(dimension).fill(0) };
    kept.solver.initialStepSize = 0.5;
    solvers.set(dimension, kept);
  }
  const { solver, start } = kept;
  solver.relativeTolerance = tolerance;
  solver.absoluteTolerance = tolerance;
  const { y, outcome } = solver.solve(slopes, 0, start, 1);
  if (outcome !== Outcome.Converged) throw new Error('The integration took too many steps.');
  return y;
}
