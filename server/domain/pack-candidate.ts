import { aimFrame, framePeriod, type Frame } from '../engine/search/aim.ts';
import type { Candidate, TimingParts } from '../engine/search/candidate.ts';
import { completeHead } from '../engine/search/heads.ts';
import { joinedOhms } from '../engine/search/resistor-values.ts';
import { buffersLoad } from '../engine/search/rules.ts';
import type { SearchBrief, StockedCapacitor, StockedResistor } from '../engine/search/shelf.ts';
import { steeredCycle, steeredValues } from '../engine/search/steered.ts';
import { isKind, type CataloguePart, type FactsOf, type PartOf } from './catalogue.ts';
import type { PackChoice } from './pack-choice.ts';
import {
  toLotChecked,
  toStockedCapacitor,
  toStockedComparator,
  toStockedDiode,
  toStockedResistor,
  toStockedTrimmer,
} from './shelf.ts';

type Parts = ReadonlyMap<number, CataloguePart>;

/**
 * A chosen pack as the search would have found it, for the parts as they are today. Null when a part
 * is missing or of another kind, the lots of a lot-checked capacitor are no longer measured, or the
 * circuit does not oscillate.
 */
export function candidateOf(
  choice: PackChoice,
  parts: Parts,
  brief: SearchBrief,
): Candidate | null {
  const frame = frameOf(choice, parts, brief);
  const timing = frame && timingOf(choice, parts, frame, brief);
  if (!frame || !timing) return null;
  const frequencyHz = rateOf(frame, timing, brief);
  if (!(frequencyHz > 0)) return null;
  return {
    frame,
    timing,
    frequencyHz,
    distance: Math.abs(Math.log(frequencyHz / brief.targetHz)),
    priceMinor: 0,
  };
}

function partOf<
  Kind extends FactsOf<'resistor' | 'capacitor' | 'comparator' | 'diode' | 'trimmer'>['kind'],
>(parts: Parts, kind: Kind, id: number | undefined): PartOf<Kind> | null {
  const part = id === undefined ? undefined : parts.get(id);
  return part && isKind(part, kind) ? part : null;
}

function resistorOf(parts: Parts, id: number | undefined): StockedResistor | null {
  const part = partOf(parts, 'resistor', id);
  return part && toStockedResistor(part);
}

function capacitorOf(
  parts: Parts,
  id: number | undefined,
  { care, meterUncertainty }: SearchBrief,
): StockedCapacitor | null {
  const part = partOf(parts, 'capacitor', id);
  if (part === null) return null;
  return care === 'lot-checked' ? toLotChecked(part, meterUncertainty) : toStockedCapacitor(part);
}

function frameOf({ parts: ids }: PackChoice, parts: Parts, brief: SearchBrief): Frame | null {
  const comparator = partOf(parts, 'comparator', ids.U1);
  const capacitor = capacitorOf(parts, ids.C1, brief);
  const [r1, r2, r3] = [ids.R1, ids.R2, ids.R3].map((id) => resistorOf(parts, id));
  if (!comparator || !capacitor || !r1 || !r2 || !r3) return null;
  const stocked = toStockedComparator(comparator);
  const head = completeHead(
    {
      comparator: stocked,
      thresholds: { r1, r2, r3 },
      pullUp: resistorOf(parts, ids.RP),
      ledResistor: resistorOf(parts, ids.RL),
      buffered: buffersLoad(stocked, brief),
      idle: resistorOf(parts, ids.R5),
    },
    brief,
  );
  return { head, capacitor };
}

function timingOf(
  { parts: ids, join }: PackChoice,
  parts: Parts,
  frame: Frame,
  brief: SearchBrief,
): TimingParts | null {
  const diode = partOf(parts, 'diode', ids.DC);
  if (diode) {
    const charge = resistorOf(parts, ids.RC);
    const discharge = resistorOf(parts, ids.RD);
    if (!charge || !discharge) return null;
    return { kind: 'steered', charge, discharge, diode: toStockedDiode(diode) };
  }
  const first = resistorOf(parts, ids.R4 ?? ids.R4A);
  if (!first) return null;
  const trimmer = partOf(parts, 'trimmer', ids.RV);
  if (trimmer) {
    const { ohms } = aimFrame(frame, brief);
    return { kind: 'trimmed', ohms, fixed: first, trimmer: toStockedTrimmer(trimmer) };
  }
  const second = resistorOf(parts, ids.R4B);
  if (second === null) return { kind: 'single', ohms: first.ohms, first, second, join: null };
  const ohms = joinedOhms(first.ohms, second.ohms, join === 'parallel');
  return { kind: 'single', ohms, first, second, join: join ?? 'series' };
}

function rateOf(frame: Frame, timing: TimingParts, brief: SearchBrief): number {
  if (timing.kind === 'trimmed') return brief.targetHz;
  if (timing.kind === 'single') return 1 / framePeriod(frame, timing.ohms);
  const values = steeredValues(timing, frame);
  return steeredCycle(frame, timing.diode, values, brief)?.frequencyHz ?? NaN;
}
