import type { AnalyseRequest, AnalyseResponse } from '../contracts/circuits.ts';
import { createCircuit, type Circuit } from '../engine/circuit.ts';
import { analyseCycle } from '../engine/cycle.ts';
import { rateSensitivities } from '../engine/sensitivity.ts';
import { monteCarlo, rssFraction, worstCase } from '../engine/spread.ts';
import { averageSupplyAmps } from '../engine/supply-current.ts';
import { Refusal } from './refusal.ts';

/** Circuits that need quadrature cost far more a kit; more samples than this would hold up the shop. */
const slowSamples = 100_000;

/** Solves a circuit given part by part; refuses one that cannot oscillate, with the reason. */
export function analyseCircuit(request: AnalyseRequest): AnalyseResponse {
  const circuit = toCircuit(request);
  const cycle = analyseCycle(circuit);
  if (cycle.kind === 'no-oscillation') throw new Refusal('no-oscillation', cycle.reason);
  const answer: AnalyseResponse = {
    frequencyHz: cycle.frequencyHz,
    periodSeconds: cycle.periodSeconds,
    highSeconds: cycle.highSeconds,
    lowSeconds: cycle.lowSeconds,
    duty: cycle.duty,
    firstHighSeconds: cycle.firstHighSeconds,
    thresholdLowVolts: cycle.thresholdLowVolts,
    thresholdHighVolts: cycle.thresholdHighVolts,
    averageSupplyAmps: averageSupplyAmps(circuit),
  };
  requireFinite(answer);
  if (request.tolerances) answer.spread = spreadOf(circuit, cycle.frequencyHz, request.tolerances);
  return answer;
}

function toCircuit(request: AnalyseRequest): Circuit {
  const { thresholds, timing, capacitor, comparator } = request;
  return createCircuit({
    supplyVolts: request.supplyVolts,
    celsius: request.celsius,
    referenceCelsius: request.referenceCelsius,
    ...thresholds,
    timing,
    resistorTemperatureCoefficientPerKelvin: request.resistorTemperatureCoefficientPerKelvin,
    capacitor,
    comparator,
  });
}

/** Values at the far ends of the allowed ranges can leave what double precision holds. */
function requireFinite(answer: AnalyseResponse): void {
  const broken = Object.entries(answer).find(([, value]) => !Number.isFinite(value));
  if (!broken) return;
  throw new Refusal(
    'impossible-brief',
    `These values together leave no usable ${broken[0]}; bring the extreme ones nearer to real parts.`,
  );
}

function spreadOf(
  circuit: Circuit,
  frequencyHz: number,
  asked: NonNullable<AnalyseRequest['tolerances']>,
): AnalyseResponse['spread'] {
  const { thresholds, timing, capacitor, samples } = asked;
  const tolerances = { thresholds, timing, capacitor };
  const quick = circuit.timing.kind === 'single' && circuit.capacitor.biasHalvingVolts === null;
  if (!quick && samples > slowSamples) {
    const message = `For steered timing or a bias-dependent capacitor take at most ${slowSamples} samples.`;
    throw new Refusal('invalid', message, [{ path: 'tolerances.samples', message }]);
  }
  const { minHz, maxHz } = worstCase(circuit, tolerances);
  const { yieldWithinBand, yieldStandardError } = monteCarlo(circuit, tolerances, {
    distribution: asked.distribution,
    targetHz: asked.targetHz ?? frequencyHz,
    band: asked.band,
    samples,
    seed: asked.seed,
  });
  const rss = rssFraction(rateSensitivities(circuit), tolerances);
  if (![minHz, maxHz, rss].every(Number.isFinite)) {
    throw new Refusal(
      'impossible-brief',
      'This circuit is on the verge of standing still, so its spread has no end. Bring its values nearer to real parts, or leave the tolerances out.',
    );
  }
  return { worstCase: { minHz, maxHz }, rssFraction: rss, yieldWithinBand, yieldStandardError };
}
