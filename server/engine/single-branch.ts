import type { ReducedState } from './output-stage.ts';
import { integrate, invertIntegral } from './quadrature.ts';
import type { StateBranch } from './state-branch.ts';
import type { WarmCircuit } from './warm-circuit.ts';

/**
 * One state of the circuit with a single timing resistor: a closed exponential when the
 * capacitance is constant, else t = Req ∫ C(V) ds with s the logarithm of the distance still to
 * go, by quadrature. `sign` is +1 for the high state, −1 for the low.
 */
export function singleBranch(warm: WarmCircuit, reduced: ReducedState, sign: 1 | -1): StateBranch {
  const { openVolts, ohms, feedback, biasVolts } = reduced;
  const timingOhms = warm.chargeOhms;
  const branchOhms = timingOhms + ohms;
  const drainOhms = 1 / (1 / branchOhms + warm.leakageSiemens);
  const settlingVolts = drainOhms * (openVolts / branchOhms - warm.drainAmps);
  const { offsetVolts, hysteresisVolts } = warm.circuit.comparator;
  const shift = offsetVolts + (sign * hysteresisVolts) / 2;
  const tripVolts =
    (biasVolts + (feedback * openVolts * timingOhms) / branchOhms + shift) /
    (1 - (feedback * ohms) / branchOhms);
  const outputVoltsAt = (volts: number) => (openVolts * timingOhms + ohms * volts) / branchOhms;
  const run = exponentialRun(warm, drainOhms, settlingVolts);
  return {
    tripVolts,
    settlingVolts,
    reachesTrip: sign * (settlingVolts - tripVolts) > 0,
    headroom: null,
    ...run,
    timingAmpsAt: (volts) => (openVolts - volts) / branchOhms,
    outputVoltsAt,
    referenceVoltsAt: (volts) => feedback * outputVoltsAt(volts) + biasVolts,
  };
}

type Run = Pick<StateBranch, 'tauSeconds' | 'secondsBetween' | 'voltsAfter'>;

function exponentialRun(warm: WarmCircuit, drainOhms: number, settlingVolts: number): Run {
  const { constantFarads, cornerVolts } = warm.capacitance;
  const faradsAt = (volts: number) => warm.capacitance.faradsAt(volts);
  const spans = (from: number, to: number) => Math.log1p((to - from) / (settlingVolts - to));
  const at = (from: number, span: number) =>
    settlingVolts - (settlingVolts - from) * Math.exp(-span);
  if (constantFarads !== null) {
    const tauSeconds = drainOhms * constantFarads;
    return {
      tauSeconds,
      secondsBetween: (from, to) => tauSeconds * spans(from, to),
      voltsAfter: (from, seconds) => at(from, seconds / tauSeconds),
    };
  }
  const rateFrom = (from: number) => (span: number) => drainOhms * faradsAt(at(from, span));
  const breaksFrom = (from: number) =>
    cornerVolts.map((corner) => spans(from, corner)).filter((span) => span > 0);
  return {
    tauSeconds: null,
    secondsBetween: (from, to) => integrate(rateFrom(from), 0, spans(from, to), breaksFrom(from)),
    voltsAfter: (from, seconds) =>
      seconds === 0
        ? from
        : at(from, invertIntegral(rateFrom(from), 0, Infinity, seconds, breaksFrom(from))),
  };
}
