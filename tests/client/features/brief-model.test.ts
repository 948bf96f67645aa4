import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applyAdvice } from '../../../client/features/brief/advice.ts';
import {
  defaultDraft,
  draftFromQuery,
  errorsFromProblem,
  queryFromDraft,
  rateInOtherWords,
  readDraft,
  targetHertz,
} from '../../../client/features/brief/model.ts';
import { narrow } from '../../../client/lib/spaces.ts';
import { careLevels, solveRequestSchema, targetUnits } from '../../../server/contracts/brief.ts';
import { sampleShop } from '../support/render.tsx';

describe('readDraft', () => {
  it('asks for the default brief: a red LED, 90 a minute, half, two AA cells, ± 5 %, 0 to 40 °C', () => {
    const { request } = readDraft(defaultDraft, sampleShop);
    expect(request).toMatchObject({
      target: { value: 90, unit: 'per_minute' },
      duty: 0.5,
      supply: { battery: 'TW-AA2' },
      load: { kind: 'led', colour: 'red', amps: 0.002 },
      band: 0.05,
      ambient: { minCelsius: 0, maxCelsius: 40 },
    });
    expect(solveRequestSchema.safeParse(request).success).toBe(true);
  });

  it('asks for a logic clock by voltage', () => {
    const draft = {
      ...defaultDraft,
      load: 'clock',
      supply: 'volts',
      volts: '3,3',
      unit: 'kHz' as const,
    };
    const { request } = readDraft({ ...draft, rate: '32' }, sampleShop);
    expect(request).toMatchObject({
      target: { value: 32, unit: 'kHz' },
      supply: { volts: 3.3 },
      load: { kind: 'logic' },
    });
  });

  it.each([
    ['rate', 'fast'],
    ['rate', '0'],
    ['lit', '99'],
    ['band', ''],
    ['from', '-80'],
    ['kits', '1.5'],
    ['milliamps', '100'],
  ] as const)('has a sentence for %s = "%s"', (field, value) => {
    const { errors } = readDraft({ ...defaultDraft, [field]: value }, sampleShop);
    expect(errors?.[field]).toMatch(/^Type .+\.$/);
  });

  it('says when the two temperatures are the wrong way round', () => {
    const { errors } = readDraft({ ...defaultDraft, from: '50', to: '10' }, sampleShop);
    expect(errors?.from).toMatch(/swap/);
  });

  it('does not judge the LED current of a logic clock', () => {
    const draft = { ...defaultDraft, load: 'clock', milliamps: 'none' };
    expect(readDraft(draft, sampleShop).errors).toBeUndefined();
  });
});

describe('the care level', () => {
  it.each(careLevels)('%s is asked for as chosen, and stays in the address', (care) => {
    const draft = { ...defaultDraft, care };
    expect(readDraft(draft, sampleShop).request?.careLevel).toBe(care);
    expect(draftFromQuery(new URLSearchParams(queryFromDraft(draft))).care).toBe(care);
  });

  it('is as stocked where the address names one there is not', () => {
    const draft = draftFromQuery(new URLSearchParams('care=gold-plated'));
    expect(readDraft(draft, sampleShop).request?.careLevel).toBe('as-stocked');
  });
});

describe('the brief in the address', () => {
  it('is silent about the default', () => {
    expect(queryFromDraft(defaultDraft)).toBe('');
  });

  it('names rate and unit as soon as anything differs', () => {
    expect(queryFromDraft({ ...defaultDraft, load: 'green' })).toBe(
      'rate=90&unit=per_minute&load=green',
    );
  });

  it('comes back as it went', () => {
    const drafts = fc.record({
      rate: fc.string({ minLength: 1, maxLength: 12 }),
      unit: fc.constantFrom(...targetUnits),
      load: fc.constantFrom('red', 'blue', 'clock'),
      band: fc.integer({ min: 1, max: 50 }).map(String),
      supply: fc.constantFrom('', 'volts', 'TW-AA2'),
    });
    fc.assert(
      fc.property(drafts, (changes) => {
        const draft = { ...defaultDraft, ...changes };
        expect(draftFromQuery(new URLSearchParams(queryFromDraft(draft)))).toEqual(draft);
      }),
    );
  });

  it('ignores units, colours and lengths it does not know', () => {
    const query = new URLSearchParams({
      unit: 'furlongs',
      load: 'ultraviolet',
      rate: '9'.repeat(200),
    });
    expect(draftFromQuery(query)).toEqual(defaultDraft);
  });
});

describe('targetHertz', () => {
  it.each([
    ['90', 'per_minute', 1.5],
    ['2', 's', 0.5],
    ['4', 'ms', 250],
    ['32', 'kHz', 32_000],
  ] as const)('reads %s %s as %s Hz', (rate, unit, hertz) => {
    expect(targetHertz({ rate, unit })).toBeCloseTo(hertz, 9);
  });
});

describe('rateInOtherWords', () => {
  it('gives the rate in hertz and the length of one beat', () => {
    expect(rateInOtherWords(defaultDraft).replaceAll(narrow, ' ')).toBe(
      '1.5 Hz · one beat lasts 667 ms',
    );
  });

  it('never says millihertz of a slow blinker', () => {
    const said = rateInOtherWords({ ...defaultDraft, rate: '2', unit: 's' });
    expect(said.replaceAll(narrow, ' ')).toBe('0.5 Hz · one beat lasts 2 s');
  });

  it('says nothing of a rate it cannot read', () => {
    expect(rateInOtherWords({ ...defaultDraft, rate: '' })).toBe('');
  });
});

describe('applyAdvice', () => {
  it('patches what the advice names and leaves the rest', () => {
    const next = applyAdvice(defaultDraft, { band: 0.1, supply: { volts: 5 } });
    expect(next).toEqual({ ...defaultDraft, band: '10', supply: 'volts', volts: '5' });
  });

  it.each([
    [{ careLevel: 'trimmer-fitted' }, { care: 'trimmer-fitted' }],
    [{ band: 0.122 }, { band: '12.2' }],
    [{ mounting: 'surface-mount' }, { mounting: 'surface-mount' }],
    [{ quantity: 37 }, { kits: '37' }],
    [{ ambient: { minCelsius: 15, maxCelsius: 30 } }, { from: '15', to: '30' }],
    [{ duty: 0.95 }, { lit: '95' }],
    [{ load: { kind: 'led', colour: 'blue', amps: 0.001 } }, { load: 'blue', milliamps: '1' }],
    [{ load: { kind: 'logic' } }, { load: 'clock' }],
    [{ target: { value: 0.05, unit: 'Hz' } }, { rate: '0.05', unit: 'Hz' }],
  ])('carries over %o', (change, expected) => {
    expect(applyAdvice(defaultDraft, change)).toEqual({ ...defaultDraft, ...expected });
  });

  it('leaves the brief alone when the patch makes no sense', () => {
    expect(applyAdvice(defaultDraft, { band: 'wide' })).toEqual(defaultDraft);
  });
});

describe('errorsFromProblem', () => {
  it('puts each sentence at the control it speaks of', () => {
    const errors = errorsFromProblem({
      message: 'No circuit can do this.',
      fields: [
        { path: 'load.colour', message: 'A blue LED needs 3.1 V.' },
        { path: 'ambient.maxCelsius', message: 'Too hot.' },
      ],
    });
    expect(errors).toEqual({ load: 'A blue LED needs 3.1 V.', to: 'Too hot.' });
  });

  it('puts a sentence without a path at the rate', () => {
    expect(errorsFromProblem({ message: 'Not today.', fields: [] })).toEqual({
      rate: 'Not today.',
    });
  });
});

describe('a rate out of all measure', () => {
  it.each(['1e308', '1000000001', '0', '1e-12'])('echoes nothing of %s', (rate) => {
    expect(rateInOtherWords({ ...defaultDraft, rate })).toBe('');
  });
});
