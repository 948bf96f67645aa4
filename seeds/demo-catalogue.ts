import { formatFarads, formatOhms } from '../server/engine/si-format.ts';
import { e24, e6, e96, inventedCount, scaled } from './shelf-values.ts';

/** One row of `parts` with the shelf it lies on. All of it is invented for the demonstration shop. */
export interface DemoPart {
  row: Record<string, string | number | boolean | null>;
  bin: string;
  count: number;
}

const perMillion = 1e-6;

function rkm(value: number, units: readonly (readonly [number, string])[]): string {
  const unit = units.find(([size]) => value >= size * (1 - 1e-9)) ?? units[units.length - 1]!;
  const digits = String(Number((value / unit[0]).toPrecision(4)));
  return digits.includes('.') ? digits.replace('.', unit[1]) : `${digits}${unit[1]}`;
}

const ohmUnits = [
  [1e6, 'M'],
  [1e3, 'K'],
  [1, 'R'],
] as const;
const faradUnits = [
  [1e-6, 'U'],
  [1e-9, 'N'],
  [1e-12, 'P'],
] as const;

const percent = (fraction: number) => `±\u00a0${Number((fraction * 100).toPrecision(3))}\u202f%`;

interface ResistorFamily {
  code: string;
  bins: string;
  mounting: string;
  tolerance: number;
  ppm: number;
  watts: number;
  cost: number;
  price: number;
  usual: number;
  perBin: number;
  values: number[];
}

const decades = (mantissas: readonly number[], from: number, to: number) =>
  Array.from({ length: to - from + 1 }, (_, k) => k + from).flatMap((exponent) =>
    mantissas.map((mantissa) => scaled(mantissa, exponent)),
  );

const resistorFamilies: ResistorFamily[] = [
  {
    code: 'R5',
    bins: 'C',
    mounting: 'through-hole',
    tolerance: 0.05,
    // Carbon film falls as it warms; the figure from memory.
    ppm: -350,
    watts: 0.25,
    cost: 1,
    price: 4,
    usual: 260,
    perBin: 4,
    values: [...decades(e24, 1, 5), 10e6].filter((ohms) => ohms >= 100),
  },
  {
    code: 'R1',
    bins: 'D',
    mounting: 'through-hole',
    tolerance: 0.01,
    ppm: 50,
    watts: 0.25,
    cost: 2,
    price: 6,
    usual: 180,
    perBin: 4,
    values: [...decades(e96, 1, 3), 1e6],
  },
  {
    code: 'RP',
    bins: 'E',
    mounting: 'through-hole',
    tolerance: 0.001,
    ppm: 15,
    watts: 0.25,
    cost: 22,
    price: 48,
    usual: 60,
    perBin: 2,
    values: decades([10, 12, 15, 20, 27, 33, 47, 68, 82], 3, 4).concat([100e3 * 10]),
  },
  {
    code: 'S1',
    bins: 'G',
    mounting: 'surface-mount',
    tolerance: 0.01,
    ppm: 100,
    watts: 0.1,
    cost: 1,
    price: 3,
    usual: 400,
    perBin: 4,
    values: [...decades(e96, 1, 3), 1e6, 2.2e6, 4.7e6, 10e6],
  },
  {
    code: 'SP',
    bins: 'H',
    mounting: 'surface-mount',
    tolerance: 0.001,
    ppm: 25,
    watts: 0.1,
    cost: 14,
    price: 32,
    usual: 80,
    perBin: 2,
    values: decades([10, 15, 20, 33, 47, 68], 3, 4),
  },
];

function resistors(): DemoPart[] {
  return resistorFamilies.flatMap((family, f) =>
    family.values.map((ohms, k) => ({
      row: {
        sku: `TW-${family.code}-${rkm(ohms, ohmUnits)}`.replace('.', 'D'),
        kind: 'resistor',
        name: `Resistor ${formatOhms(ohms)} ${percent(family.tolerance)}`,
        mounting: family.mounting,
        cost_minor: family.cost,
        price_minor: family.price,
        grams: family.mounting === 'through-hole' ? 0.2 : 0.01,
        ohms,
        tolerance: family.tolerance,
        temperature_coefficient_per_kelvin: family.ppm * perMillion,
        rated_watts: family.watts,
      },
      bin: `${family.bins}-${String(1 + Math.floor(k / family.perBin)).padStart(2, '0')}`,
      // The values every kit leans on are bought by the thousand.
      count: [10e3, 100e3, 1e6].includes(ohms) ? 2400 : inventedCount(k + 331 * f, family.usual),
    })),
  );
}

interface CapacitorFamily {
  code: string;
  bin: string;
  words: string;
  dielectric: string;
  mounting: string;
  tolerance: number;
  ppm: number;
  spread: number;
  insulationSeconds: number | null;
  /** Typical leakage as a share of the 0.01·C·V rule's limit; the rule itself by lookup. */
  leakageShare: number;
  halvingVolts: number | null;
  ratedVolts: number;
  cost: (farads: number) => number;
  usual: number;
  farads: number[];
}

const decadeFarads = (mantissas: readonly number[], from: number, to: number, last: number) =>
  [
    ...new Set(
      [...decades(mantissas, from, to), last].map((farads) => Number(farads.toPrecision(3))),
    ),
  ]
    .filter((farads) => farads <= last * (1 + 1e-9))
    .sort((a, b) => a - b);

const capacitorFamilies: CapacitorFamily[] = [
  {
    code: 'CG',
    bin: 'F',
    words: 'C0G',
    dielectric: 'C0G',
    mounting: 'through-hole',
    tolerance: 0.05,
    ppm: 0,
    spread: 0.002,
    insulationSeconds: 10_000,
    leakageShare: 0,
    halvingVolts: null,
    ratedVolts: 50,
    cost: (farads) => 6 + Math.round(farads * 2e9),
    usual: 140,
    farads: decadeFarads(e6, -11, -10, 10e-9),
  },
  {
    code: 'CP',
    bin: 'J',
    words: 'film (PP)',
    dielectric: 'film-pp',
    mounting: 'through-hole',
    tolerance: 0.025,
    ppm: -200,
    spread: 0.001,
    insulationSeconds: 100_000,
    leakageShare: 0,
    halvingVolts: null,
    ratedVolts: 100,
    cost: (farads) => 18 + Math.round(farads * 1.2e8),
    usual: 60,
    farads: decadeFarads(e6, -10, -8, 470e-9).filter((farads) => farads >= 1e-9),
  },
  {
    code: 'CE',
    bin: 'K',
    words: 'film (PET)',
    dielectric: 'film-pet',
    mounting: 'through-hole',
    tolerance: 0.05,
    ppm: 400,
    spread: 0.004,
    insulationSeconds: 10_000,
    leakageShare: 0,
    halvingVolts: null,
    ratedVolts: 63,
    cost: (farads) => 9 + Math.round(farads * 1.1e7),
    usual: 120,
    farads: decadeFarads(
      [...e6, 56, 82].sort((a, b) => a - b),
      -9,
      -7,
      10e-6,
    ),
  },
  {
    code: 'CX',
    bin: 'L',
    words: 'X7R',
    dielectric: 'X7R',
    mounting: 'through-hole',
    tolerance: 0.1,
    ppm: 0,
    spread: 0.15,
    insulationSeconds: 1000,
    leakageShare: 0,
    halvingVolts: 40,
    ratedVolts: 50,
    cost: (farads) => 4 + Math.round(farads * 1.5e7),
    usual: 500,
    farads: [10e-9, 22e-9, 47e-9, 100e-9, 220e-9, 470e-9, 1e-6],
  },
  {
    code: 'CL',
    bin: 'M',
    words: 'electrolytic',
    dielectric: 'electrolytic',
    mounting: 'through-hole',
    tolerance: 0.2,
    ppm: 1000,
    spread: 0.1,
    insulationSeconds: null,
    leakageShare: 0.05,
    halvingVolts: null,
    ratedVolts: 35,
    cost: (farads) => 7 + Math.round(farads * 6e4),
    usual: 80,
    farads: decadeFarads([10, 22, 33, 47], -7, -5, 1000e-6),
  },
  {
    code: 'SG',
    bin: 'N',
    words: 'C0G',
    dielectric: 'C0G',
    mounting: 'surface-mount',
    tolerance: 0.01,
    ppm: 0,
    spread: 0.002,
    insulationSeconds: 10_000,
    leakageShare: 0,
    halvingVolts: null,
    ratedVolts: 50,
    cost: (farads) => 5 + Math.round(farads * 1.5e9),
    usual: 220,
    farads: decadeFarads(e6, -11, -10, 10e-9),
  },
  {
    code: 'SE',
    bin: 'P',
    words: 'film (PET)',
    dielectric: 'film-pet',
    mounting: 'surface-mount',
    tolerance: 0.05,
    ppm: 400,
    spread: 0.004,
    insulationSeconds: 10_000,
    leakageShare: 0,
    halvingVolts: null,
    ratedVolts: 50,
    cost: (farads) => 16 + Math.round(farads * 3e7),
    usual: 70,
    farads: decadeFarads(e6, -9, -7, 2.2e-6),
  },
  {
    code: 'SX',
    bin: 'Q',
    words: 'X7R',
    dielectric: 'X7R',
    mounting: 'surface-mount',
    tolerance: 0.1,
    ppm: 0,
    spread: 0.15,
    insulationSeconds: 1000,
    leakageShare: 0,
    halvingVolts: 25,
    ratedVolts: 50,
    cost: (farads) => 2 + Math.round(farads * 1e7),
    usual: 900,
    farads: [10e-9, 47e-9, 100e-9, 1e-6],
  },
];

function capacitors(): DemoPart[] {
  return capacitorFamilies.flatMap((family, f) =>
    family.farads.map((farads, k) => {
      const cost = family.cost(farads);
      return {
        row: {
          sku: `TW-${family.code}-${rkm(farads, faradUnits)}`,
          kind: 'capacitor',
          name: `Capacitor ${formatFarads(farads)} ${percent(family.tolerance)} ${family.words}`,
          mounting: family.mounting,
          cost_minor: cost,
          price_minor: Math.round(cost * 2.1) + 3,
          grams: family.mounting === 'through-hole' ? 0.6 + farads * 1e6 * 0.2 : 0.02,
          farads,
          tolerance: family.tolerance,
          dielectric: family.dielectric,
          rated_volts: family.ratedVolts,
          temperature_coefficient_per_kelvin: family.ppm * perMillion,
          temperature_spread: family.spread,
          insulation_seconds: family.insulationSeconds,
          leakage_amps: family.leakageShare * Math.max(0.01 * farads * family.ratedVolts, 3e-6),
          bias_halving_volts: family.halvingVolts,
          polarised: family.dielectric === 'electrolytic',
        },
        bin: `${family.bin}-${String(1 + Math.floor(k / 2)).padStart(2, '0')}`,
        count:
          family.dielectric === 'X7R'
            ? family.usual + 40 * k
            : inventedCount(k * 3 + 57 * f + 11, family.usual),
      };
    }),
  );
}

/** [code, output, sections, min V, max V, tLH, tHL, max delay, bias, max bias, max offset, hysteresis, high Ω, low Ω, max out A, quiescent A, cost] */
const comparatorModels = [
  [
    'C1',
    'push-pull',
    1,
    1.6,
    5.5,
    6e-6,
    6e-6,
    14e-6,
    1e-12,
    4e-11,
    4e-3,
    2e-3,
    45,
    40,
    0.012,
    6e-7,
    88,
  ],
  [
    'C2',
    'push-pull',
    2,
    1.6,
    5.5,
    6e-6,
    6e-6,
    14e-6,
    1e-12,
    4e-11,
    4e-3,
    2e-3,
    45,
    40,
    0.012,
    1.2e-6,
    124,
  ],
  [
    'C3',
    'push-pull',
    1,
    1.8,
    5.5,
    2.6e-7,
    2.2e-7,
    6e-7,
    2e-12,
    6e-11,
    4e-3,
    1.5e-3,
    30,
    28,
    0.02,
    9e-6,
    96,
  ],
  [
    'C4',
    'open-drain',
    2,
    2,
    36,
    1.3e-6,
    6e-7,
    2.6e-6,
    -2.5e-8,
    -1e-7,
    5e-3,
    0,
    0,
    60,
    0.006,
    4e-4,
    42,
  ],
  [
    'C5',
    'open-drain',
    4,
    2,
    36,
    1.3e-6,
    6e-7,
    2.6e-6,
    -2.5e-8,
    -1e-7,
    5e-3,
    0,
    0,
    60,
    0.006,
    8e-4,
    58,
  ],
  [
    'C6',
    'push-pull',
    1,
    2.7,
    5.5,
    2.8e-8,
    2.6e-8,
    6e-8,
    2e-12,
    8e-11,
    5e-3,
    2e-3,
    25,
    22,
    0.03,
    1.1e-3,
    158,
  ],
  [
    'C7',
    'push-pull',
    2,
    3,
    16,
    9e-7,
    7e-7,
    2e-6,
    5e-12,
    1e-10,
    5e-3,
    0,
    70,
    60,
    0.015,
    2.4e-5,
    132,
  ],
  [
    'C8',
    'open-drain',
    1,
    1.6,
    5.5,
    9e-6,
    7e-6,
    2e-5,
    1e-12,
    4e-11,
    4e-3,
    2e-3,
    0,
    55,
    0.01,
    6e-7,
    84,
  ],
  [
    'C9',
    'push-pull',
    4,
    1.8,
    5.5,
    4.5e-7,
    4e-7,
    1e-6,
    2e-12,
    6e-11,
    4e-3,
    1.5e-3,
    40,
    36,
    0.015,
    3.6e-5,
    176,
  ],
] as const;

const sectionWords = { 1: 'single', 2: 'dual', 4: 'quad' } as const;

function comparators(): DemoPart[] {
  const mountings = [
    ['through-hole', '', 'A', 130],
    ['surface-mount', 'S', 'B', 210],
  ] as const;
  return mountings.flatMap(([mounting, suffix, rack, usual]) =>
    comparatorModels.map((m, k) => ({
      row: {
        sku: `TW-${m[0]}${suffix}`,
        kind: 'comparator',
        name: `Comparator TW-${m[0]}${suffix}, ${sectionWords[m[2]]}, ${m[1]}`,
        mounting,
        cost_minor: m[16],
        price_minor: Math.round(m[16] * 1.7),
        grams: mounting === 'through-hole' ? 0.6 : 0.05,
        output: m[1],
        sections: m[2],
        supply_min_volts: m[3],
        supply_max_volts: m[4],
        delay_low_high_seconds: m[5],
        delay_high_low_seconds: m[6],
        max_delay_seconds: m[7],
        input_bias_amps: m[8],
        max_input_bias_amps: m[9],
        offset_volts: 0,
        max_offset_volts: m[10],
        hysteresis_volts: m[11],
        high_ohms: m[12],
        low_ohms: m[13],
        max_output_amps: m[14],
        quiescent_amps: m[15],
        max_quiescent_amps: m[15] * 1.6,
      },
      bin: `${rack}-${String(11 + k).padStart(2, '0')}`,
      count: usual + ((k * 37) % 60),
    })),
  );
}

const ledModels = [
  ['red', 1.8, 1.6, 2.2],
  ['orange', 1.9, 1.7, 2.3],
  ['yellow', 1.95, 1.7, 2.3],
  ['green', 2.0, 1.8, 2.4],
  ['blue', 2.9, 2.7, 3.3],
] as const;

function leds(): DemoPart[] {
  return (['through-hole', 'surface-mount'] as const).flatMap((mounting) =>
    ledModels.map(([colour, volts, min, max], k) => ({
      row: {
        sku: `TW-L${mounting === 'through-hole' ? 'T' : 'S'}-${colour.toUpperCase()}`,
        kind: 'led',
        name: `LED ${colour}, ${mounting === 'through-hole' ? '5\u202fmm' : 'chip'}`,
        mounting,
        cost_minor: 6 + k,
        price_minor: 15 + 2 * k,
        grams: mounting === 'through-hole' ? 0.4 : 0.02,
        colour,
        forward_volts: volts,
        min_forward_volts: min,
        max_forward_volts: max,
        max_amps: 0.02,
      },
      bin: `R-${String((mounting === 'through-hole' ? 1 : 6) + k).padStart(2, '0')}`,
      count: 340 - 45 * k,
    })),
  );
}

function boards(): DemoPart[] {
  return (['through-hole', 'surface-mount'] as const).flatMap((mounting, m) =>
    ([1, 2, 4] as const).map((sections, k) => ({
      row: {
        sku: `TW-B${mounting === 'through-hole' ? 'T' : 'S'}${sections}`,
        kind: 'board',
        name: `Board for a ${sectionWords[sections]} comparator, ${mounting}`,
        mounting,
        cost_minor: 55,
        price_minor: 110,
        grams: 6,
        sections,
      },
      bin: `A-0${1 + 3 * m + k}`,
      count: 420 - 60 * k,
    })),
  );
}

function power(): DemoPart[] {
  return (
    [
      ['AA', 2.4],
      ['AAA', 1.0],
    ] as const
  ).flatMap(([size, ampHours], s) =>
    [2, 3, 4].flatMap((cells, k): DemoPart[] => [
      {
        row: {
          sku: `TW-CELL-${size}-${cells}`,
          kind: 'battery',
          name: `${cells} ${size} cells, alkaline`,
          mounting: 'through-hole',
          cost_minor: 32 * cells,
          price_minor: 58 * cells,
          grams: (size === 'AA' ? 24 : 12) * cells,
          cell_size: size,
          cells,
          nominal_volts: 1.5 * cells,
          fresh_volts: 1.6 * cells,
          empty_volts: 0.9 * cells,
          capacity_amp_hours: ampHours,
        },
        bin: `S-${String(1 + 3 * s + k).padStart(2, '0')}`,
        count: 160 - 30 * k,
      },
      {
        row: {
          sku: `TW-HOLD-${size}-${cells}`,
          kind: 'holder',
          name: `Holder for ${cells} ${size} cells, with leads`,
          mounting: 'through-hole',
          cost_minor: 60 + 10 * cells,
          price_minor: 105 + 15 * cells,
          grams: 8 + 2 * cells,
          cell_size: size,
          cells,
        },
        bin: `S-${String(11 + 3 * s + k).padStart(2, '0')}`,
        count: 150 - 20 * k,
      },
    ]),
  );
}

/** Whole track of trimmers, as they are usually made: 1, 2 and 5 in every decade. */
const trimmerOhms = [1e3, 2e3, 5e3, 10e3, 20e3, 50e3, 100e3, 200e3, 500e3, 1e6, 2e6];

function trimmers(): DemoPart[] {
  return (['through-hole', 'surface-mount'] as const).flatMap((mounting, m) =>
    trimmerOhms.map((ohms, k) => ({
      row: {
        sku: `TW-V${m === 0 ? 'T' : 'S'}-${rkm(ohms, ohmUnits)}`,
        kind: 'trimmer',
        name: `Trimmer ${formatOhms(ohms)} ${percent(m === 0 ? 0.1 : 0.2)}`,
        mounting,
        cost_minor: m === 0 ? 62 : 48,
        price_minor: m === 0 ? 140 : 115,
        grams: m === 0 ? 1.1 : 0.2,
        ohms,
        tolerance: m === 0 ? 0.1 : 0.2,
        temperature_coefficient_per_kelvin: 100 * perMillion,
        rated_watts: m === 0 ? 0.5 : 0.25,
      },
      bin: `U-${String(1 + k + 11 * m).padStart(2, '0')}`,
      count: 70 + ((k * 13 + 31 * m) % 40),
    })),
  );
}

const diodeModels = [
  ['D1', 'silicon', 2.5e-9, 1.75, 1.11, 3],
  ['D2', 'Schottky', 1.5e-7, 1.05, 0.69, 2],
] as const;

function diodes(): DemoPart[] {
  return (['through-hole', 'surface-mount'] as const).flatMap((mounting, m) =>
    diodeModels.map(([code, words, saturation, emission, gap, exponent], k) => ({
      row: {
        sku: `TW-${code}${m === 0 ? '' : 'S'}`,
        kind: 'diode',
        name: `Diode, ${words} signal`,
        mounting,
        cost_minor: 3,
        price_minor: 9,
        grams: m === 0 ? 0.2 : 0.01,
        saturation_amps: saturation,
        emission_coefficient: emission,
        energy_gap_electron_volts: gap,
        saturation_temperature_exponent: exponent,
      },
      bin: `R-1${1 + k + 2 * m}`,
      count: 380,
    })),
  );
}

/** Every part of the demonstration shop with its bin and count. Invented; no real part is meant. */
export function demoCatalogue(): DemoPart[] {
  return [
    ...resistors(),
    ...capacitors(),
    ...comparators(),
    ...leds(),
    ...boards(),
    ...power(),
    ...diodes(),
    ...trimmers(),
  ];
}
