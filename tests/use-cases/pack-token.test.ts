import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createSigner } from '../../server/adapters/signer.ts';
import { briefSchema, careLevels, ledColours, targetUnits } from '../../server/contracts/brief.ts';
import { packRoles } from '../../server/contracts/packs.ts';
import type { PackChoice } from '../../server/domain/pack-choice.ts';
import { readPackContent, writePackContent } from '../../server/use-cases/pack-token.ts';

const second = { target: { value: 1, unit: 's' } };

const anyChoice: fc.Arbitrary<PackChoice> = fc.record({
  parts: fc.dictionary(fc.constantFrom(...packRoles), fc.integer({ min: 1, max: 5000 })),
  join: fc.constantFrom(null, 'series' as const, 'parallel' as const),
});
const anyBrief = fc
  .record({
    target: fc.record({
      value: fc.double({ min: 1e-3, max: 1e5, noNaN: true }),
      unit: fc.constantFrom(...targetUnits),
    }),
    duty: fc.double({ min: 0.05, max: 0.95, noNaN: true }),
    supply: fc.oneof(
      fc.record({ volts: fc.double({ min: 0.5, max: 60, noNaN: true }) }),
      fc.constant({ battery: 'TW-CELL-AA-2' }),
    ),
    load: fc.oneof(
      fc.constant(undefined),
      fc.constant({ kind: 'logic' as const }),
      fc.record({
        kind: fc.constant('led' as const),
        colour: fc.constantFrom(...ledColours),
        amps: fc.double({ min: 0.0002, max: 0.03, noNaN: true }),
      }),
    ),
    band: fc.double({ min: 0.0005, max: 0.5, noNaN: true }),
    ambient: fc.constantFrom({ minCelsius: -20, maxCelsius: 60 }, { minCelsius: 0, maxCelsius: 0 }),
    mounting: fc.constantFrom('through-hole' as const, 'surface-mount' as const),
    careLevel: fc.constantFrom(...careLevels),
    quantity: fc.integer({ min: 1, max: 500 }),
  })
  .map((brief) => briefSchema.parse(brief));

describe('a pack token', () => {
  const signer = createSigner('a secret of the tests, long enough');

  it('holds any choice and brief, and gives back the very same', () => {
    fc.assert(
      fc.property(anyChoice, anyBrief, (choice, brief) => {
        const token = signer.seal(writePackContent({ choice, brief }));
        const content = readPackContent(signer.open(token)!);
        expect(content!.choice).toEqual({ ...choice, parts: { ...choice.parts } });
        expect(content!.brief).toEqual(brief);
        expect(token).toMatch(/^[\w-]+\.[\w-]+$/);
      }),
    );
  });

  it('is not opened once a single character was altered', () => {
    const brief = briefSchema.parse(second);
    const token = signer.seal(
      writePackContent({ choice: { parts: { U1: 1 }, join: null }, brief }),
    );
    fc.assert(
      fc.property(fc.nat(token.length - 1), fc.constantFrom(...'Aa0-_.'), (at, sign) => {
        const altered = token.slice(0, at) + sign + token.slice(at + 1);
        if (altered !== token && at !== token.length - 1) expect(signer.open(altered)).toBeNull();
      }),
      { numRuns: 300 },
    );
    expect(createSigner('another secret of the tests').open(token)).toBeNull();
    expect(signer.open('')).toBeNull();
    expect(signer.open(`${token}.${token}`)).toBeNull();
  });

  it.each([
    '',
    '{}',
    '[]',
    '[1]',
    '[2,0,[],[]]',
    '[1,0,[99,1],[]]',
    '[1,0,[0,"x"],[]]',
    '[1,0,[],[0]]',
    'null',
    '[1,0,[],[1,0,0.5,5,[9,9],0.05,0,40,0,0,1]]',
  ])('with %s inside makes no sense and is no pack', (text) => {
    expect(readPackContent(text)).toBeNull();
  });
});
