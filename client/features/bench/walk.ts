import type { BenchOrder, Pick, Take } from '../../../server/contracts/bench.ts';
import type { PackPart } from '../../../server/contracts/packs.ts';
import type { DrawablePart } from '../../ui/part-drawing.tsx';

export type Stage = 'unclaimed' | 'elsewhere' | 'walk' | 'tune' | 'bag' | 'ship' | 'shipped';

export function isTaken(pick: Pick): boolean {
  return pick.picked >= pick.quantity;
}

/** Where this order stands for the packer who looks at it. */
export function stageOf(order: BenchOrder): Stage {
  if (order.status === 'shipped') return 'shipped';
  if (order.claimedBy === null || order.status === 'paid') return 'unclaimed';
  if (!order.mine) return 'elsewhere';
  if (order.status === 'packed') return 'ship';
  if (walkablePicks(order).some((pick) => !isTaken(pick))) return 'walk';
  return nextKit(order) === null ? 'bag' : 'tune';
}

type Line = BenchOrder['lines'][number];

/** One kit under the meter. */
export interface Kit {
  line: Line;
  unit: number;
}

/** The first kit that still has to be tuned; null when there is none. */
export function nextKit(order: BenchOrder): Kit | null {
  for (const line of order.lines) {
    const open = line.tuning?.units.find((kit) => kit.farads === null);
    if (open !== undefined) return { line, unit: open.unit };
  }
  return null;
}

export function isTimingRole(role: string): boolean {
  return ['R4', 'R4A', 'R4B'].includes(role);
}

/** The stops to make now: which R4 to take shows only when the capacitors are measured. */
export function walkablePicks(order: BenchOrder): Pick[] {
  if (nextKit(order) === null) return order.picks;
  return order.picks.filter(({ roles }) => roles.length === 0 || !roles.every(isTimingRole));
}

/** What the tray holds once these parts are taken, stop by stop. */
export function picksWith(
  order: BenchOrder,
  parts: readonly Take[],
): { id: string; quantity: number }[] {
  const more = new Map<Pick, number>();
  for (const part of parts) {
    const stop = order.picks.find(
      (pick) => pick.sku === part.sku && pick.picked + (more.get(pick) ?? 0) < pick.quantity,
    );
    if (stop !== undefined) more.set(stop, (more.get(stop) ?? 0) + 1);
  }
  return [...more].map(([pick, pieces]) => ({ id: pick.id, quantity: pick.picked + pieces }));
}

/** The next stop to make: the first open one after the given stop, then from the start again. */
export function nextStop(picks: readonly Pick[], after: string | null): Pick | null {
  const from = after === null ? 0 : picks.findIndex((pick) => pick.id === after) + 1;
  const round = [...picks.slice(from), ...picks.slice(0, from)];
  return round.find((pick) => !isTaken(pick)) ?? null;
}

/** The stop that "undo" takes back: the last one made here, else the last of the walk that is done. */
export function lastStop(picks: readonly Pick[], made: readonly string[]): Pick | null {
  const taken = picks.filter(isTaken);
  const recent = made.findLast((id) => taken.some((pick) => pick.id === id));
  return taken.find((pick) => pick.id === recent) ?? taken.at(-1) ?? null;
}

/** The order as it will be once this pick is known to the server. */
export function withPicked(order: BenchOrder, id: string, quantity: number): BenchOrder {
  const picks = order.picks.map((pick) => (pick.id === id ? { ...pick, picked: quantity } : pick));
  return { ...order, picks };
}

export type Scan =
  { kind: 'right' } | { kind: 'empty' } | { kind: 'wrong' | 'unclear'; sentence: string };

const plain = (code: string) => code.toUpperCase().replaceAll(/[^A-Z0-9]/g, '');
const names = (pick: Pick, code: string) => plain(pick.bin) === code || plain(pick.sku) === code;

/** Whether this stop's bin holds another part of the same walk, so that its code does not tell them apart. */
export function sharesBin(stop: Pick, picks: readonly Pick[]): boolean {
  const bin = plain(stop.bin);
  return picks.some((pick) => plain(pick.bin) === bin && pick.sku !== stop.sku);
}

/** What a scanned or typed code means at this stop; scanners differ in case, spaces and dashes. */
export function readScan(text: string, stop: Pick, picks: readonly Pick[]): Scan {
  const code = plain(text);
  if (code === '') return { kind: 'empty' };
  const isShared = sharesBin(stop, picks);
  if (isShared && plain(stop.bin) === code) {
    const sentence = `${stop.bin} holds several values of this walk; scan the part, ${stop.sku}.`;
    return { kind: 'unclear', sentence };
  }
  if (names(stop, code)) return { kind: 'right' };
  const other = picks.findIndex((pick) => names(pick, code));
  const said = text.trim().slice(0, 40);
  const found =
    other >= 0 ? `${said} is stop ${other + 1} of this walk.` : `${said} is not on this walk.`;
  const wanted = isShared ? stop.sku : `bin ${stop.bin} or ${stop.sku}`;
  return { kind: 'wrong', sentence: `${found} This stop wants ${wanted}.` };
}

/** The pick with what the lines know of its looks. */
export function drawableOf(pick: Pick, lines: BenchOrder['lines']): DrawablePart {
  const looks: PackPart | undefined = lines
    .flatMap((line) => [...line.parts, ...takenParts(line)])
    .find((part) => part.sku === pick.sku);
  return { ...looks, kind: pick.kind, marking: pick.marking };
}

/** The timing parts of the kits of a line that are tuned. */
function takenParts({ tuning }: Line): Take[] {
  return tuning?.units.flatMap((kit) => (kit.farads === null ? [] : kit.take)) ?? [];
}
