import type { Circuit } from '../engine/circuit.ts';
import { supplyCurrent } from '../engine/supply-current.ts';
import { formatSi } from '../engine/si-format.ts';
import type { PartOf } from './catalogue.ts';
import { significant, thin } from './wording.ts';

export interface SupplyCauses {
  causes: { code: string; label: string; amps: number }[];
  totalAmps: number;
  /** How long the cells last at the average current; null without cells. */
  batteryHours: number | null;
  text: string;
}

const hoursPerDay = 24;
const daysPerYear = 365.25;
/** Alkaline cells keep about this long unused; common practice, no source. */
const shelfYears = 7;

/**
 * Average supply current of a kit by where it goes, and battery life as capacity over current. The
 * capacity holds for a light load at room temperature; life is never said to exceed the cells' own
 * shelf life. `quiescentAmps` is the whole package's.
 */
export function supplyCauses(
  circuit: Circuit,
  quiescentAmps: number,
  battery: PartOf<'battery'> | null,
): SupplyCauses {
  const current = supplyCurrent(circuit, quiescentAmps);
  if (current.kind !== 'supply-current') throw new Error(current.reason);
  const causes = [
    { code: 'load', label: 'LED', amps: current.loadAmps },
    { code: 'comparator', label: 'Comparator itself', amps: current.quiescentAmps },
    { code: 'thresholds', label: 'Thresholds R1–R3', amps: current.thresholdAmps },
    { code: 'timing', label: 'Charging C1', amps: current.timingAmps },
    { code: 'pull-up', label: 'Pull-up', amps: current.pullUpAmps },
  ];
  const batteryHours =
    battery === null
      ? null
      : Math.min(
          battery.facts.capacityAmpHours / current.totalAmps,
          shelfYears * daysPerYear * hoursPerDay,
        );
  const average = `${formatSi(current.totalAmps, 'A', 2)} on average`;
  return {
    causes: causes.filter(({ amps }) => amps > 0).sort((a, b) => b.amps - a.amps),
    totalAmps: current.totalAmps,
    batteryHours,
    text:
      batteryHours === null
        ? `${average}.`
        : `${average}: a fresh set of cells lasts about ${durationWords(batteryHours)}.`,
  };
}

/** A long time in its natural unit, with no more figures than a battery supports. */
function durationWords(hours: number): string {
  const days = hours / hoursPerDay;
  if (days >= (shelfYears - 0.01) * daysPerYear) return 'as long as they keep in the drawer';
  if (days >= 2 * daysPerYear) return `${significant(days / daysPerYear, 2)} years`;
  if (days >= 60) return `${significant(days / (daysPerYear / 12), 2)} months`;
  if (days >= 3) return `${significant(days, 2)} days`;
  return `${significant(hours, 2)}${thin}h`;
}
