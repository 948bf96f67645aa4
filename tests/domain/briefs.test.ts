import { describe, expect, it } from 'vitest';
import { briefSchema, type BriefInput } from '../../server/contracts/brief.ts';
import { resolveBrief, targetWords } from '../../server/domain/brief.ts';
import {
  chooseAccessories,
  demandOfChoice,
  missingAccessory,
  type PackChoice,
} from '../../server/domain/pack-choice.ts';
import { shelfOf } from '../../server/domain/shelf.ts';
import {
  battery,
  board,
  capacitor,
  comparator,
  holder,
  led,
  resistor,
} from './sample-catalogue.ts';

const catalogue = [
  resistor(1e5),
  capacitor(1e-7),
  capacitor(1e-7, 'X7R'),
  comparator(1),
  comparator(2),
  board(1),
  led('red', 1.9),
  led('green', 2.1),
  led('blue', 3.1),
  battery(),
  holder(),
];

function resolve(brief: BriefInput, parts = catalogue) {
  return resolveBrief(briefSchema.parse(brief), parts, { meterUncertainty: 0.0025 });
}

function resolved(brief: BriefInput, parts = catalogue) {
  const inHand = resolve(brief, parts);
  if (inHand.kind === 'impossible') throw new Error(inHand.errors[0]!.message);
  return inHand;
}

const second: BriefInput = { target: { value: 1, unit: 's' } };

describe('resolveBrief', () => {
  describe('when the maker says the rate alone', () => {
    it('takes a slow one for a red LED and a fast one for a clock', () => {
      expect(resolved({ target: { value: 20, unit: 'Hz' } }).brief.load).toEqual({
        kind: 'led',
        colour: 'red',
        amps: 0.002,
      });
      expect(resolved({ target: { value: 20.1, unit: 'Hz' } }).brief.load.kind).toBe('logic');
    });

    it('takes a supply in volts to be regulated to 5 %', () => {
      const { search } = resolved(second);
      expect([search.minSupplyVolts, search.supplyVolts, search.maxSupplyVolts]).toEqual([
        4.75, 5, 5.25,
      ]);
    });

    it('says it in one sentence', () => {
      expect(resolved({ target: { value: 90, unit: 'per_minute' } }).brief.sentence).toBe(
        'A red LED blinks 90\u00a0times a minute, lit for half of each beat, from 5\u202fV, within ±\u00a05\u202f%, between 0 and 40\u202f°C',
      );
      expect(resolved({ target: { value: 32, unit: 'kHz' } }).brief.sentence).toMatch(
        /^A clock ticks at 32\u202fkHz, high for half of each beat/,
      );
    });
  });

  describe('when it runs from cells', () => {
    it('spans them from fresh to empty, and takes their holder', () => {
      const inHand = resolved({ ...second, supply: { battery: 'TW-CELL-AA-2' } });
      const { search, brief } = inHand;
      expect([search.minSupplyVolts, search.supplyVolts, search.maxSupplyVolts]).toEqual([
        1.8, 3, 3.2,
      ]);
      expect(brief.supply.label).toBe('two AA cells');
      expect(inHand.holder?.facts.kind).toBe('holder');
      expect(inHand.battery?.facts.sku).toBe('TW-CELL-AA-2');
    });

    it('names the batteries there are when it does not know the one', () => {
      expect(resolve({ ...second, supply: { battery: 'COIN' } })).toEqual({
        kind: 'impossible',
        errors: [
          {
            path: 'supply.battery',
            message: 'The shop has no battery "COIN". Choose one of TW-CELL-AA-2.',
          },
        ],
      });
    });
  });

  describe('when the LED cannot light', () => {
    const blue = { kind: 'led', colour: 'blue' } as const;
    const messageOf = (brief: BriefInput, parts = catalogue) => {
      const inHand = resolve(brief, parts);
      return inHand.kind === 'impossible' ? inHand.errors[0]! : null;
    };

    it('says which colours the supply does light', () => {
      const error = messageOf({ ...second, supply: { volts: 3 }, load: blue });
      expect(error?.path).toBe('load.colour');
      expect(error?.message).toMatch(
        /needs about 3\.4\u202fV with its resistor; this supply .* is 3\.0\u202fV/,
      );
      expect(error?.message).toMatch(/one of these colours: red, green\.$/);
    });

    it('says how many volts it takes when no colour would do', () => {
      const error = messageOf({ ...second, supply: { volts: 1 }, load: blue });
      expect(error?.message).toMatch(/Take at least 3\.4\u202fV\.$/);
    });

    it('lights at exactly 0.3 V to spare and not below', () => {
      expect(messageOf({ ...second, supply: { volts: 3.41 }, load: blue })).toBeNull();
      expect(messageOf({ ...second, supply: { volts: 3.39 }, load: blue })).not.toBeNull();
    });

    it('says that the shop has none of the colour for this mounting', () => {
      const load = { kind: 'led', colour: 'orange' } as const;
      expect(messageOf({ ...second, load })?.message).toMatch(/no orange LED/);
      expect(messageOf({ ...second, mounting: 'surface-mount' })?.message).toMatch(/no red LED/);
    });

    it('says how much current it takes at most', () => {
      const error = messageOf({ ...second, load: { kind: 'led', colour: 'red', amps: 0.025 } });
      expect(error).toEqual({
        path: 'load.amps',
        message: 'This LED takes at most 20\u202fmA; ask for less current.',
      });
    });
  });
});

describe('targetWords', () => {
  it.each([
    ['per_minute', '90\u00a0times a minute'],
    ['Hz', 'at 90\u202fHz'],
    ['kHz', 'at 90\u202fkHz'],
    ['s', 'every 90\u202fs'],
    ['ms', 'every 90\u202fms'],
  ] as const)('says 90 %s as "%s"', (unit, words) => {
    expect(targetWords({ value: 90, unit })).toBe(words);
  });
});

describe('chooseAccessories', () => {
  it('takes what is stocked often enough, and says what is short', () => {
    const inHand = resolved(second);
    const all = chooseAccessories(catalogue, inHand);
    expect(all.decoupling?.facts.dielectric).toBe('X7R');
    expect(all.boardFor(1)?.facts.sections).toBe(1);
    expect(all.boardFor(2)).toBeNull();
    expect(missingAccessory(inHand, all)).toBeNull();
    const scarce = [
      ...catalogue.filter((part) => part.kind !== 'led'),
      led('red', 1.9, { onHand: 2 }),
    ];
    const three = resolved({ ...second, quantity: 3 }, scarce);
    expect(missingAccessory(three, chooseAccessories(scarce, three))).toBe(
      'Only 2 of LED, red are left today and the brief asks for 3.',
    );
  });

  it('needs the cells and their holder where the brief runs from them', () => {
    const without = catalogue.filter((part) => part.kind !== 'holder');
    const inHand = resolved({ ...second, supply: { battery: 'TW-CELL-AA-2' } }, without);
    expect(missingAccessory(inHand, chooseAccessories(without, inHand))).toBe(
      'The shelves do not hold the holder today.',
    );
    const many = resolved({ ...second, quantity: 101 });
    expect(missingAccessory(many, chooseAccessories(catalogue, many))).toBe(
      'The shelves do not hold the decoupling capacitor 101 times today.',
    );
  });
});

describe('shelfOf', () => {
  it('takes the parts of one mounting, sold-out resistors too', () => {
    const gone = resistor(2e3, 0.01, { onHand: 0 });
    const chip = resistor(1e3, 0.01, { mounting: 'surface-mount' });
    const shelf = shelfOf([...catalogue, gone, chip], 'through-hole', null);
    expect(shelf.comparators.map((part) => part.sections)).toEqual([1, 2]);
    expect(shelf.resistors.map((part) => part.ohms)).toEqual([1e5, 2e3]);
    expect(shelf.capacitors).toHaveLength(2);
  });

  describe('when capacitors go by their lots', () => {
    const lot = { id: 7, available: 5, measuredMean: null, measuredDeviation: null };
    const measured = { ...lot, measuredMean: 1.02e-7, measuredDeviation: 4e-10, measuredCount: 20 };
    const shelf = shelfOf(
      [
        capacitor(1e-7, 'film-pp', { lots: [measured] }),
        capacitor(2.2e-7, 'film-pp', { lots: [measured, { ...lot, measuredCount: null }] }),
      ],
      'through-hole',
      { meterUncertainty: 0.0025 },
    );

    it('takes only those of which every lot was measured, at what they measured', () => {
      expect(shelf.capacitors).toHaveLength(1);
      expect(shelf.capacitors[0]!.farads / 1.02e-7).toBeCloseTo(1, 2);
      expect(shelf.capacitors[0]!.tolerance).toBeLessThan(0.05);
    });
  });
});

describe('demandOfChoice', () => {
  it('counts a value once for each role', () => {
    const choice: PackChoice = { parts: { R1: 5, R2: 5, R3: 5, C1: 7 }, join: null };
    expect(demandOfChoice(choice).filter(({ partId }) => partId === 5)).toHaveLength(3);
  });
});
