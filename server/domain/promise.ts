import type { PackPromise } from '../contracts/packs.ts';
import type { ResolvedBrief } from '../contracts/brief.ts';
import { averageSupplyAmps } from '../engine/supply-current.ts';
import { analyseCycle } from '../engine/cycle.ts';
import type { RankedPack } from '../engine/search/promise.ts';
import { formatSi } from '../engine/si-format.ts';
import { figuresFor, percent, plusMinus, rateWords, significant } from './wording.ts';

/** The promise of a found pack, in numbers and in the words of the maker's unit. */
export function promiseOf(pack: RankedPack, brief: ResolvedBrief): PackPromise {
  const { frequencyHz, guaranteed } = pack;
  const cycle = analyseCycle(pack.circuit);
  const duty = cycle.kind === 'oscillates' ? cycle.duty : Number.NaN;
  const amps = averageSupplyAmps(pack.circuit, pack.frame.head.comparator.quiescentAmps);
  const half = Math.max(guaranteed.maxHz / frequencyHz - 1, 1 - guaranteed.minHz / frequencyHz);
  const figures = figuresFor(half);
  const { unit } = brief.target;
  // A period runs the other way: the fastest kit has the shortest beat.
  const isPeriod = unit === 's' || unit === 'ms';
  const [least, most] = isPeriod
    ? [guaranteed.maxHz, guaranteed.minHz]
    : [guaranteed.minHz, guaranteed.maxHz];
  const error = frequencyHz / brief.targetHz - 1;
  return {
    frequencyHz,
    error,
    band: { minHz: guaranteed.minHz, maxHz: guaranteed.maxHz },
    yieldWithinBand: pack.yieldWithinBand,
    yieldStandardError: pack.yieldStandardError,
    duty,
    averageSupplyAmps: amps,
    text: {
      ...rateWords(frequencyHz, unit, figures),
      band: plusMinus(half),
      // Rounded outwards, so that no kit lies outside what is said.
      from: rateWords(least, unit, figures, 'down').rate,
      to: rateWords(most, unit, figures, 'up').rate,
      error: errorWords(error),
      yield: yieldWords(pack.yieldWithinBand, holdsAlways(pack, brief)),
      supply: formatSi(amps, 'A', 2),
    },
  };
}

function errorWords(error: number): string {
  const size = Math.abs(error);
  if (size < 5e-8) return 'on target';
  return `${size < 1e-4 ? significant(size * 100, 1) + '\u202f%' : percent(size)} ${error > 0 ? 'fast' : 'slow'}`;
}

/** True when the guaranteed band lies inside the asked one, so that every kit holds it. */
function holdsAlways({ guaranteed }: RankedPack, { targetHz, band }: ResolvedBrief): boolean {
  return guaranteed.minHz >= targetHz * (1 - band) && guaranteed.maxHz <= targetHz * (1 + band);
}

/** Share of kits in words; says all of them only when that is certain and not just sampled. */
function yieldWords(share: number, always: boolean): string {
  if (always) return '100\u202f%';
  if (share > 0.999) return 'over 99.9\u202f%';
  return percent(Math.floor(share * 1000) / 1000, 3);
}
