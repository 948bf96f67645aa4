import { describe, expect, it } from 'vitest';
import type { CareLevel } from '../../server/contracts/brief.ts';
import type { PackPart } from '../../server/contracts/packs.ts';
import { expectedReadings } from '../../server/domain/build-readings.ts';
import { buildSteps, type BuildFacts } from '../../server/domain/build-steps.ts';
import { toPackPart } from '../../server/domain/pack-parts.ts';
import { createCircuit } from '../../server/engine/circuit.ts';
import { blinker, find, rolesOf, type Found } from './found-packs.ts';
import { capacitor, resistor } from './sample-catalogue.ts';

const flash = { target: { value: 90, unit: 'per_minute' } } as const;
const clock = find({ target: { value: 1, unit: 'kHz' }, load: { kind: 'logic' } }, 4);
const steered = find({ ...flash, duty: 0.1 }, 1, 'steadiest');
const trimmed = find({ ...flash, careLevel: 'trimmer-fitted' });
const driven = find(flash, 4);

function factsOf(found: Found, change: Partial<BuildFacts> = {}): BuildFacts {
  const [pack] = found.packs;
  return {
    parts: found.parts,
    careLevel: found.inHand.brief.careLevel,
    buffered: pack!.frame.head.buffered,
    frequencyHz: pack!.frequencyHz,
    rate: '90.0 a minute',
    ...change,
  };
}

const stepOf = (facts: BuildFacts, title: string) =>
  buildSteps(facts).find((step) => step.title === title);
const withParts = (parts: PackPart[]) => factsOf(blinker, { parts });

describe('buildSteps', () => {
  it.each([
    ['a blinker', blinker],
    ['a clock', clock],
    ['a steered kit', steered],
    ['a kit with a trimmer', trimmed],
    ['a kit whose LED has a section of its own', driven],
  ])('places every part of %s once', (_, found) => {
    const roles = rolesOf(found.parts).filter((role) => role !== 'PCB');
    const setting = (title: string) => title === 'Set the rate';
    const steps = buildSteps(factsOf(found)).filter(({ title }) => !setting(title));
    expect(steps.flatMap((step) => step.roles).sort()).toEqual([...roles].sort());
  });

  it('powers last, the cells after the holder', () => {
    expect(buildSteps(factsOf(blinker)).at(-1)!.text).toMatch(/Fit the cells last/);
    expect(buildSteps(factsOf(clock)).at(-1)!.text).toMatch(/current limited/);
  });

  it('warns of polarity where there is one, and of nothing that is not there', () => {
    const polar = withParts([
      ...blinker.parts,
      toPackPart('C1', capacitor(4.7e-5, 'electrolytic')),
    ]);
    expect(stepOf(polar, 'Electrolytic capacitor')?.text).toMatch(/stripe marks minus/);
    expect(stepOf(factsOf(clock), 'LED')).toBeUndefined();
    expect(stepOf(factsOf(blinker), 'Diodes')).toBeUndefined();
    expect(stepOf(factsOf(blinker), 'Trimmer')).toBeUndefined();
  });

  it('solders chips with tweezers', () => {
    const chips = [toPackPart('R1', resistor(1e4, 0.01, { mounting: 'surface-mount' }))];
    expect(stepOf(withParts(chips), 'Resistors')?.text).toMatch(/tweezers/);
  });

  describe('with steering diodes', () => {
    it('says that the band is the cathode and which way each faces', () => {
      const step = stepOf(factsOf(steered), 'Diodes');
      expect(step?.roles).toEqual(['DC', 'DD']);
      expect(step?.text).toMatch(/^The band is the cathode/);
      expect(step?.text).toMatch(/DC points towards RC and C1, the band of DD towards the output/);
    });
  });

  describe('with idle sections', () => {
    it('says what holds their inputs and to leave the outputs open', () => {
      const text = stepOf(factsOf(clock), 'Comparator')?.text;
      expect(text).toMatch(/U1B to U1D are not used: R5 .* R6 .* Leave the outputs open/);
      const both = stepOf(factsOf(driven), 'Comparator')?.text;
      expect(both).toMatch(/U1A makes the beat, U1B drives the LED\. U1C and U1D are not used/);
      expect(stepOf(factsOf(blinker), 'Comparator')?.text).not.toMatch(/not used/);
    });
  });

  describe('with a trimmer', () => {
    it('sets it to the middle before power and to the rate after', () => {
      const titles = buildSteps(factsOf(trimmed)).map(({ title }) => title);
      expect(titles.indexOf('Trimmer')).toBeLessThan(titles.indexOf('Look it over, then power'));
      expect(titles.at(-1)).toBe('Set the rate');
      expect(stepOf(factsOf(trimmed), 'Trimmer')?.text).toMatch(/turn it to the middle/);
    });

    it('has slow beats counted by a clock, with figures that agree, and fast ones metered', () => {
      const text = stepOf(factsOf(trimmed), 'Set the rate')!.text;
      const [, beats, seconds] = /(\d+) beats take ([\d.]+)/.exec(text)!;
      expect(Number(beats) / Number(seconds)).toBeCloseTo(1.5, 3);
      const fast = factsOf(trimmed, { frequencyHz: 500 });
      expect(stepOf(fast, 'Set the rate')!.text).toMatch(/meter on Hz/);
    });
  });

  it.each<[CareLevel, RegExp]>([
    ['as-stocked', /ask us\.$/],
    ['lot-checked', /what the lot of its C1 measured on average/],
    ['bench-tuned', /chosen for the very C1 in this bag.* may differ from the pack page/],
    ['trimmer-fitted', /you set its rate yourself/],
  ])('says what %s means for the one who builds', (careLevel, words) => {
    expect(stepOf(factsOf(blinker, { careLevel }), 'Lay everything out')!.text).toMatch(words);
  });
});

describe('expectedReadings', () => {
  const readingsOf = (found: Found) =>
    expectedReadings(found.packs[0]!.circuit, found.parts, '90.0 a minute');
  const reading = (found: Found, point: RegExp) =>
    readingsOf(found).find((one) => point.test(one.point));

  it('says what each point should read, in the way one measures it', () => {
    const readings = readingsOf(blinker);
    expect(readings.map(({ point }) => point)).toEqual([
      'Supply',
      'Non-inverting input (R1, R2, R3 meet)',
      'C1',
      'Output',
      'First beat after power-on',
    ]);
    expect(readings[0]!.expect).toBe('3\u202fV');
    expect(readings[3]).toMatchObject({
      expect: '90.0 a minute',
      how: expect.stringMatching(/^Count beats/),
    });
  });

  it('has the driver’s output follow the output, lower by what the LED’s current takes', () => {
    const { expect: said, how } = reading(driven, /LED driver/)!;
    const high = Number(/about ([\d.]+)/.exec(said)![1]);
    expect(high).toBeLessThan(5);
    expect(high).toBeGreaterThan(4.8);
    // 2 mA asked for, and the next larger resistor taken.
    expect(Number(/carries ([\d.]+)/.exec(how)![1])).toBeLessThanOrEqual(2);
    expect(reading(blinker, /LED driver/)).toBeUndefined();
  });

  it('says what the idle inputs rest at', () => {
    expect(reading(clock, /idle sections/)?.expect).toMatch(/inverting 5\u202fV, non-inverting 0/);
    expect(reading(blinker, /idle/)).toBeUndefined();
  });

  it('says about what R4 and the trimmer come to once set', () => {
    const { timing } = trimmed.packs[0]!;
    if (timing.kind !== 'trimmed') throw new Error('A trimmer was asked for.');
    const said = reading(trimmed, /once set/)!.expect;
    const [, number, prefix] = /([\d.]+)\u202f([kM]?)Ω/.exec(said)!;
    const ohms = Number(number) * { k: 1e3, M: 1e6, '': 1 }[prefix as 'k' | 'M' | ''];
    expect(ohms / timing.ohms).toBeCloseTo(1, 2);
    expect(ohms).toBeGreaterThan(timing.fixed.ohms);
    expect(ohms).toBeLessThan(timing.fixed.ohms + timing.trimmer.ohms);
  });

  it('reads the supply alone where nothing oscillates', () => {
    const stuck = createCircuit({
      supplyVolts: 5,
      r1Ohms: 1e5,
      r2Ohms: 1e5,
      r3Ohms: 1e5,
      timing: { kind: 'single', ohms: 1e7 },
      capacitor: { farads: 1e-7, leakageOhms: 1e6 },
    });
    expect(expectedReadings(stuck, [], '')).toHaveLength(1);
  });
});
