import type { Caution } from '../contracts/packs.ts';
import { significant, thin } from './wording.ts';

/** Flashing between these rates can trigger seizures (sources differ; the widest range is used). */
export const flashRange = { aboveHz: 3, upToHz: 60 } as const;

/** What decides a kit's cautions. */
export interface CautionFacts {
  frequencyHz: number;
  minHz: number;
  maxHz: number;
  hasLed: boolean;
  hasBattery: boolean;
  /** Volts at which the LED goes dark before the cells are empty; null where it does not. */
  darkBelowVolts: number | null;
  hasPolarised: boolean;
}

/**
 * True when any kit of the pack may flash above 3 and up to 60 times a second: the upper end of the
 * guaranteed band is above 3 Hz and its lower end not above 60 Hz.
 */
export function mayTriggerSeizures(facts: { minHz: number; maxHz: number }): boolean {
  return facts.maxHz > flashRange.aboveHz && facts.minHz <= flashRange.upToHz;
}

/**
 * The cautions of a kit, weightiest first. They inform; they do not replace local codes or licensed
 * practice. Sources: charities' and W3C's texts on flashing light, health authorities on soldering.
 */
export function cautionsFor(facts: CautionFacts): Caution[] {
  const cautions: Caution[] = [];
  const say = (code: Caution['code'], text: string, mustAcknowledge = false) =>
    cautions.push({ code, text, mustAcknowledge });
  if (mayTriggerSeizures(facts)) {
    const rate = significant(facts.frequencyHz, 3);
    const light = facts.hasLed ? 'This kit flashes' : 'A light driven by this kit flashes';
    say(
      'flash',
      `${light} ${rate} times a second. Flashing between 3 and 60${thin}Hz can trigger seizures in people ` +
        'with photosensitive epilepsy. Do not stare at it, hold it close to the eyes or use several at once; ' +
        'keep it out of children’s rooms; stop at once if anyone feels unwell.',
      true,
    );
  }
  say(
    'low-voltage-only',
    'Run it from the batteries or the low voltage it was made for, never from the mains.',
  );
  say(
    'not-for-safety',
    'Not for life support, medical use, vehicles, aviation or anything that keeps people safe.',
  );
  say(
    'soldering',
    'A soldering iron burns and flux fume harms the lungs: air the room, keep your head out of the fume, ' +
      'wear eye protection when you trim leads, wash your hands afterwards.',
  );
  if (facts.hasLed || facts.hasPolarised) {
    say(
      'polarity',
      'The LED, electrolytic capacitors and the comparator have a right way round; check before power.',
    );
  }
  if (facts.hasBattery) {
    say(
      'battery',
      'Fit alkaline AA or AAA cells only, all of one age; never solder to a cell, short it or charge it.' +
        (facts.darkBelowVolts === null
          ? ''
          : ` The LED dims as they run down and is dark below about ${significant(facts.darkBelowVolts, 2)}${thin}V, before they are empty.`),
    );
  }
  say(
    'small-parts',
    'Small parts: keep away from young children. For makers of 14 and older; not a toy.',
  );
  return cautions;
}
