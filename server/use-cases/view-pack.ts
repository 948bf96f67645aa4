import { createHash } from 'node:crypto';
import type { PackPage } from '../contracts/packs.ts';
import { money } from '../domain/money.ts';
import { causeLines, causesSentence } from '../domain/spread-causes.ts';
import { supplyCauses } from '../domain/supply-causes.ts';
import { drawSchematic } from '../domain/schematic.ts';
import { analyseCycle } from '../engine/cycle.ts';
import { spreadCauses } from '../engine/search/kit-causes.ts';
import { sampleWaveform } from '../engine/waveform.ts';
import type { Deps } from '../ports.ts';
import { openPackBook, openToken } from './pack-book.ts';
import { Refusal } from './refusal.ts';
import { searchShelf } from './search-shelf.ts';

/** A short name for a pack that nobody ordered yet, always the same for the same token. */
function packIdentifier(token: string): string {
  return `TK-${createHash('sha256').update(token).digest('hex').slice(0, 8).toUpperCase()}`;
}

/** A pack in full, worked out from today's shelves and prices. */
export async function viewPack(
  deps: Pick<Deps, 'db' | 'stockView' | 'signer'>,
  token: string,
): Promise<PackPage> {
  const book = await openPackBook(deps);
  const opened = openToken(book, deps.signer, token);
  if (opened.kind === 'unknown') {
    throw new Refusal('not-found', 'This link leads to no pack. Ask for it again from the brief.');
  }
  if (opened.kind === 'gone') throw new Refusal('not-found', opened.reason);
  const { pack, inHand, ranked, price } = opened.assessed;
  const cycle = analyseCycle(ranked.circuit);
  if (cycle.kind !== 'oscillates') throw new Error(cycle.reason);
  const waveform = sampleWaveform(ranked.circuit, cycle, {
    periods: 3,
    pointsPerSegment: 40,
    fromStart: true,
  });
  const causes = spreadCauses(ranked, inHand.search, searchShelf(book, inHand.brief));
  return {
    brief: inHand.brief,
    pack,
    circuit: drawSchematic({ ...pack, supplyLabel: inHand.brief.supply.label }),
    waveform: {
      output: waveform.output,
      capacitor: waveform.capacitor,
      thresholdLowVolts: waveform.thresholdLowVolts,
      thresholdHighVolts: waveform.thresholdHighVolts,
      supplyVolts: ranked.circuit.supplyVolts,
      firstHighSeconds: cycle.firstHighSeconds,
      periodSeconds: cycle.periodSeconds,
    },
    causes: causeLines(causes, pack.careLevel, pack.topology === 'steered'),
    causesText: causesSentence(causes),
    supply: supplyCauses(
      ranked.circuit,
      ranked.frame.head.comparator.quiescentAmps,
      inHand.battery,
    ),
    priceLines: price.lines.map(({ label, grossMinor }) => ({ label, amount: money(grossMinor) })),
    identifier: packIdentifier(token),
    maker: {
      name: book.settings.name,
      address: book.settings.address,
      email: book.settings.email,
    },
  };
}
