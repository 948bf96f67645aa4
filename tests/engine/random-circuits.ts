import { createCircuit, type Circuit, type CircuitDraft } from '../../server/engine/circuit.ts';

/** A circuit drawn at random, with the names of the effects that it has. */
export interface RandomCircuit {
  circuit: Circuit;
  effects: string[];
}

type Between = (low: number, high: number) => number;

/** A circuit in the making, with the sizes that its effects are drawn to. */
interface Draw {
  draft: CircuitDraft & { comparator: NonNullable<CircuitDraft['comparator']> };
  ohms: number;
  farads: number;
  supplyVolts: number;
  between: Between;
  /** Uniform in the logarithm. */
  decades: Between;
}

const chanceOfEffect = 0.4;

const effects: Record<string, (draw: Draw) => void> = {
  'open drain': ({ draft, ohms, decades }) => {
    draft.comparator.output = 'open-drain';
    draft.comparator.pullUpOhms = ohms * decades(0.001, 1);
  },
  'output swing': ({ draft, supplyVolts, between }) => {
    draft.comparator.highVolts = supplyVolts * between(0.7, 1);
    draft.comparator.lowVolts = supplyVolts * between(0, 0.1);
  },
  'output resistance': ({ draft, ohms, decades }) => {
    draft.comparator.highOhms = ohms * decades(0.001, 0.5);
    draft.comparator.lowOhms = ohms * decades(0.001, 0.5);
  },
  'indicator load': ({ draft, supplyVolts, between, decades }) => {
    draft.comparator.highOhms = decades(10, 500);
    draft.load = {
      volts: between(0.2, 0.5) * supplyVolts,
      ohms: decades(200, 5e3),
      buffered: between(0, 1) < 0.25,
    };
  },
  offset: ({ draft, between }) => {
    draft.comparator.offsetVolts = between(-0.1, 0.1);
  },
  hysteresis: ({ draft, between }) => {
    draft.comparator.hysteresisVolts = between(0, 0.2);
  },
  'inverting bias': ({ draft, ohms, supplyVolts, between }) => {
    draft.comparator.invertingBiasAmps = (between(-0.1, 0.1) * supplyVolts) / ohms;
  },
  'non-inverting bias': ({ draft, between }) => {
    draft.comparator.nonInvertingBiasAmps = between(-1e-6, 1e-6);
  },
  delay: ({ draft, ohms, farads, decades }) => {
    draft.comparator.delayLowHighSeconds = ohms * farads * decades(1e-3, 3);
    draft.comparator.delayHighLowSeconds = ohms * farads * decades(1e-3, 3);
  },
  'leakage resistance': ({ draft, ohms, decades }) => {
    draft.capacitor.leakageOhms = ohms * decades(2, 1e3);
  },
  'leakage current': ({ draft, ohms, supplyVolts, between }) => {
    draft.capacitor.leakageAmps = (between(0, 0.1) * supplyVolts) / ohms;
  },
  'capacitance under bias': ({ draft, supplyVolts, between }) => {
    draft.capacitor.biasHalvingVolts = supplyVolts * between(0.3, 4);
  },
  'tabulated capacitance': ({ draft, supplyVolts, between }) => {
    draft.capacitor.biasCurve = randomCurve(supplyVolts, between);
  },
  temperature: ({ draft, between }) => {
    draft.celsius = between(-40, 125);
    draft.resistorTemperatureCoefficientPerKelvin = between(-5e-4, 5e-4);
    draft.capacitor.temperatureCoefficientPerKelvin = between(-1e-3, 1e-3);
  },
  'resistors drift apart': ({ draft, between }) => {
    draft.celsius = between(-40, 125);
    draft.thresholdTemperatureCoefficientPerKelvin = between(-5e-4, 5e-4);
    draft.timingTemperatureCoefficientPerKelvin = between(-5e-4, 5e-4);
  },
};

/** A circuit over broad ranges; it has each effect by chance, and need not oscillate. */
export function randomCircuit(random: () => number): RandomCircuit {
  const between: Between = (low, high) => low + (high - low) * random();
  const decades: Between = (low, high) => low * (high / low) ** random();
  const steered = random() < chanceOfEffect;
  const ohms = decades(3e3, 3e6);
  const farads = decades(2e-11, 1e-4);
  const supplyVolts = between(1.8, 15);
  const draft = {
    supplyVolts,
    r1Ohms: decades(1e4, 1e6),
    r2Ohms: decades(1e4, 1e6),
    r3Ohms: decades(1e4, 1e6),
    timing: steered ? steeredTiming(ohms, between, decades) : { kind: 'single' as const, ohms },
    capacitor: { farads },
    comparator: {},
  };
  const present = Object.entries(effects).filter(() => random() < chanceOfEffect);
  for (const [, add] of present) add({ draft, ohms, farads, supplyVolts, between, decades });
  return {
    circuit: createCircuit(draft),
    effects: [steered ? 'steered timing' : 'single timing', ...present.map(([name]) => name)],
  };
}

function steeredTiming(ohms: number, between: Between, decades: Between) {
  return {
    kind: 'steered' as const,
    chargeOhms: ohms,
    dischargeOhms: ohms * decades(0.1, 10),
    diode: {
      saturationAmps: decades(1e-15, 1e-8),
      emissionCoefficient: between(1, 2),
      energyGapElectronVolts: between(0.67, 1.2),
      saturationTemperatureExponent: between(2, 3.5),
    },
  };
}

function randomCurve(supplyVolts: number, between: Between) {
  const volts: number[] = [];
  const fractions: number[] = [];
  let at = between(0, 0.1) * supplyVolts;
  let fraction = 1;
  for (let count = Math.floor(between(2, 8)); count > 0; count--) {
    volts.push(at);
    fractions.push(fraction);
    at += between(0.05, 0.4) * supplyVolts;
    fraction *= between(0.6, 1.05);
  }
  return { volts, fractions };
}
