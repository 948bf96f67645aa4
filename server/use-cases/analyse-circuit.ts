import type { AnalyseRequest, AnalyseResponse } from '../contracts/circuits.ts';
import { createCircuit, type Circuit } from '../engine/circuit.ts';
import { analyseCycle } from '../engine/cycle.ts';
import { averageSupplyAmps } from '../engine/supply-current.ts';
import { Refusal } from './refusal.ts';

/** Solves a circuit given part by part; refuses one that cannot oscillate, with the reason. */
export function analyseCircuit(request: AnalyseRequest): AnalyseResponse {
  const circuit = toCircuit(request);
  const cycle = analyseCycle(circuit);
  if (cycle.kind === 'no-oscillation') throw new Refusal('no-oscillation', cycle.reason);
  return {
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
