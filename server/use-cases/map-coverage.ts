import { setImmediate as nextTurn } from 'node:timers/promises';
import type { Coverage } from '../contracts/desk.ts';
import { briefSchema } from '../contracts/brief.ts';
import { resolveBrief } from '../domain/brief.ts';
import { worseEnd } from '../engine/search/guaranteed-band.ts';
import type { Deps } from '../ports.ts';
import { openPackBook, type PackBook } from './pack-book.ts';
import { steadiestOnShelves } from './solve-brief.ts';

const fromHz = 0.01;
const toHz = 100_000;
const pointCount = 71;
const askedBand = 0.05;
const keptForMs = 30_000;

let kept: { at: number; work: Promise<Coverage> } | null = null;

/**
 * How steadily today's shelves hold a rate, over a log-spaced range. Kept for half a minute, since it
 * takes about a second; other requests are served between its points.
 */
export function mapCoverage(deps: Pick<Deps, 'db' | 'stockView' | 'clock'>): Promise<Coverage> {
  const now = deps.clock.now().getTime();
  if (kept === null || now - kept.at > keptForMs) {
    kept = { at: now, work: openPackBook(deps).then(survey) };
    kept.work.catch(() => (kept = null));
  }
  return kept.work;
}

async function survey(book: PackBook): Promise<Coverage> {
  const points: Coverage['points'] = [];
  for (let k = 0; k < pointCount; k += 1) {
    const frequencyHz = fromHz * (toHz / fromHz) ** (k / (pointCount - 1));
    points.push({ frequencyHz, halfBand: halfBandAt(book, frequencyHz) });
    await nextTurn();
  }
  const held = points.filter((point) => point.halfBand !== null && point.halfBand <= askedBand);
  return { band: askedBand, points, covered: held.length / points.length };
}

function halfBandAt(book: PackBook, frequencyHz: number): number | null {
  const brief = briefSchema.parse({
    target: { value: frequencyHz, unit: 'Hz' },
    load: { kind: 'logic' },
    band: askedBand,
  });
  const inHand = resolveBrief(brief, book.catalogue, book.settings);
  if (inHand.kind === 'impossible') return null;
  const pack = steadiestOnShelves(book, inHand);
  if (!pack || pack.distance > 0.01) return null;
  return worseEnd(pack.guaranteed, frequencyHz);
}
