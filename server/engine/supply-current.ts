import { requireNonNegative } from './check-circuit.ts';
import type { Circuit } from './circuit.ts';
import { solveCircuit, type NoOscillation, type SolvedCircuit } from './cycle.ts';
import { integratePanel } from './quadrature.ts';
import type { StateBranch } from './state-branch.ts';
import { temperatureFactors } from './warm-circuit.ts';

/** Average currents out of the supply over a settled cycle, in amperes, and their sum. */
export interface SupplyCurrent {
  kind: 'supply-current';
  totalAmps: number;
  /** Through R1, and through R3 while the output is high. */
  thresholdAmps: number;
  /** Into the timing branch while the output is high. */
  timingAmps: number;
  /** Through the pull-up while the output is low; when high its current is in the other parts. */
  pullUpAmps: number;
  /** Through the indicator while the output is high. */
  loadAmps: number;
  quiescentAmps: number;
}

const panels = 8;

/**
 * Average supply current of an oscillating circuit, part by part. By Kirchhoff's law all that
 * leaves the output node while it is high comes from the supply, through the output stage or the
 * pull-up; while it is low the supply feeds R1 and the pull-up only. `quiescentAmps` is the
 * comparator's own. Neglects switching losses inside the comparator, input bias that flows out of
 * the pins, and the indicator's curvature. Throws a `RangeError` on impossible numbers.
 */
export function supplyCurrent(
  circuit: Circuit,
  quiescentAmps: number = 0,
): SupplyCurrent | NoOscillation {
  requireNonNegative(quiescentAmps, 'The quiescent current');
  const solved = solveCircuit(circuit);
  if (solved.kind === 'no-oscillation') return solved;
  const { cycle, high, low } = solved;
  const overCycle = (highAmps: (volts: number) => number, lowAmps: (volts: number) => number) =>
    cycle.duty * stateMean(high, cycle.valleyVolts, cycle.highSeconds, highAmps) +
    (1 - cycle.duty) * stateMean(low, cycle.peakVolts, cycle.lowSeconds, lowAmps);
  const parts = currentsOf(circuit, solved);
  const none = () => 0;
  const thresholdAmps = overCycle(parts.r1(high), parts.r1(low)) + overCycle(parts.r3(high), none);
  const timingAmps = overCycle((volts) => high.timingAmpsAt(volts), none);
  const pullUpAmps = overCycle(none, parts.pullUp(low));
  const loadAmps = circuit.load?.buffered
    ? cycle.duty * bufferedAmps(circuit)
    : overCycle(parts.load(high), none);
  return {
    kind: 'supply-current',
    totalAmps: thresholdAmps + timingAmps + pullUpAmps + loadAmps + quiescentAmps,
    thresholdAmps,
    timingAmps,
    pullUpAmps,
    loadAmps,
    quiescentAmps,
  };
}

/** Total of `supplyCurrent` in amperes, or NaN when the circuit does not oscillate. */
export function averageSupplyAmps(circuit: Circuit, quiescentAmps: number = 0): number {
  const current = supplyCurrent(circuit, quiescentAmps);
  return current.kind === 'supply-current' ? current.totalAmps : NaN;
}

/** What a spare section of the same kind gives an indicator while high. */
function bufferedAmps({ load, comparator, supplyVolts }: Circuit): number {
  if (!load) return 0;
  const left = (comparator.highVolts ?? supplyVolts) - load.volts;
  return Math.max(0, left) / (load.ohms + comparator.highOhms);
}

type CurrentIn = (branch: StateBranch) => (volts: number) => number;

function currentsOf(
  circuit: Circuit,
  solved: SolvedCircuit,
): Record<'r1' | 'r3' | 'pullUp' | 'load', CurrentIn> {
  const { supplyVolts, load, comparator } = circuit;
  const factor = temperatureFactors(circuit).thresholds;
  const conducts = solved.high.outputVoltsAt(solved.cycle.thresholdHighVolts) > (load?.volts ?? 0);
  return {
    r1: (at) => (volts) => (supplyVolts - at.referenceVoltsAt(volts)) / (circuit.r1Ohms * factor),
    r3: (at) => (volts) =>
      (at.outputVoltsAt(volts) - at.referenceVoltsAt(volts)) / (circuit.r3Ohms * factor),
    pullUp: (at) => (volts) =>
      comparator.pullUpOhms === null
        ? 0
        : (supplyVolts - at.outputVoltsAt(volts)) / comparator.pullUpOhms,
    load: (at) => (volts) =>
      load && conducts ? (at.outputVoltsAt(volts) - load.volts) / load.ohms : 0,
  };
}

/** Mean over one state's run, by 12-point Gauss–Legendre panels in time. */
function stateMean(
  branch: StateBranch,
  startVolts: number,
  seconds: number,
  amps: (volts: number) => number,
): number {
  const at = (time: number) => amps(branch.voltsAfter(startVolts, time));
  let sum = 0;
  for (let panel = 0; panel < panels; panel++) {
    sum += integratePanel(at, (panel * seconds) / panels, ((panel + 1) * seconds) / panels);
  }
  return sum / seconds;
}
