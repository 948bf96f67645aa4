import type { CareLevel, ResolvedBrief } from '../contracts/brief.ts';
import type { Advice } from '../contracts/packs.ts';
import { valueYield } from '../engine/search/best-value.ts';
import type { FoundPacks } from '../engine/search/find-packs.ts';
import type { RankedPack } from '../engine/search/promise.ts';
import { worseEnd } from '../engine/search/guaranteed-band.ts';
import { limits } from '../engine/search/rules.ts';
import { celsiusRange, percent, plusMinus, rateWords, targetHertz } from './wording.ts';

/** Solves the brief again with a change; the steadiest pack, or null. */
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
  const advice: Advice[] = [];
  const nearest = [...found.packs].sort((a, b) => a.distance - b.distance)[0];
  if (nearest === undefined) advice.push(...adviseOnNone(brief, missing, retry));
  else if (!isNear(nearest)) advice.push(adviseOnRate(brief, nearest));
  else if (!found.packs.some((pack) => pack.wins.includes('best-value'))) {
    advice.push(...adviseOnWide(brief, found.packs, nearest, retry));
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
    worseEnd: null,
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
      worseEnd: null,
    };
  }
  return null;
}

function adviseOnNone(brief: ResolvedBrief, missing: string | null, retry: Retry): Advice[] {
  const advice: Advice[] = adviseOnCare(brief, retry);
  if (missing !== null)
    advice.push({ code: 'missing-part', text: missing, change: null, worseEnd: null });
  if (brief.quantity > 1 && retry({ quantity: 1 }) !== null) {
    const most = largestQuantity(brief.quantity, retry);
    advice.push({
      code: 'quantity',
      text: `The shelves hold this brief ${most} ${most === 1 ? 'time' : 'times'} today; lower the quantity to ${most}.`,
      change: { quantity: most },
      worseEnd: null,
    });
  }
  if (brief.duty < limits.minDuty || brief.duty > limits.maxDuty) {
    const nearest = Math.min(limits.maxDuty, Math.max(limits.minDuty, brief.duty));
    advice.push({
      code: 'duty',
      text: `These kits are lit for ${percent(limits.minDuty)} to ${percent(limits.maxDuty)} of each beat; take ${percent(nearest)}.`,
      change: { duty: nearest },
      worseEnd: null,
    });
  }
  const mounting = brief.mounting === 'through-hole' ? 'surface-mount' : 'through-hole';
  const other = retry({ mounting });
  if (other !== null && other.distance <= Math.log1p(brief.band)) {
    advice.push({
      code: 'mounting',
      text: `With ${mounting} parts the shelves come within ${percent(Math.expm1(other.distance))}.`,
      change: { mounting },
      worseEnd: worseEnd(other.guaranteed, brief.targetHz),
    });
  }
  const gentler = adviseOnCurrent(brief, retry);
  if (gentler !== null) advice.push(gentler);
  else if (brief.load.kind === 'led' && retry({ load: { kind: 'logic' } }) !== null) {
    advice.push({
      code: 'load',
      text: 'No comparator on the shelf drives this LED at this rate and supply; as a logic clock it can be made.',
      change: { load: { kind: 'logic' } },
      worseEnd: null,
    });
  }
  if (advice.length === 0) {
    advice.push({
      code: 'out-of-reach',
      text: 'No comparator on the shelf runs from this supply at this rate. Try a supply between 2 and 16\u202fV and a rate under 500\u202fkHz.',
      change: null,
      worseEnd: null,
    });
  }
  return advice;
}

/** A care level that the shelves cannot give, where as stocked there is a pack. */
function adviseOnCare(brief: ResolvedBrief, retry: Retry): Advice[] {
  if (brief.careLevel === 'as-stocked') return [];
  const pack = retry({ careLevel: 'as-stocked' });
  if (pack === null) return [];
  const end = worseEnd(pack.guaranteed, brief.targetHz);
  return [
    {
      code: 'care-level',
      text: `${whyNoCare[brief.careLevel]} As stocked, every kit stays within ${plusMinus(end)}.`,
      change: { careLevel: 'as-stocked' },
      worseEnd: end,
    },
  ];
}

const whyNoCare: Record<Exclude<CareLevel, 'as-stocked'>, string> = {
  'lot-checked': 'No measured lot on the shelf serves this brief.',
  'bench-tuned': 'The shelf’s resistors do not cover all that a capacitor for this brief may need.',
  'trimmer-fitted': 'No trimmer on the shelf reaches this rate with every kit.',
};

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

/** Care levels from the least to the most that the shop does to a pack. */
const careWords: Partial<Record<CareLevel, string>> = {
  'lot-checked': 'Lot-checked',
  'bench-tuned': 'Bench-tuned',
  'trimmer-fitted': 'With a trimmer fitted',
};
/** A change that narrows the band by less than this is no help. */
const worthwhile = 0.9;

/**
 * For a brief whose band no pack holds: what a stronger care level, the other mounting, a narrower
 * ambient range, a smaller quantity and a wider band would each do, worked out by solving again.
 */
function adviseOnWide(
  brief: ResolvedBrief,
  packs: readonly RankedPack[],
  nearest: RankedPack,
  retry: Retry,
): Advice[] {
  const steadiest = packs.find((pack) => pack.wins.includes('steadiest'));
  if (!steadiest) return [];
  if (nearest.distance > Math.log1p(brief.band)) return [adviseOnRate(brief, nearest)];
  const now = worseEnd(steadiest.guaranteed, brief.targetHz);
  const consider = (code: string, what: string, change: Partial<ResolvedBrief>): Advice[] => {
    const pack = retry(change);
    if (pack === null || !(pack.guaranteed.minHz > 0)) return [];
    const end = worseEnd(pack.guaranteed, brief.targetHz);
    const holds = pack.yieldWithinBand >= valueYield;
    if (!holds && end > worthwhile * now) return [];
    const kits = holds ? `, and ${shareWords(pack)} of kits hold ${plusMinus(brief.band)}` : '';
    const text = `${what}, every kit stays within ${plusMinus(end)}${kits}; now it is ${plusMinus(now)}.`;
    return [{ code, text, change, worseEnd: end }];
  };
  const mounting = brief.mounting === 'through-hole' ? 'surface-mount' : 'through-hole';
  return [
    ...adviseOnStrongerCare(brief, consider),
    ...consider('mounting', `With ${mounting} parts`, { mounting }),
    ...adviseOnAmbient(brief, consider),
    ...(brief.quantity > 1 ? consider('quantity', 'For a single kit', { quantity: 1 }) : []),
    ...adviseOnBand(now),
  ];
}

type Consider = (code: string, what: string, change: Partial<ResolvedBrief>) => Advice[];

/** Stronger care levels up to the first with which every kit holds the band; more care costs more. */
function adviseOnStrongerCare(brief: ResolvedBrief, consider: Consider): Advice[] {
  const advice: Advice[] = [];
  for (const careLevel of strongerCare(brief.careLevel)) {
    const found = consider('care-level', careWords[careLevel]!, { careLevel });
    advice.push(...found);
    if (found.some(({ worseEnd: end }) => end !== null && end <= brief.band)) break;
  }
  return advice;
}

const careOrder: readonly CareLevel[] = [
  'as-stocked',
  'lot-checked',
  'bench-tuned',
  'trimmer-fitted',
];

function strongerCare(careLevel: CareLevel): CareLevel[] {
  return careOrder.slice(careOrder.indexOf(careLevel) + 1);
}

const roomCelsius = { minCelsius: 15, maxCelsius: 30 };

function adviseOnAmbient({ ambient }: ResolvedBrief, consider: Consider): Advice[] {
  const narrower = {
    minCelsius: Math.max(ambient.minCelsius, roomCelsius.minCelsius),
    maxCelsius: Math.min(ambient.maxCelsius, roomCelsius.maxCelsius),
  };
  const width = narrower.maxCelsius - narrower.minCelsius;
  if (width <= 0 || width >= ambient.maxCelsius - ambient.minCelsius) return [];
  const words = celsiusRange(narrower.minCelsius, narrower.maxCelsius);
  return consider('ambient', `Indoors, between ${words}`, { ambient: narrower });
}

function adviseOnBand(end: number): Advice[] {
  const band = Math.ceil(end * 1000) / 1000;
  if (band > 0.5) return [];
  return [
    {
      code: 'band',
      text: `No pack from stock keeps 99\u202f% of kits within this band. The steadiest always stays within ${plusMinus(end)}; ask for that.`,
      change: { band },
      worseEnd: end,
    },
  ];
}

/** Rounded down, so that it never says more than is so. */
function shareWords({ yieldWithinBand }: RankedPack): string {
  return yieldWithinBand > 0.9995 ? 'all' : percent(Math.floor(yieldWithinBand * 1000) / 1000, 3);
}
