import type { PackRole } from '../contracts/packs.ts';
import type { TimingParts } from '../engine/search/candidate.ts';
import type { RankedPack } from '../engine/search/promise.ts';
import type { BriefInHand } from './brief.ts';
import { partsOf, type CataloguePart, type PartOf } from './catalogue.ts';
import type { PartDemand } from './stock.ts';

/** A pack as nothing but its parts: part ids by role, and how two timing resistors are joined. */
export interface PackChoice {
  parts: Partial<Record<PackRole, number>>;
  join: 'series' | 'parallel' | null;
}

/** What goes into every kit of a brief beside the timing parts. */
export interface Accessories {
  decoupling: PartOf<'capacitor'> | null;
  boardFor: (sections: number) => PartOf<'board'> | null;
}

/** Rated voltage of the decoupling capacitors less their margin. */
const mostVolts = 40;

/** Supply decoupling: 100 nF next to the comparator (facts collected from makers' guidelines). */
const decouplingFarads = 100e-9;

/** Chooses decoupling capacitor and boards from stock for a brief; null where the shelf has none. */
export function chooseAccessories(
  catalogue: readonly CataloguePart[],
  { brief }: BriefInHand,
): Accessories {
  const stocked = catalogue.filter(
    (part) => part.mounting === brief.mounting && part.available >= brief.quantity,
  );
  const decoupling =
    partsOf(stocked, 'capacitor').find(
      ({ facts }) =>
        facts.dielectric === 'X7R' &&
        Math.abs(facts.farads / decouplingFarads - 1) < 0.01 &&
        facts.ratedVolts >= 1.25 * brief.supply.maxVolts,
    ) ?? null;
  const boards = partsOf(stocked, 'board');
  return {
    decoupling,
    boardFor: (sections) => boards.find(({ facts }) => facts.sections === sections) ?? null,
  };
}

/** The choice of parts behind a found pack. */
export function choiceOf(
  pack: RankedPack,
  inHand: BriefInHand,
  accessories: Accessories,
): PackChoice {
  const { head, capacitor } = pack.frame;
  const { thresholds } = head;
  const parts: PackChoice['parts'] = {
    U1: head.comparator.id,
    R1: thresholds.r1.id,
    R2: thresholds.r2.id,
    R3: thresholds.r3.id,
    ...timingRoles(pack.timing),
    C1: capacitor.id,
  };
  if (head.pullUp) parts.RP = head.pullUp.id;
  if (head.idle) Object.assign(parts, { R5: head.idle.id, R6: head.idle.id });
  if (accessories.decoupling) parts.C2 = accessories.decoupling.id;
  if (inHand.led && head.ledResistor) {
    parts.LED = inHand.led.id;
    parts.RL = head.ledResistor.id;
  }
  const board = accessories.boardFor(head.comparator.sections);
  if (board) parts.PCB = board.id;
  if (inHand.holder) parts.BH = inHand.holder.id;
  if (inHand.battery) parts.BAT = inHand.battery.id;
  return { parts, join: pack.timing.kind === 'single' ? pack.timing.join : null };
}

/** A trimmer stands in series with R4; steering diodes and resistors go by C and D. */
function timingRoles(timing: TimingParts): PackChoice['parts'] {
  switch (timing.kind) {
    case 'single':
      return timing.second === null
        ? { R4: timing.first.id }
        : { R4A: timing.first.id, R4B: timing.second.id };
    case 'steered':
      return {
        RC: timing.charge.id,
        RD: timing.discharge.id,
        DC: timing.diode.id,
        DD: timing.diode.id,
      };
    case 'trimmed':
      return { R4: timing.fixed.id, RV: timing.trimmer.id };
  }
}

/** What one kit takes from the shelves. A value used by two roles appears twice. */
export function demandOfChoice(choice: PackChoice): (PartDemand & { role: PackRole })[] {
  return (Object.entries(choice.parts) as [PackRole, number][]).map(([role, partId]) => ({
    role,
    partId,
    quantity: 1,
  }));
}

/** A sentence when the shelves lack something every kit of the brief needs; null otherwise. */
export function missingAccessory(inHand: BriefInHand, accessories: Accessories): string | null {
  const { brief, led, battery, holder } = inHand;
  const short = (part: CataloguePart | null, what: string) => {
    if (part === null) {
      if (brief.supply.maxVolts > mostVolts) {
        return `The shop’s parts stand ${mostVolts}\u202fV at most; take a lower supply.`;
      }
      const often = brief.quantity === 1 ? '' : ` ${brief.quantity} times`;
      return `The shelves do not hold ${what}${often} today.`;
    }
    if (part.available >= brief.quantity) return null;
    const left = part.available;
    return `Only ${left} of ${what} ${left === 1 ? 'is' : 'are'} left today and the brief asks for ${brief.quantity}.`;
  };
  return (
    short(accessories.decoupling, 'the decoupling capacitor') ??
    (led === null ? null : short(led, led.facts.name)) ??
    (battery === null ? null : (short(battery, battery.facts.name) ?? short(holder, 'the holder')))
  );
}
