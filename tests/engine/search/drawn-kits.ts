import { createCircuit, type Circuit } from '../../../server/engine/circuit.ts';
import { analyseCycle } from '../../../server/engine/cycle.ts';
import type { Candidate } from '../../../server/engine/search/candidate.ts';
import type {
  SearchBrief,
  StockedCapacitor,
  StockedResistor,
  StockedTrimmer,
} from '../../../server/engine/search/shelf.ts';

/** A number between two, anyhow. */
export type Draw = (low: number, high: number) => number;

/** Where a kit is used. */
export interface Place {
  celsius: number;
  volts: number;
}

interface Drifting {
  ohms: number;
  temperatureCoefficientPerKelvin: number;
}

/** A part as it came out of its bin: its value at 25 °C. */
interface Piece extends Drifting {
  ohms: number;
}

/** The very parts of one kit. All that the catalogue leaves open is fixed by a draw. */
export interface Kit {
  candidate: Candidate;
  thresholds: [Piece, Piece, Piece];
  /** Timing resistors; charge and discharge when steered, fixed and trimmer when trimmed. */
  timing: Piece[];
  farads: number;
  /** Further change of the capacitance over the temperature range, as a fraction. */
  dielectric: number;
  strayFarads: number;
  outputFactor: number;
  offsetVolts: number;
  biasAmps: number;
  delayShare: number;
  forwardVolts: number;
  saturationFactor: number;
}

function piece(part: StockedResistor | StockedTrimmer, draw: Draw): Piece {
  return { ...part, ohms: part.ohms * (1 + part.tolerance * draw(-1, 1)) };
}

/** Draws a capacitance: anywhere within the tolerance, or normally where the lots are known. */
function drawFarads(part: StockedCapacitor, draw: Draw, normal: () => number): number {
  const { farads, tolerance, deviation } = part;
  if (deviation === null) return farads * (1 + tolerance * draw(-1, 1));
  let away = deviation * normal();
  while (Math.abs(away) > tolerance) away = deviation * normal();
  return farads * (1 + away);
}

/** Draws the parts of one kit of a pack. */
export function drawKit(
  candidate: Candidate,
  brief: SearchBrief,
  draw: Draw,
  normal: () => number,
): Kit {
  const { comparator, thresholds } = candidate.frame.head;
  const { capacitor } = candidate.frame;
  const { load } = brief;
  return {
    candidate,
    thresholds: [
      piece(thresholds.r1, draw),
      piece(thresholds.r2, draw),
      piece(thresholds.r3, draw),
    ],
    timing: timingOf(candidate).map((part) => piece(part, draw)),
    farads: drawFarads(capacitor, draw, normal),
    dielectric: capacitor.temperatureSpread * draw(-1, 1),
    strayFarads: draw(0, 5e-12),
    outputFactor: draw(0.5, 2),
    offsetVolts: comparator.maxOffsetVolts * draw(-1, 1),
    biasAmps: comparator.maxInputBiasAmps * draw(-1, 1),
    delayShare: draw(0, 1),
    forwardVolts: load === null ? 0 : draw(load.minForwardVolts, load.maxForwardVolts),
    saturationFactor: 2 ** draw(-1, 1),
  };
}

function timingOf({ timing }: Candidate): (StockedResistor | StockedTrimmer)[] {
  if (timing.kind === 'steered') return [timing.charge, timing.discharge];
  if (timing.kind === 'trimmed') return [timing.fixed, timing.trimmer];
  return timing.second === null ? [timing.first] : [timing.first, timing.second];
}

/** The rate of a kit at a place by the full model; 0 when it stands still. */
export function kitHz(kit: Kit, brief: SearchBrief, place: Place): number {
  const cycle = analyseCycle(kitCircuit(kit, brief, place));
  return cycle.kind === 'oscillates' ? cycle.frequencyHz : 0;
}

/** All values as they are at the place, so the circuit itself has no coefficients left. */
function kitCircuit(kit: Kit, brief: SearchBrief, { celsius, volts }: Place): Circuit {
  const { comparator, pullUp, ledResistor } = kit.candidate.frame.head;
  const { capacitor } = kit.candidate.frame;
  const warm = ({ ohms, temperatureCoefficientPerKelvin: perKelvin }: Drifting) =>
    ohms * (1 + perKelvin * (celsius - 25));
  const buffered = brief.load !== null && comparator.sections > 1;
  const delay = (typical: number) =>
    typical / 2 + kit.delayShare * (comparator.maxDelaySeconds - typical / 2);
  const { insulationSeconds } = capacitor;
  return createCircuit({
    supplyVolts: volts,
    celsius,
    r1Ohms: warm(kit.thresholds[0]),
    r2Ohms: warm(kit.thresholds[1]),
    r3Ohms: warm(kit.thresholds[2]),
    timing: warmTiming(kit, warm),
    capacitor: {
      farads:
        kit.farads *
          (1 + capacitor.temperatureCoefficientPerKelvin * (celsius - 25)) *
          (1 + kit.dielectric) +
        kit.strayFarads,
      leakageOhms: insulationSeconds === null ? null : insulationSeconds / capacitor.farads,
      leakageAmps: capacitor.leakageAmps,
    },
    comparator: {
      output: comparator.output,
      pullUpOhms: pullUp?.ohms ?? null,
      hysteresisVolts: comparator.hysteresisVolts,
      highOhms: comparator.highOhms * kit.outputFactor,
      lowOhms: comparator.lowOhms * kit.outputFactor,
      offsetVolts: kit.offsetVolts,
      invertingBiasAmps: kit.biasAmps,
      nonInvertingBiasAmps: (buffered ? 2 : 1) * kit.biasAmps,
      delayLowHighSeconds: delay(comparator.delayLowHighSeconds),
      delayHighLowSeconds: delay(comparator.delayHighLowSeconds),
    },
    load:
      brief.load && ledResistor
        ? { volts: kit.forwardVolts, ohms: ledResistor.ohms, buffered }
        : null,
  });
}

function warmTiming(kit: Kit, warm: (part: Drifting) => number): Circuit['timing'] {
  const { timing } = kit.candidate;
  const [first, second] = kit.timing.map(warm);
  if (timing.kind === 'steered') {
    const saturationAmps = timing.diode.saturationAmps * kit.saturationFactor;
    return {
      kind: 'steered',
      chargeOhms: first!,
      dischargeOhms: second!,
      diode: { ...timing.diode, saturationAmps },
    };
  }
  const parallel = timing.kind === 'single' && timing.join === 'parallel';
  const both = parallel ? 1 / (1 / first! + 1 / second!) : first! + (second ?? 0);
  return { kind: 'single', ohms: second === undefined ? first! : both };
}

/** The ends of supply and ambient range, and 25 °C where it lies inside, at both ends of the supply. */
export function placesOf(brief: SearchBrief): Place[] {
  const middle = Math.min(brief.maxCelsius, Math.max(brief.minCelsius, 25));
  return [brief.minCelsius, middle, brief.maxCelsius].flatMap((celsius) =>
    [brief.minSupplyVolts, brief.maxSupplyVolts].map((volts) => ({ celsius, volts })),
  );
}
