import type { ResolvedBrief } from '../../../server/contracts/brief.ts';
import type { Pack, PackPart, SolveResponse } from '../../../server/contracts/packs.ts';
import { narrow, noBreak } from '../../lib/spaces.ts';
import { groupParts, rolesText } from '../../ui/part-groups.ts';

type Win = Pack['wins'][number];

const winWords: Record<Win, string> = {
  'best-value': 'Best value',
  closest: 'Closest',
  steadiest: 'Steadiest',
};

function percentOf(fraction: number): string {
  return `±${narrow}${Number((fraction * 100).toPrecision(3))}${narrow}%`;
}

/** Why a tag hangs in front, and what that means. */
export function reasonFor(pack: Pack, band: number): { title: string; meaning: string } {
  const meanings: Record<Win, string> = {
    'best-value': `cheapest with 99${narrow}% of kits in ${percentOf(band)}`,
    closest: 'nominal nearest to the rate',
    steadiest: 'narrowest guaranteed band',
  };
  const [first, ...others] = pack.wins;
  if (first === undefined) return { title: 'Next best', meaning: 'next in the order you chose' };
  const title = [winWords[first], ...others.map((win) => winWords[win].toLowerCase())].join(
    ' and ',
  );
  return { title, meaning: [first, ...others].map((win) => meanings[win]).join('; ') };
}

/** The first three on the rail – every winner, then the next in rank – and those that stand behind. */
export function frontAndBehind(packs: readonly Pack[]): { front: Pack[]; behind: Pack[] } {
  const winners = packs.filter((pack) => pack.wins.length > 0).slice(0, 3);
  const rest = packs.filter((pack) => !winners.includes(pack));
  const front = [...winners, ...rest.slice(0, 3 - winners.length)];
  return { front, behind: packs.filter((pack) => !front.includes(pack)) };
}

/** Lowest and highest guaranteed rate as fractions off the target. */
export function bandOff(
  pack: Pack,
  targetHz: number,
): { low: number; high: number; worse: number } {
  const low = pack.promise.band.minHz / targetHz - 1;
  const high = pack.promise.band.maxHz / targetHz - 1;
  return { low, high, worse: Math.max(Math.abs(low), Math.abs(high)) };
}

export interface TagPart {
  key: string;
  value: string;
  roles: string;
  part: PackPart;
}

const tagRoles: readonly (readonly string[])[] = [
  ['R4', 'R4A', 'R4B', 'RV', 'RC', 'RD'],
  ['C1'],
  ['R1', 'R2', 'R3'],
];

/** What is drawn on a tag: whatever sets the time, then the capacitor, then the threshold resistors. */
export function tagParts(pack: Pack): TagPart[] {
  return tagRoles.flatMap((roles) =>
    groupParts(pack.parts.filter((part) => roles.includes(part.role))).map((group) => ({
      key: group.roles.join(),
      value: `${group.quantity > 1 ? `${group.quantity}${narrow}×${narrow}` : ''}${group.part.value.replaceAll(' ', narrow)}`,
      roles: rolesText(group.roles),
      part: group.part,
    })),
  );
}

/** The share of kits inside the band; a share that only rounds to all of them is not called all. */
export function yieldClause(pack: Pack, brief: Pick<ResolvedBrief, 'band' | 'targetHz'>): string {
  const band = percentOf(brief.band);
  if (bandOff(pack, brief.targetHz).worse <= brief.band) return `Every kit holds ${band}`;
  const share = pack.promise.yieldWithinBand;
  if (share > 0.9989) return `More than 99.9${narrow}% of kits hold ${band}`;
  if (share < 0.001) return `Hardly any kit holds ${band}`;
  return `${pack.promise.text.yield} of kits hold ${band}`;
}

/** What a screen reader hears once a new answer has settled. */
export function answerInWords(answer: SolveResponse): string {
  const first = answer.packs[0];
  if (first === undefined) return `No pack found. ${answer.advice[0]?.text ?? ''}`;
  const count = answer.packs.length === 1 ? 'One pack' : `${answer.packs.length} packs`;
  const { rate, unit } = first.promise.text;
  return `${count} on the rail. First: ${rate} ${unit}.`;
}

export function hasFlashCaution(pack: Pick<Pack, 'cautions'>): boolean {
  return pack.cautions.some((caution) => caution.code === 'flash');
}

/** A lamp on the screen may follow the kit only up to this rate, in beats a second. */
export const lampLimitHertz = 3;

const careNames: Record<Pack['careLevel'], string> = {
  'as-stocked': 'As stocked',
  'lot-checked': 'Lot-checked',
  'bench-tuned': 'Bench-tuned',
  'trimmer-fitted': 'Trimmer fitted',
};

/** "Bench-tuned", with what that means for a kit of this pack. */
export function careWords({ careLevel, join }: Pick<Pack, 'careLevel' | 'join'>): {
  name: string;
  meaning: string;
} {
  const name = careNames[careLevel];
  const timing = join === null ? 'R4 is' : 'R4A and R4B are';
  switch (careLevel) {
    case 'as-stocked':
      return { name, meaning: 'parts as printed, their tolerances counted in full' };
    case 'lot-checked':
      return { name, meaning: 'the capacitor counts by what its lots on our shelf measured' };
    case 'bench-tuned':
      return {
        name,
        meaning: `we measure the very capacitor in the bag, and ${timing} chosen for it; the values here are those of a capacitor as printed`,
      };
    case 'trimmer-fitted':
      return { name, meaning: 'you set the rate yourself once the kit runs' };
  }
}

export function makeableWords(count: number): string {
  if (count >= 500) return `more than${noBreak}500 can be made today`;
  return count === 1 ? 'only one can be made today' : `${count}${noBreak}can be made today`;
}

/** "from two AA cells, fresh to empty" – the supply range the promise covers. */
export function supplyRange(brief: ResolvedBrief): string {
  const { minVolts, maxVolts, batterySku, label } = brief.supply;
  if (minVolts === maxVolts) return `on ${label}`;
  const volts = (value: number) => `${Number(value.toPrecision(3))}${narrow}V`;
  return batterySku === null
    ? `on ${volts(minVolts)} to ${volts(maxVolts)}`
    : `on ${label} from fresh (${volts(maxVolts)}) to empty (${volts(minVolts)})`;
}

/** The rate as a clause: "blinks 90.1 times a minute", "ticks at 32.0 kHz", "blinks once in 2.00 s". */
export function rateClause(
  text: { rate: string; unit: string },
  isLight: boolean,
): { verb: string; rate: string } {
  const verb = isLight ? 'blinks' : 'ticks';
  if (text.unit === 'a minute') return { verb, rate: `${text.rate} times a minute` };
  const period = /^(m?s) a beat$/.exec(text.unit);
  if (period !== null) return { verb: `${verb} once in`, rate: `${text.rate} ${period[1] ?? 's'}` };
  return { verb: `${verb} at`, rate: `${text.rate} ${text.unit}` };
}
