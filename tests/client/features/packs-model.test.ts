import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bandOff,
  careWords,
  frontAndBehind,
  makeableWords,
  rateClause,
  reasonFor,
  tagParts,
  yieldClause,
} from '../../../client/features/packs/model.ts';
import { placeTags } from '../../../client/features/packs/scatter.ts';
import { narrow } from '../../../client/lib/spaces.ts';
import type { PackRole } from '../../../server/contracts/packs.ts';
import { samplePack, samplePart } from '../support/sample-pack.ts';

describe('frontAndBehind', () => {
  it('hangs every winner in front and fills up with the next in rank', () => {
    const packs = [
      samplePack('a', 0.05, 400, { wins: ['best-value'] }),
      samplePack('b', 0.06, 410),
      samplePack('c', 0.01, 900, { wins: ['closest', 'steadiest'] }),
      samplePack('d', 0.07, 420),
    ];
    const { front, behind } = frontAndBehind(packs);
    expect(front.map((pack) => pack.token)).toEqual(['a', 'c', 'b']);
    expect(behind.map((pack) => pack.token)).toEqual(['d']);
  });
});

describe('reasonFor', () => {
  it('names all ranks a pack won, with what they mean', () => {
    const pack = samplePack('a', 0.05, 400, { wins: ['best-value', 'closest'] });
    expect(reasonFor(pack, 0.05)).toEqual({
      title: 'Best value and closest',
      meaning: `cheapest with 99${narrow}% of kits in ±${narrow}5${narrow}%; nominal nearest to the rate`,
    });
  });
});

describe('bandOff', () => {
  it('measures the guaranteed band from the rate asked for', () => {
    const { low, high, worse } = bandOff(samplePack('a', 0.04, 400), 1.5);
    expect(low).toBeCloseTo(-0.04);
    expect(high).toBeCloseTo(0.04);
    expect(worse).toBeCloseTo(0.04);
  });
});

describe('tagParts', () => {
  it('draws R4 first, then C1, then the threshold resistors as one', () => {
    expect(tagParts(samplePack('a', 0.05, 400)).map((part) => [part.roles, part.value])).toEqual([
      ['R4', `887${narrow}kΩ`],
      ['C1', `560${narrow}nF`],
      ['R1–R3', `3${narrow}×${narrow}1${narrow}MΩ`],
    ]);
  });
});

describe('tagParts of other circuits', () => {
  const rolesOn = (...roles: PackRole[]) =>
    tagParts(
      samplePack('a', 0.05, 400, { parts: roles.map((role) => samplePart({ role, value: '1' })) }),
    ).map((part) => part.roles);

  it('draws both steering resistors, and leaves the diodes to the pack’s own page', () => {
    expect(rolesOn('U1', 'RC', 'RD', 'DC', 'DD', 'C1')).toEqual(['RC', 'RD', 'C1']);
  });

  it('draws a trimmer beside R4', () => {
    expect(rolesOn('R4', 'RV', 'C1')).toEqual(['R4', 'RV', 'C1']);
  });
});

describe('careWords', () => {
  it.each([
    ['as-stocked', 'As stocked', /as printed/],
    ['lot-checked', 'Lot-checked', /lots on our shelf measured/],
    ['bench-tuned', 'Bench-tuned', /R4 is chosen for it/],
    ['trimmer-fitted', 'Trimmer fitted', /you set the rate yourself/],
  ] as const)('names %s and says what it means', (careLevel, name, meaning) => {
    const words = careWords({ careLevel, join: null });
    expect(words.name).toBe(name);
    expect(words.meaning).toMatch(meaning);
  });
});

describe('yieldClause', () => {
  const said = (half: number, yieldWithinBand: number) => {
    const pack = samplePack('a', half, 400);
    const promise = { ...pack.promise, yieldWithinBand };
    return yieldClause({ ...pack, promise }, { band: 0.05, targetHz: 1.5 });
  };

  it('says every kit only where the guaranteed band lies inside the one asked for', () => {
    expect(said(0.04, 1)).toMatch(/^Every kit holds/);
    expect(said(0.06, 1)).toMatch(/^More than 99.9/);
    expect(said(0.06, 0.996)).toMatch(/^99.6 % of kits/);
  });
});

describe('rateClause', () => {
  it.each([
    ['90.1', 'a minute', true, 'blinks 90.1 times a minute'],
    ['1.50', 'Hz', true, 'blinks at 1.50 Hz'],
    ['32.0', 'kHz', false, 'ticks at 32.0 kHz'],
    ['2.00', 's a beat', true, 'blinks once in 2.00 s'],
    ['31.2', 'ms a beat', false, 'ticks once in 31.2 ms'],
  ])('reads %s %s', (rate, unit, isLight, sentence) => {
    const said = rateClause({ rate, unit }, isLight);
    expect(`${said.verb} ${said.rate}`).toBe(sentence);
  });
});

describe('makeableWords', () => {
  it('counts as people do', () => {
    expect(makeableWords(1)).toBe('only one can be made today');
    expect(makeableWords(41)).toMatch(/^41\u00a0can be made today$/);
  });
});

describe('placeTags', () => {
  it('keeps cheap left, steady up, and no tag hidden under another', () => {
    const pack = fc
      .tuple(fc.double({ min: 0.005, max: 0.3, noNaN: true }), fc.integer({ min: 300, max: 1500 }))
      .map(([half, cents]) => samplePack(`${half}-${cents}`, half, cents));
    fc.assert(
      fc.property(fc.array(pack, { minLength: 2, maxLength: 12 }), (packs) => {
        const placed = placeTags(packs, 1.5);
        for (const [index, tag] of placed.entries()) {
          expect(tag.x).toBeGreaterThanOrEqual(0);
          expect(tag.x).toBeLessThanOrEqual(1);
          for (const other of placed.slice(0, index)) {
            const apart =
              Math.abs(other.x - tag.x) >= 0.0279 || Math.abs(other.y - tag.y) >= 0.1299;
            expect(apart).toBe(true);
          }
        }
      }),
    );
  });

  it('puts the steadiest on top and the cheapest at the left', () => {
    const [wide, steady] = placeTags([samplePack('a', 0.2, 300), samplePack('b', 0.02, 900)], 1.5);
    expect(steady?.y).toBe(0);
    expect(wide?.y).toBe(1);
    expect(wide?.x).toBe(0);
    expect(steady?.x).toBe(1);
  });
});
