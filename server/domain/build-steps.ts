import type { CareLevel } from '../contracts/brief.ts';
import type { BuildSheet } from '../contracts/orders.ts';
import type { PackPart, PackRole } from '../contracts/packs.ts';
import { formatOhms } from '../engine/si-format.ts';
import { sectionsOf, sectionWords } from './schematic-pieces.ts';
import { significant, thin } from './wording.ts';

type Step = BuildSheet['steps'][number];

/** What the order of assembly is told from. */
export interface BuildFacts {
  parts: readonly PackPart[];
  careLevel: CareLevel;
  /** True where a second section of the comparator drives the LED. */
  buffered: boolean;
  /** The rate promised, in hertz and in the maker's own unit. */
  frequencyHz: number;
  rate: string;
}

/**
 * The order of assembly: lowest parts first, polarised parts with their mark, then power, and last
 * of all the setting of a trimmer. Every part but the board is placed once.
 */
export function buildSteps(facts: BuildFacts): Step[] {
  return [
    layOutStep(facts),
    resistorStep(facts),
    ...diodeStep(facts),
    ceramicStep(facts),
    comparatorStep(facts),
    ...trimmerStep(facts),
    ...polarisedSteps(facts),
    powerStep(facts),
    ...settingStep(facts),
  ];
}

function rolesWhere({ parts }: BuildFacts, wanted: (part: PackPart) => boolean): PackRole[] {
  return parts.filter(wanted).map(({ role }) => role);
}

/** "R4", or "R4A and R4B". */
function timingNames(facts: BuildFacts): string {
  return rolesWhere(facts, ({ role }) => /^R4[AB]?$/.test(role)).join(' and ');
}

/** What the care level means for the one who builds. */
function careText(facts: BuildFacts): string {
  const timing = timingNames(facts);
  const were = timing.includes('and') ? 'were' : 'was';
  switch (facts.careLevel) {
    case 'as-stocked':
      return '';
    case 'lot-checked':
      return ' This kit is lot-checked: the rate is worked out from what the lot of its C1 measured on average, so C1 may read a little beside its print. That is right.';
    case 'bench-tuned':
      return ` This kit is bench-tuned: ${timing} ${were} chosen for the very C1 in this bag, so what is printed on ${timing} may differ from the pack page, and from other kits of the order. Keep each bag’s parts together.`;
    case 'trimmer-fitted':
      return ' This kit has a trimmer: you set its rate yourself, at the end.';
  }
}

function layOutStep(facts: BuildFacts): Step {
  return {
    title: 'Lay everything out',
    text: `Check each part against the list. Read the bands or the code, or measure; put anything doubtful aside and ask us.${careText(facts)}`,
    roles: [],
  };
}

function resistorStep(facts: BuildFacts): Step {
  const chips = facts.parts.some(
    (part) => part.mounting === 'surface-mount' && part.kind === 'resistor',
  );
  return {
    title: 'Resistors',
    text: chips
      ? 'Tin one pad, set the chip with tweezers, solder the other end, then go back to the first. They fit either way round.'
      : 'Bend the leads, push each to the board, solder, trim. They fit either way round.',
    roles: rolesWhere(facts, ({ kind }) => kind === 'resistor'),
  };
}

function diodeStep(facts: BuildFacts): Step[] {
  const roles = rolesWhere(facts, ({ kind }) => kind === 'diode');
  if (roles.length === 0) return [];
  return [
    {
      title: 'Diodes',
      text: 'The band is the cathode. DC and DD are alike but face opposite ways: the band of DC points towards RC and C1, the band of DD towards the output. Match each band to the bar on the board; one the wrong way round stops the kit.',
      roles,
    },
  ];
}

function ceramicStep(facts: BuildFacts): Step {
  return {
    title: 'Small capacitors',
    text: 'C2 sits next to the comparator. Ceramic and film capacitors fit either way round.',
    roles: rolesWhere(
      facts,
      ({ kind, dielectric }) => kind === 'capacitor' && dielectric !== 'electrolytic',
    ),
  };
}

function comparatorStep(facts: BuildFacts): Step {
  const { timing, driver, idle } = sectionsOf(facts);
  const drives =
    driver === null ? '' : ` Section ${timing} makes the beat, ${driver} drives the LED.`;
  const rests =
    idle.length === 0
      ? ''
      : ` ${sectionWords(idle)} ${idle.length === 1 ? 'is' : 'are'} not used: R5 holds the inverting ${idle.length === 1 ? 'input' : 'inputs'} at the supply and R6 the non-inverting at ground, so that nothing there swings. Leave the ${idle.length === 1 ? 'output' : 'outputs'} open.`;
  return {
    title: 'Comparator',
    text: `Find pin 1 at the dot or notch and match it to the mark on the board before you solder.${drives}${rests}`,
    roles: rolesWhere(facts, ({ kind }) => kind === 'comparator'),
  };
}

function trimmerStep(facts: BuildFacts): Step[] {
  const trimmer = facts.parts.find(({ kind }) => kind === 'trimmer');
  if (!trimmer) return [];
  const half =
    trimmer.ohms === undefined ? 'half its value' : `about ${formatOhms(trimmer.ohms / 2, 2)}`;
  return [
    {
      title: 'Trimmer',
      text: `Before you solder RV, turn it to the middle: a meter shows ${half} between its wiper and either end. Its three pins fit one way only.`,
      roles: [trimmer.role],
    },
  ];
}

function polarisedSteps(facts: BuildFacts): Step[] {
  const electrolytic = rolesWhere(facts, ({ dielectric }) => dielectric === 'electrolytic');
  const led = rolesWhere(facts, ({ kind }) => kind === 'led');
  const steps: Step[] = [
    {
      title: 'Electrolytic capacitor',
      text: 'The stripe marks minus: it goes to ground.',
      roles: electrolytic,
    },
    {
      title: 'LED',
      text: 'The short lead, or the flat on the rim, is the cathode: it goes to ground.',
      roles: led,
    },
  ];
  return steps.filter(({ roles }) => roles.length > 0);
}

function powerStep(facts: BuildFacts): Step {
  const roles = rolesWhere(facts, ({ kind }) => kind === 'holder' || kind === 'battery');
  return {
    title: 'Look it over, then power',
    text:
      roles.length > 0
        ? 'Look for bridges and dry joints. Solder the holder’s red lead to + and black to −, without cells in it. Fit the cells last.'
        : `Look for bridges and dry joints. Connect the supply with its polarity checked, current limited to 50${thin}mA if you can.`,
    roles,
  };
}

/** Beats slower than this are counted by eye, faster ones are metered. */
export const countedBelowHertz = 2;

function settingStep(facts: BuildFacts): Step[] {
  if (facts.careLevel !== 'trimmer-fitted') return [];
  return [
    {
      title: 'Set the rate',
      text: `Turn RV until the kit makes ${facts.rate}. ${howToMeasure(facts.frequencyHz)} Less resistance makes it faster. Turn a little, let two beats pass, measure again; set it at the temperature it will live in, then leave RV alone.`,
      roles: rolesWhere(facts, ({ kind }) => kind === 'trimmer'),
    },
  ];
}

/** How to measure a rate with what a maker has at hand: a clock for slow beats, a meter for fast. */
function howToMeasure(frequencyHz: number): string {
  if (frequencyHz >= countedBelowHertz) return 'Put a meter on Hz between the output and ground.';
  const beats = Math.max(10, Math.round(30 * frequencyHz));
  const seconds = significant(beats / frequencyHz, 3);
  return `Count by a clock: ${beats} beats take ${seconds}${thin}s when the first one counts as nought.`;
}
