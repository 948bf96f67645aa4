import type { PackRole } from '../contracts/packs.ts';
import { formatOhms } from '../engine/si-format.ts';
import { sectionWords, type SchematicFacts, type Sections } from './schematic-pieces.ts';

/** The connections of a schematic in words, a sentence for each. */
export function describeSchematic(
  facts: SchematicFacts,
  has: (role: PackRole) => boolean,
  sections: Sections,
): string[] {
  const { timing: main } = sections;
  const single = sections.driver === null && sections.idle.length === 0;
  return [
    `The supply is ${facts.supplyLabel}.`,
    ...(single ? [] : [`${main} is the section that makes the beat.`]),
    `R1 runs from the supply to the non-inverting input of ${main}, R2 from there to ground.`,
    `R3 runs from the output of ${main} back to the non-inverting input.`,
    ...timingWords(facts, has, main),
    'C1 runs from the inverting input to ground.',
    ...(has('RP') ? ['RP runs from the supply to the output.'] : []),
    ...loadWords(has, sections),
    ...idleWords(sections),
    ...(has('C2') ? ['C2 runs from the supply to ground, close to U1.'] : []),
    'U1 takes the supply at its supply pin and ground at its ground pin.',
  ];
}

function timingWords(
  { join, timingOhms }: SchematicFacts,
  has: (role: PackRole) => boolean,
  main: string,
): string[] {
  const ends = `the output of ${main} to its inverting input`;
  if (has('RC')) {
    return [
      `RC and DC, one after the other, run from ${ends} and charge C1; DC’s anode is on the output’s side, its cathode towards C1.`,
      `RD and DD, one after the other, run beside them and discharge C1; DD’s anode is towards C1, its cathode on the output’s side.`,
    ];
  }
  if (has('RV')) {
    const together = timingOhms === null ? '' : `, set to ${formatOhms(timingOhms, 3)} together`;
    return [
      `R4 and the trimmer RV, one after the other${together}, run from ${ends}; RV’s wiper is joined to one of its ends.`,
    ];
  }
  if (join === null) return [`R4 runs from ${ends}.`];
  const how = join === 'series' ? 'one after the other' : 'side by side';
  return [`R4A and R4B, ${how}, run from ${ends}.`];
}

function loadWords(has: (role: PackRole) => boolean, { timing, driver }: Sections): string[] {
  if (!has('LED')) return [];
  const from = driver ?? timing;
  return [
    ...(driver === null
      ? []
      : [
          `${driver} drives the LED: its non-inverting input takes the output of ${timing}, its inverting input the node where R1, R2 and R3 meet.`,
        ]),
    `RL and the LED run from the output of ${from} to ground; the LED’s cathode is at ground.`,
  ];
}

function idleWords({ idle }: Sections): string[] {
  if (idle.length === 0) return [];
  const [input, output] = idle.length === 1 ? ['input', 'output is'] : ['inputs', 'outputs are'];
  return [
    `${sectionWords(idle)} ${idle.length === 1 ? 'is' : 'are'} idle: R5 runs from the supply to the inverting ${input}, R6 from ground to the non-inverting ${input}; the ${output} left open.`,
  ];
}
