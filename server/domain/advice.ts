import type { ResolvedBrief } from '../contracts/brief.ts';
import type { Advice } from '../contracts/packs.ts';
import type { FoundPacks, RankedPack } from '../engine/search/find-packs.ts';
import { worseEnd } from '../engine/search/guaranteed-band.ts';
import { limits } from '../engine/search/rules.ts';
import { percent, plusMinus, rateWords, targetHertz } from './wording.ts';

/** Solves the brief again with a change; the closest pack, or null. */
export type Retry = (change: Partial<ResolvedBrief>) => RankedPack | null;

/**
 * What would help a brief that today's shelves do not hold well: each with the change to apply, and
 * how much it helps as computed by solving again. Empty when a pack holds the band.
 */
export function adviseOn(
  brief: ResolvedBrief,
  found: FoundPacks,
  missing: string | null,
  retry: Retry,
): Advice[] {
  if (brief.careLevel !== 'as-stocked') {
    return [
      {
        code: 'care-level',
        text: 'The bench sells packs as stocked today; choose that care level.',
        change: { careLevel: 'as-stocked' },
      },
    ];
  }
  const advice: Advice[] = [];
  const nearest = [...found.packs].sort((a, b) => a.distance - b.distance)[0];
  if (nearest === undefined) advice.push(...adviseOnNone(brief, missing, retry));
  else if (!isNear(nearest)) advice.push(adviseOnRate(brief, nearest));
  else if (!found.packs.some((pack) => pack.wins.includes('best-value'))) {
    advice.push(...adviseOnWide(brief, found.packs, nearest));
  }
  return advice;
}

/** Packs further off than half as fast again, or half as slow, are no answer to a brief. */
export function isNear(pack: Pick<RankedPack, 'distance'>): boolean {
  return pack.distance <= Math.log(1.5);
}

/** Names the rate nearest to the asked one that the shelves can make. */
function adviseOnRate(brief: ResolvedBrief, nearest: RankedPack): Advice {
  const { unit } = brief.target;
  const words = rateWords(nearest.frequencyHz, unit, 3);
  const inUnit = targetHertz({ value: 1, unit });
  const isPeriod = unit === 's' || unit === 'ms';
  const value = isPeriod ? inUnit / nearest.frequencyHz : nearest.frequencyHz / inUnit;
  const end = nearest.frequencyHz > brief.targetHz ? 'slowest' : 'fastest';
  return {
    code: 'rate',
    text: `The ${end} the shelves can make is ${words.rate} ${words.unit}; ask for that.`,
    change: { target: { value: Number(value.toPrecision(3)), unit } },
  };
}

const gentlerAmps = [0.01, 0.005, 0.002, 0.001, 0.0005];

/** The largest smaller LED current with which the brief can be made, or null. */
function adviseOnCurrent(brief: ResolvedBrief, retry: Retry): Advice | null {
  const { load } = brief;
  if (load.kind !== 'led') return null;
  for (const amps of gentlerAmps.filter((value) => value < load.amps)) {
    const pack = retry({ load: { ...load, amps } });
    if (pack === null || !isNear(pack)) continue;
    const milliamps = `${amps * 1e3}\u202fmA`;
    return {
      code: 'current',
      text: `No comparator on the shelf drives the LED that hard without bending the beat; ${milliamps} works.`,
      change: { load: { ...load, amps } },
    };
  }
  return null;
}

function adviseOnNone(brief: ResolvedBrief, missing: string | null, retry: Retry): Advice[] {
  const advice: Advice[] = [];
  if (missing !== null) advice.push({ code: 'missing-part', text: missing, change: null });
  if (brief.quantity > 1 && retry({ quantity: 1 }) !== null) {
    const most = largestQuantity(brief.quantity, retry);
    advice.push({
      code: 'quantity',
      text: `The shelves hold this brief ${most} ${most === 1 ? 'time' : 'times'} today; lower the quantity to ${most}.`,
      change: { quantity: most },
    });
  }
  if (brief.duty < limits.minDuty || brief.duty > limits.maxDuty) {
    const nearest = Math.min(limits.maxDuty, Math.max(limits.minDuty, brief.duty));
    advice.push({
      code: 'duty',
      text: `These kits are lit for ${percent(limits.minDuty)} to ${percent(limits.maxDuty)} of each beat; take ${percent(nearest)}.`,
      change: { duty: nearest },
    });
  }
  const mounting = brief.mounting === 'through-hole' ? 'surface-mount' : 'through-hole';
  const other = retry({ mounting });
  if (other !== null && other.distance <= Math.log1p(brief.band)) {
    advice.push({
      code: 'mounting',
      text: `With ${mounting} parts the shelves come within ${percent(Math.expm1(other.distance))}.`,
      change: { mounting },
    });
  }
  const gentler = adviseOnCurrent(brief, retry);
  if (gentler !== null) advice.push(gentler);
  else if (brief.load.kind === 'led' && retry({ load: { kind: 'logic' } }) !== null) {
    advice.push({
      code: 'load',
      text: 'No comparator on the shelf drives this LED at this rate and supply; as a logic clock it can be made.',
      change: { load: { kind: 'logic' } },
    });
  }
  if (advice.length === 0) {
    advice.push({
      code: 'out-of-reach',
      text: 'No comparator on the shelf runs from this supply at this rate. Try a supply between 2 and 16\u202fV and a rate under 500\u202fkHz.',
      change: null,
    });
  }
  return advice;
}

/** The largest quantity the shelves hold, by halving; 1 is known to work. */
function largestQuantity(asked: number, retry: Retry): number {
  let works = 1;
  let fails = asked;
  while (fails - works > 1) {
    const middle = Math.floor((works + fails) / 2);
    if (retry({ quantity: middle }) === null) fails = middle;
    else works = middle;
  }
  return works;
}

function adviseOnWide(
  brief: ResolvedBrief,
  packs: readonly RankedPack[],
  nearest: RankedPack,
): Advice[] {
  const steadiest = packs.find((pack) => pack.wins.includes('steadiest'));
  if (!steadiest) return [];
  const end = worseEnd(steadiest.guaranteed, brief.targetHz);
  if (nearest.distance > Math.log1p(brief.band)) return [adviseOnRate(brief, nearest)];
  const band = Math.ceil(end * 1000) / 1000;
  if (band > 0.5) return [];
  return [
    {
      code: 'band',
      text: `No pack from stock keeps 99\u202f% of kits within this band. The steadiest always stays within ${plusMinus(end)}; ask for that.`,
      change: { band },
    },
  ];
}
