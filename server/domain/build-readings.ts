import type { BuildSheet } from '../contracts/orders.ts';
import type { PackPart } from '../contracts/packs.ts';
import { analyseCycle, type Cycle } from '../engine/cycle.ts';
import type { Circuit } from '../engine/circuit.ts';
import { formatOhms, formatSi } from '../engine/si-format.ts';
import { countedBelowHertz } from './build-steps.ts';
import { sectionsOf } from './schematic-pieces.ts';

type Reading = BuildSheet['readings'][number];

const volts = (value: number) => formatSi(value, 'V', 3);

/**
 * What each test point should read, from the solved circuit at nominal values. `rate` is the promised
 * rate in the maker's unit. Only the supply where the circuit does not oscillate.
 */
export function expectedReadings(
  circuit: Circuit,
  parts: readonly PackPart[],
  rate: string,
): Reading[] {
  const supply: Reading = {
    point: 'Supply',
    expect: volts(circuit.supplyVolts),
    how: 'Meter on DC volts, between + and ground.',
  };
  const cycle = analyseCycle(circuit);
  if (cycle.kind !== 'oscillates') return [supply];
  const names = sectionsOf({ parts, buffered: circuit.load?.buffered === true });
  return [
    supply,
    ...idleReading(circuit, names.idle.length),
    ...beatReadings(cycle, rate),
    ...driverReading(circuit, names.driver),
    {
      point: 'First beat after power-on',
      expect: `${formatSi(cycle.firstHighSeconds, 's', 3)} high, longer than the following ones`,
      how: 'The capacitor starts empty; this is right.',
    },
    ...trimmerReading(circuit, parts),
  ];
}

function beatReadings(cycle: Cycle, rate: string): Reading[] {
  const slow = cycle.frequencyHz < countedBelowHertz;
  return [
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
  ];
}

/** The driver follows the output; under the LED's current it ends a little below the supply. */
function driverReading(
  { supplyVolts, comparator, load }: Circuit,
  driver: string | null,
): Reading[] {
  if (driver === null || !load) return [];
  const amps = (supplyVolts - load.volts) / (load.ohms + comparator.highOhms);
  const high = supplyVolts - amps * comparator.highOhms;
  return [
    {
      point: `LED driver’s output (${driver})`,
      expect: `follows the output: about ${volts(high)} while lit, near 0\u202fV while dark`,
      how: `Meter on DC volts or an oscilloscope. RL then carries ${formatSi(amps, 'A', 2)}, that is ${volts(amps * load.ohms)} across it.`,
    },
  ];
}

function idleReading({ supplyVolts }: Circuit, count: number): Reading[] {
  if (count === 0) return [];
  const inputs = count === 1 ? 'Inputs of the idle section' : 'Inputs of the idle sections';
  return [
    {
      point: `${inputs} (R5, R6)`,
      expect: `inverting ${volts(supplyVolts)}, non-inverting 0\u202fV, both at rest`,
      how: 'Meter on DC volts.',
    },
  ];
}

function trimmerReading({ timing }: Circuit, parts: readonly PackPart[]): Reading[] {
  if (timing.kind !== 'single' || !parts.some(({ role }) => role === 'RV')) return [];
  return [
    {
      point: 'R4 and RV together, once set',
      expect: `about ${formatOhms(timing.ohms, 3)}`,
      how: 'Meter on ohms, power off and C1 discharged. C1’s tolerance moves it: set RV by the rate, not by this figure.',
    },
  ];
}
