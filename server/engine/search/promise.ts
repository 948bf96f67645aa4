import type { Circuit } from '../circuit.ts';
import { circuitCapacitor } from './aim.ts';
import type { Candidate } from './candidate.ts';
import { guaranteedBand, type GuaranteedBand } from './guaranteed-band.ts';
import { headCircuit } from './heads.ts';
import { kitYield, type KitYield } from './kit-yield.ts';
import type { PreparedShelf } from './prepared-shelf.ts';
import type { SearchBrief } from './shelf.ts';
import { steeredCircuit, steeredValues } from './steered.ts';
import { isEqualDuty } from './threshold-sets.ts';

export type Rank = 'closest' | 'best-value' | 'steadiest';
export type Topology = 'equal-thresholds' | 'shifted-thresholds' | 'steered';

/** A candidate with its promise. */
export interface RankedPack extends Candidate, KitYield {
  circuit: Circuit;
  guaranteed: GuaranteedBand;
  topology: Topology;
  /** The ranks for which this pack is the first of all. */
  wins: Rank[];
}

/** Adds the promise to a candidate: its nominal circuit, guaranteed band and yield. */
export function promise(
  candidate: Candidate,
  brief: SearchBrief,
  shelf: PreparedShelf,
): RankedPack {
  const guaranteed = guaranteedBand(candidate, brief, shelf);
  return {
    ...candidate,
    ...kitYield(candidate, brief, shelf, guaranteed),
    circuit: candidateCircuit(candidate, brief),
    guaranteed,
    topology: topologyOf(candidate, brief),
    wins: [],
  };
}

/** The nominal circuit of a candidate at 25 °C and the nominal supply. */
function candidateCircuit({ frame, timing }: Candidate, brief: SearchBrief): Circuit {
  if (timing.kind === 'steered') {
    return steeredCircuit(frame, timing.diode, steeredValues(timing, frame), brief);
  }
  const circuit = headCircuit(frame.head, brief);
  return {
    ...circuit,
    timing: { kind: 'single', ohms: timing.ohms },
    capacitor: { ...circuit.capacitor, ...circuitCapacitor(frame.capacitor) },
  };
}

function topologyOf({ timing, frame }: Candidate, brief: SearchBrief): Topology {
  if (timing.kind === 'steered') return 'steered';
  const { r1, r2, r3 } = frame.head.thresholds;
  const equal = r1.id === r2.id && r2.id === r3.id;
  return equal && isEqualDuty(brief.duty) ? 'equal-thresholds' : 'shifted-thresholds';
}
