import { createCircuit, type Circuit } from '../../server/engine/circuit.ts';
import { createNormal } from '../../server/engine/random.ts';
import type { RankedPack } from '../../server/engine/search/promise.ts';
import type { PreparedShelf } from '../../server/engine/search/prepared-shelf.ts';
import type {
  SearchBrief,
  StockedCapacitor,
  StockedResistor,
} from '../../server/engine/search/shelf.ts';
import { cheapestChoice } from '../../server/engine/search/timing-choice.ts';
import { classOffers, gridAround, tunedClassOf } from '../../server/engine/search/tuned-grid.ts';
import { aimFrame } from '../../server/engine/search/aim.ts';

/** One kit as it left the shop, put to work anywhere. */
export interface VirtualKit {
  /** The kit's circuit at a temperature and a supply; parts stand at their values there. */
  at(celsius: number, supplyVolts: number): Circuit;
}

/** Gives a circuit's rate in hertz; NaN where it stands still. */
export type RateOf = (circuit: Circuit) => number;

const strayFarads = 5e-12;
const diodeFactor = 2;
const settingShare = 0.005;

/**
 * Builds kits of a pack from the distributions of its stocked parts: every part uniform in its
 * tolerance (a capacitor with lot statistics normal in the lots' window), drifting by its signed
 * coefficient; the comparator's offset and bias anywhere up to the maximum of either sign, its output
 * resistance half to twice the typical, its delays from half the typical to the maximum; the LED's
 * voltage and the stray capacitance anywhere in their ranges. Tuned kits get the resistor that the
 * meter's reading of their own capacitor asks for; trimmed ones are set to the target at 25 °C.
 */
export function kitMaker(
  pack: RankedPack,
  brief: SearchBrief,
  shelf: PreparedShelf,
  random: () => number,
  rateOf: RateOf,
): () => VirtualKit {
  const normal = createNormal(random);
  const even = () => 2 * random() - 1;
  const { comparator: part, thresholds } = pack.frame.head;
  return () => {
    const capacitor = drawCapacitor(pack.frame.capacitor, even, normal);
    const spread = 1 + pack.frame.capacitor.temperatureSpread * even();
    const draw = (resistor: StockedResistor) => 1 + resistor.tolerance * even();
    const [r1, r2, r3] = [draw(thresholds.r1), draw(thresholds.r2), draw(thresholds.r3)];
    const stray = strayFarads * random();
    const output = 0.5 + 1.5 * random();
    const offsetVolts = part.maxOffsetVolts * even();
    const biasAmps = part.maxInputBiasAmps * even();
    const late = random();
    const delay = (typical: number) => typical / 2 + late * (part.maxDelaySeconds - typical / 2);
    const lit = random();
    const diode = diodeFactor ** even();
    const base = (celsius: number, supplyVolts: number): Circuit => {
      const warm = ({ ohms, temperatureCoefficientPerKelvin }: StockedResistor, factor: number) =>
        ohms * factor * (1 + temperatureCoefficientPerKelvin * (celsius - 25));
      const film = pack.frame.capacitor;
      const farads =
        film.farads *
          capacitor *
          spread *
          (1 + film.temperatureCoefficientPerKelvin * (celsius - 25)) +
        stray;
      return {
        ...createCircuit({
          supplyVolts,
          celsius,
          r1Ohms: warm(thresholds.r1, r1),
          r2Ohms: warm(thresholds.r2, r2),
          r3Ohms: warm(thresholds.r3, r3),
          timing: { kind: 'single', ohms: 1 },
          capacitor: {
            farads,
            leakageOhms:
              film.insulationSeconds === null ? null : film.insulationSeconds / film.farads,
            leakageAmps: film.leakageAmps,
          },
          comparator: {
            output: part.output,
            highOhms: part.highOhms * output,
            lowOhms: part.lowOhms * output,
            pullUpOhms: pack.frame.head.pullUp?.ohms ?? null,
            delayLowHighSeconds: delay(part.delayLowHighSeconds),
            delayHighLowSeconds: delay(part.delayHighLowSeconds),
            invertingBiasAmps: biasAmps,
            nonInvertingBiasAmps: pack.frame.head.buffered ? 2 * biasAmps : biasAmps,
            offsetVolts,
            hysteresisVolts: part.hysteresisVolts,
          },
        }),
        load: loadOf(pack, brief, lit),
      };
    };
    return timedKit({ pack, brief, shelf, even, draw, base, capacitor, diode, rateOf });
  };
}

function drawCapacitor(
  { tolerance, deviation }: StockedCapacitor,
  even: () => number,
  normal: () => number,
): number {
  if (deviation === null) return 1 + tolerance * even();
  for (;;) {
    const off = deviation * normal();
    if (Math.abs(off) <= tolerance) return 1 + off;
  }
}

function loadOf({ frame }: RankedPack, { load }: SearchBrief, lit: number): Circuit['load'] {
  if (load === null || frame.head.ledResistor === null) return null;
  const { minForwardVolts: least, maxForwardVolts: most } = load;
  return {
    volts: least + lit * (most - least),
    ohms: frame.head.ledResistor.ohms,
    buffered: frame.head.buffered,
  };
}

interface KitInHand {
  pack: RankedPack;
  brief: SearchBrief;
  shelf: PreparedShelf;
  even: () => number;
  draw: (resistor: StockedResistor) => number;
  base: (celsius: number, supplyVolts: number) => Circuit;
  /** The capacitor over its middle value. */
  capacitor: number;
  diode: number;
  rateOf: RateOf;
}

function timedKit(kit: KitInHand): VirtualKit {
  const { pack, draw, base, diode } = kit;
  const { timing } = pack;
  if (timing.kind === 'trimmed') return trimmedKit(kit);
  if (timing.kind === 'single') {
    const parts = kit.brief.care === 'bench-tuned' ? tunedParts(kit) : timing;
    const factors = [draw(parts.first), parts.second === null ? 1 : draw(parts.second)] as const;
    return {
      at: (celsius, volts) => ({
        ...base(celsius, volts),
        timing: { kind: 'single', ohms: joined(parts, factors, celsius) },
      }),
    };
  }
  const [charge, discharge] = [draw(timing.charge), draw(timing.discharge)];
  const { saturationAmps, ...junction } = timing.diode;
  return {
    at: (celsius, volts) => ({
      ...base(celsius, volts),
      timing: {
        kind: 'steered',
        chargeOhms: warmed(timing.charge, charge, celsius),
        dischargeOhms: warmed(timing.discharge, discharge, celsius),
        diode: {
          saturationAmps: saturationAmps * diode,
          emissionCoefficient: junction.emissionCoefficient,
          energyGapElectronVolts: junction.energyGapElectronVolts,
          saturationTemperatureExponent: junction.saturationTemperatureExponent,
        },
      },
    }),
  };
}

function warmed(
  {
    ohms,
    temperatureCoefficientPerKelvin,
  }: { ohms: number; temperatureCoefficientPerKelvin: number },
  factor: number,
  celsius: number,
): number {
  return ohms * factor * (1 + temperatureCoefficientPerKelvin * (celsius - 25));
}

type TwoParts = Pick<
  Extract<RankedPack['timing'], { kind: 'single' }>,
  'first' | 'second' | 'join'
>;

function joined(
  { first, second, join }: TwoParts,
  [a, b]: readonly [number, number],
  celsius: number,
): number {
  const one = warmed(first, a, celsius);
  if (second === null) return one;
  const other = warmed(second, b, celsius);
  return join === 'parallel' ? (one * other) / (one + other) : one + other;
}

/** The bench reads the capacitor and takes the nearest resistance of the pack's class. */
function tunedParts({ pack, brief, shelf, capacitor, even }: KitInHand): TwoParts {
  if (pack.timing.kind !== 'single') throw new Error('Only single timing is tuned.');
  const { frame } = pack;
  const reading = frame.capacitor.farads * capacitor * (1 + brief.meterUncertainty * even());
  const measured = { ...frame, capacitor: { ...frame.capacitor, farads: reading } };
  const wanted = aimFrame(measured, brief).ohms;
  const limit = tunedClassOf(pack.timing);
  const away = (place: number) => Math.abs(Math.log(shelf.table.ohms[place]! / wanted));
  const [place] = gridAround(frame.head, wanted, limit, brief, shelf).sort(
    (a, b) => away(a) - away(b),
  );
  const stock = {
    table: shelf.table,
    offers: classOffers(shelf, limit, brief.quantity),
    demand: frame.head.demand,
    quantity: brief.quantity,
  };
  const parts = place === undefined ? null : cheapestChoice(stock, place);
  if (parts === null)
    throw new Error('The grid has no resistance for a reading it promised to serve.');
  return parts;
}

/** The maker turns the trimmer until the kit runs at the target, as well as it can be set. */
function trimmedKit({ pack, brief, base, draw, even, rateOf }: KitInHand): VirtualKit {
  const { timing } = pack;
  if (timing.kind !== 'trimmed') throw new Error('Only a trimmer is set.');
  const fixed = timing.fixed.ohms * draw(timing.fixed);
  const with_ = (circuit: Circuit, ohms: number): Circuit => ({
    ...circuit,
    timing: { kind: 'single', ohms },
  });
  let ohms = timing.ohms;
  for (let step = 0; step < 4; step += 1) {
    ohms *= rateOf(with_(base(25, brief.supplyVolts), ohms)) / brief.targetHz;
  }
  const track = timing.trimmer.ohms;
  const set = ohms - fixed;
  if (set < 0 || set > track * (1 + timing.trimmer.tolerance)) {
    throw new Error('The trimmer does not reach the target.');
  }
  const off = 1 + ((settingShare * track) / timing.ohms) * even();
  return {
    at: (celsius, volts) =>
      with_(
        base(celsius, volts),
        off *
          (warmed({ ...timing.fixed, ohms: fixed }, 1, celsius) +
            warmed({ ...timing.trimmer, ohms: set }, 1, celsius)),
      ),
  };
}

/** Every temperature and supply at which a kit must hold the band. */
export function conditionsOf(brief: SearchBrief): { celsius: number; volts: number }[] {
  const { minCelsius, maxCelsius } = brief;
  const middle = Math.min(maxCelsius, Math.max(minCelsius, 25));
  return [...new Set([minCelsius, middle, maxCelsius])].flatMap((celsius) =>
    [...new Set([brief.minSupplyVolts, brief.maxSupplyVolts])].map((volts) => ({ celsius, volts })),
  );
}

/** What became of a run of kits. */
export interface KitRun {
  kits: number;
  /** Rates outside the guaranteed band, at any condition. */
  outsideGuarantee: number;
  /** Kits within the asked band at every condition. */
  within: number;
}

/** Builds `count` kits of a pack and tries each at every condition. */
export function tryKits(
  pack: RankedPack,
  brief: SearchBrief,
  shelf: PreparedShelf,
  count: number,
  random: () => number,
  rateOf: RateOf,
): KitRun {
  const make = kitMaker(pack, brief, shelf, random, rateOf);
  const conditions = conditionsOf(brief);
  const run: KitRun = { kits: count, outsideGuarantee: 0, within: 0 };
  for (let k = 0; k < count; k += 1) {
    const kit = make();
    let holds = true;
    for (const { celsius, volts } of conditions) {
      const hertz = rateOf(kit.at(celsius, volts));
      if (!(hertz >= pack.guaranteed.minHz && hertz <= pack.guaranteed.maxHz)) {
        run.outsideGuarantee += 1;
      }
      if (!(Math.abs(hertz / brief.targetHz - 1) <= brief.band)) holds = false;
    }
    if (holds) run.within += 1;
  }
  return run;
}
