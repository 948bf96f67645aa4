import { completeHead, type Head } from '../../../server/engine/search/heads.ts';
import type { Candidate } from '../../../server/engine/search/candidate.ts';
import type { SearchBrief } from '../../../server/engine/search/shelf.ts';
import type { FrameParts, Outcome, Recipe } from './exhaustive-search.ts';

/** A pack of the search, written out part by part. Throws for a trimmed one. */
export function recipeOf({ frame, timing }: Candidate): Recipe {
  const { comparator, thresholds, pullUp, ledResistor, idle } = frame.head;
  const { r1, r2, r3 } = thresholds;
  if (timing.kind === 'trimmed') throw new Error('A trimmed pack has no recipe here.');
  return {
    frame: {
      comparator,
      thresholds: [r1, r2, r3],
      pullUp,
      ledResistor,
      idle,
      capacitor: frame.capacitor,
    },
    timing,
  };
}

/** Turns outcomes of the exhaustive search into candidates as the engine's promises take them. */
export function candidatesOf(outcomes: readonly Outcome[], brief: SearchBrief): Candidate[] {
  const heads = new Map<string, Head>();
  return outcomes.map(({ frame, timing, frequencyHz, distance, priceMinor }): Candidate => {
    const key = headKey(frame);
    const head = heads.get(key) ?? headOf(frame, brief);
    heads.set(key, head);
    return {
      frame: { head, capacitor: frame.capacitor },
      timing,
      frequencyHz,
      distance,
      priceMinor,
    };
  });
}

function headKey({ comparator, thresholds, pullUp, ledResistor, idle }: FrameParts): string {
  const ids = [comparator, ...thresholds, pullUp, ledResistor, idle].map((part) => part?.id ?? 0);
  return ids.join();
}

function headOf(frame: FrameParts, brief: SearchBrief): Head {
  const { comparator, thresholds, pullUp, ledResistor, idle } = frame;
  const [r1, r2, r3] = thresholds;
  const buffered = brief.load !== null && comparator.sections > 1;
  const parts = { comparator, thresholds: { r1, r2, r3 }, pullUp, ledResistor, buffered, idle };
  return completeHead(parts, brief);
}
