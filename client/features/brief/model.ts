import { careLevels, ledColours, ranks, targetUnits } from '../../../server/contracts/brief.ts';
import type {
  CareLevel,
  Rank,
  SolveRequestInput,
  Target,
} from '../../../server/contracts/brief.ts';
import type { Shop } from '../../../server/contracts/shop.ts';
import { formatDigits, formatQuantity, readNumber } from '../../lib/format-number.ts';
import { narrow } from '../../lib/spaces.ts';

export type Unit = Target['unit'];

/** The brief while somebody types: every control's own text, so that "1." is not taken away. */
export interface BriefDraft {
  rate: string;
  unit: Unit;
  /** A colour for an LED, or `clock` for a logic output. */
  load: string;
  /** Per cent of each beat. */
  lit: string;
  /** A battery's stock number, `volts` for a typed voltage, or empty for the shop's first choice. */
  supply: string;
  volts: string;
  /** Per cent, either side. */
  band: string;
  from: string;
  to: string;
  milliamps: string;
  mounting: string;
  care: string;
  kits: string;
  rank: string;
}

export type BriefField = keyof BriefDraft;
export type BriefErrors = Partial<Record<BriefField, string>>;

export const defaultDraft: BriefDraft = {
  rate: '90',
  unit: 'per_minute',
  load: 'red',
  lit: '50',
  supply: '',
  volts: '5',
  band: '5',
  from: '0',
  to: '40',
  milliamps: '2',
  mounting: 'through-hole',
  care: 'as-stocked',
  kits: '1',
  rank: 'best-value',
};

const fields = Object.keys(defaultDraft) as BriefField[];

export const litWords = [
  { value: '10', words: 'a tenth' },
  { value: '25', words: 'a quarter' },
  { value: '33.33', words: 'a third' },
  { value: '50', words: 'half' },
  { value: '66.67', words: 'two thirds' },
  { value: '75', words: 'three quarters' },
  { value: '90', words: 'nine tenths' },
] as const;

export function isClock(draft: BriefDraft): boolean {
  return draft.load === 'clock';
}

/** Reads the brief from the page's address; what it does not name keeps its default. */
export function draftFromQuery(query: URLSearchParams): BriefDraft {
  const draft: BriefDraft = { ...defaultDraft };
  for (const field of fields) {
    const value = query.get(field);
    if (value === null || value.length > 60) continue;
    if (field === 'unit') {
      const unit = targetUnits.find((each) => each === value);
      if (unit !== undefined) draft.unit = unit;
    } else if (field === 'load') {
      const known = value === 'clock' || ledColours.some((colour) => colour === value);
      if (known) draft.load = value;
    } else {
      draft[field] = value;
    }
  }
  return draft;
}

/** The brief as the page's address: readable, and silent about defaults. */
export function queryFromDraft(draft: BriefDraft): string {
  const changed = fields.filter((field) => draft[field] !== defaultDraft[field]);
  if (changed.length === 0) return '';
  const query = new URLSearchParams({ rate: draft.rate, unit: draft.unit });
  for (const field of changed) query.set(field, draft[field]);
  return query.toString();
}

/** Which battery stands for "the shop's first choice": two AA cells where it has them. */
export function defaultBattery(shop: Shop): Shop['batteries'][number] | undefined {
  return shop.batteries.find((each) => /two AA\b/i.test(each.words)) ?? shop.batteries[0];
}

/** The rates the shop's contract takes, in whichever unit is chosen. */
const rateLimits = [1e-9, 1e9] as const;

/** Target in hertz, or NaN while the rate cannot be read. */
export function targetHertz(draft: Pick<BriefDraft, 'rate' | 'unit'>): number {
  const value = readNumber(draft.rate);
  if (!(value >= rateLimits[0] && value <= rateLimits[1])) return NaN;
  const hertz: Record<Unit, number> = {
    Hz: value,
    kHz: value * 1000,
    per_minute: value / 60,
    s: 1 / value,
    ms: 1000 / value,
  };
  return hertz[draft.unit];
}

/** "1.5 Hz · one beat lasts 667 ms" – what the typed rate comes to. */
export function rateInOtherWords(draft: BriefDraft): string {
  const hertz = targetHertz(draft);
  if (!Number.isFinite(hertz)) return '';
  const beat = isClock(draft) ? 'cycle' : 'beat';
  // Nobody says millihertz of a blinker.
  const rate =
    hertz < 1 && hertz >= 0.001
      ? `${formatDigits(hertz, 4)}${narrow}Hz`
      : formatQuantity(hertz, 'Hz', 4);
  return `${rate} · one ${beat} lasts ${formatQuantity(1 / hertz, 's', 3)}`;
}

const sentences: Partial<Record<BriefField, string>> = {
  rate: 'Type a rate above zero and not above a thousand million, such as 90 or 1.5.',
  lit: 'Type the lit share as a number from 5 to 95 per cent.',
  volts: 'Type the supply as a number from 0.5 to 60 volts.',
  band: 'Type the band as a number from 0.05 to 50 per cent.',
  from: 'Type the lowest temperature as a number from −55 to 125 °C.',
  to: 'Type the highest temperature as a number from −55 to 125 °C.',
  milliamps: 'Type the LED current as a number from 0.2 to 30 mA.',
  kits: 'Type a whole number of kits from 1 to 500.',
};

const bounds: Partial<Record<BriefField, readonly [number, number]>> = {
  rate: rateLimits,
  lit: [5, 95],
  volts: [0.5, 60],
  band: [0.05, 50],
  from: [-55, 125],
  to: [-55, 125],
  milliamps: [0.2, 30],
  kits: [1, 500],
};

function errorsOf(draft: BriefDraft): BriefErrors {
  const errors: BriefErrors = {};
  for (const [name, range] of Object.entries(bounds)) {
    const field = name as BriefField;
    if (field === 'volts' && draft.supply !== 'volts') continue;
    if (field === 'milliamps' && isClock(draft)) continue;
    const value = readNumber(draft[field]);
    const inside = value >= range[0] && value <= range[1];
    if (!inside || (field === 'kits' && !Number.isInteger(value))) errors[field] = sentences[field];
  }
  if (readNumber(draft.from) > readNumber(draft.to)) {
    errors.from ??= 'The lowest temperature is above the highest; swap the two.';
  }
  return errors;
}

function supplyOf(draft: BriefDraft, shop: Shop | undefined): SolveRequestInput['supply'] {
  if (draft.supply === 'volts') return { volts: readNumber(draft.volts) };
  if (draft.supply !== '') return { battery: draft.supply };
  const battery = shop === undefined ? undefined : defaultBattery(shop);
  return battery === undefined ? { volts: 3 } : { battery: battery.sku };
}

/** The request for the shop, or a sentence for every control that cannot be read. */
export function readDraft(
  draft: BriefDraft,
  shop: Shop | undefined,
): { request: SolveRequestInput; errors?: never } | { errors: BriefErrors; request?: never } {
  const errors = errorsOf(draft);
  if (Object.keys(errors).length > 0) return { errors };
  const colour = ledColours.find((each) => each === draft.load);
  return {
    request: {
      target: { value: readNumber(draft.rate), unit: draft.unit },
      duty: fraction(draft.lit),
      supply: supplyOf(draft, shop),
      load:
        colour === undefined
          ? { kind: 'logic' }
          : { kind: 'led', colour, amps: readNumber(draft.milliamps) / 1000 },
      band: fraction(draft.band),
      ambient: { minCelsius: readNumber(draft.from), maxCelsius: readNumber(draft.to) },
      mounting: draft.mounting === 'surface-mount' ? 'surface-mount' : 'through-hole',
      careLevel: careOf(draft),
      quantity: readNumber(draft.kits),
      rank: rankOf(draft),
    },
  };
}

export function rankOf(draft: BriefDraft): Rank {
  return ranks.find((each) => each === draft.rank) ?? 'best-value';
}

export function careOf(draft: Pick<BriefDraft, 'care'>): CareLevel {
  return careLevels.find((each) => each === draft.care) ?? 'as-stocked';
}

function fraction(percent: string): number {
  return Number((readNumber(percent) / 100).toPrecision(6));
}

/** Which control a path of the contract belongs to, for sentences that come from the server. */
export function fieldForPath(path: string): BriefField | undefined {
  const [first = '', second = ''] = path.split('.');
  const places: Record<string, BriefField> = {
    target: 'rate',
    duty: 'lit',
    supply: 'supply',
    load: second === 'amps' ? 'milliamps' : 'load',
    band: 'band',
    ambient: second === 'maxCelsius' ? 'to' : 'from',
    mounting: 'mounting',
    careLevel: 'care',
    quantity: 'kits',
    rank: 'rank',
  };
  return places[first];
}

/** Sentences from the server, each at the control it speaks of; the first one per control. */
export function errorsFromProblem(problem: {
  message: string;
  fields: readonly { path: string; message: string }[];
}): BriefErrors {
  const errors: BriefErrors = {};
  for (const { path, message } of problem.fields) {
    const field = fieldForPath(path) ?? 'rate';
    errors[field] ??= message;
  }
  return problem.fields.length === 0 ? { rate: problem.message } : errors;
}

/** The typed lit share as a fraction that can be drawn; half while it cannot be read. */
export function litFraction(draft: Pick<BriefDraft, 'lit'>): number {
  const share = readNumber(draft.lit) / 100;
  return share >= 0.05 && share <= 0.95 ? share : 0.5;
}
