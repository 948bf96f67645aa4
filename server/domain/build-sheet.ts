import type { PackPart } from '../contracts/packs.ts';
import type { BuildSheet } from '../contracts/orders.ts';
import { analyseCycle } from '../engine/cycle.ts';
import type { Circuit } from '../engine/circuit.ts';
import { formatSi } from '../engine/si-format.ts';

type Step = BuildSheet['steps'][number];
type Reading = BuildSheet['readings'][number];

/** The order of assembly: lowest parts first, polarised parts with their mark, power last. */
export function buildSteps(parts: readonly PackPart[]): Step[] {
  const roles = (wanted: (part: PackPart) => boolean) =>
    parts.filter(wanted).map((part) => part.role);
  const chips = parts.some((part) => part.mounting === 'surface-mount' && part.kind === 'resistor');
  const idle = parts.some((part) => (part.sections ?? 1) > 1);
  const steps: Step[] = [
    {
      title: 'Lay everything out',
      text: 'Check each part against the list. Read the bands or the code, or measure; put anything doubtful aside and ask us.',
      roles: [],
    },
    {
      title: 'Resistors',
      text: chips
        ? 'Tin one pad, set the chip with tweezers, solder the other end, then go back to the first. They fit either way round.'
        : 'Bend the leads, push each to the board, solder, trim. They fit either way round.',
      roles: roles((part) => part.kind === 'resistor'),
    },
    {
      title: 'Small capacitors',
      text: 'C2 sits next to the comparator. Ceramic and film capacitors fit either way round.',
      roles: roles((part) => part.kind === 'capacitor' && part.dielectric !== 'electrolytic'),
    },
    {
      title: 'Comparator',
      text: idle
        ? 'Find pin 1 at the dot or notch and match it to the mark on the board before you solder. The board holds the inputs of the idle sections at clearly different levels; leave their outputs open.'
        : 'Find pin 1 at the dot or notch and match it to the mark on the board before you solder.',
      roles: roles((part) => part.kind === 'comparator'),
    },
  ];
  const electrolytic = roles((part) => part.dielectric === 'electrolytic');
  if (electrolytic.length > 0) {
    steps.push({
      title: 'Electrolytic capacitor',
      text: 'The stripe marks minus: it goes to ground.',
      roles: electrolytic,
    });
  }
  const led = roles((part) => part.kind === 'led');
  if (led.length > 0) {
    steps.push({
      title: 'LED',
      text: 'The short lead, or the flat on the rim, is the cathode: it goes to ground.',
      roles: led,
    });
  }
  const power = roles((part) => part.kind === 'holder' || part.kind === 'battery');
  steps.push({
    title: 'Look it over, then power',
    text:
      power.length > 0
        ? 'Look for bridges and dry joints. Solder the holder’s red lead to + and black to −, without cells in it. Fit the cells last.'
        : 'Look for bridges and dry joints. Connect the supply with its polarity checked, current limited to 50\u202fmA if you can.',
    roles: power,
  });
  return steps;
}

/** What each test point should read, from the solved circuit at nominal values. */
export function expectedReadings(circuit: Circuit, rate: string): Reading[] {
  const volts = (value: number) => formatSi(value, 'V', 3);
  const readings: Reading[] = [
    {
      point: 'Supply',
      expect: volts(circuit.supplyVolts),
      how: 'Meter on DC volts, between + and ground.',
    },
  ];
  const cycle = analyseCycle(circuit);
  if (cycle.kind !== 'oscillates') return readings;
  const slow = cycle.frequencyHz < 2;
  readings.push(
    {
      point: 'Non-inverting input (R1, R2, R3 meet)',
      expect: `${volts(cycle.thresholdHighVolts)} while the output is high, ${volts(cycle.thresholdLowVolts)} while low`,
      how: slow
        ? 'Meter on DC volts; watch it jump with each beat.'
        : 'Oscilloscope; a meter shows about the mean of the two.',
    },
    {
      point: 'C1',
      expect: `climbs and falls between ${volts(cycle.valleyVolts)} and ${volts(cycle.peakVolts)}`,
      how: 'High-resistance probe (10\u202fMΩ or more): a lesser one slows the kit.',
    },
    {
      point: 'Output',
      expect: rate,
      how: slow
        ? 'Count beats for a minute by a clock; one beat more or less is the counting error.'
        : 'Meter on Hz, or an oscilloscope.',
    },
    {
      point: 'First beat after power-on',
      expect: `${formatSi(cycle.firstHighSeconds, 's', 3)} high, longer than the following ones`,
      how: 'The capacitor starts empty; this is right.',
    },
  );
  return readings;
}
