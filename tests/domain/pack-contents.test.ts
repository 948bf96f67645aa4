import { describe, expect, it } from 'vitest';
import { adviseOn } from '../../server/domain/advice.ts';
import { labelOf, markingOf } from '../../server/domain/pack-parts.ts';
import {
  addressLines,
  confirmationMail,
  refundMail,
  shippedMail,
} from '../../server/domain/order-mail.ts';
import { promiseOf } from '../../server/domain/promise.ts';
import { causesSentence } from '../../server/domain/spread-causes.ts';
import type { RankedPack } from '../../server/engine/search/promise.ts';
import { spreadCauses } from '../../server/engine/search/kit-causes.ts';
import { blinker, find, rolesOf } from './found-packs.ts';
import { board, capacitor, comparator, diode, resistor, trimmer } from './sample-catalogue.ts';

describe('the parts of a pack', () => {
  it('are all that the kit needs, in the order of a bill of materials', () => {
    const listed = rolesOf(blinker.parts).filter((role) => !/^R4/.test(role));
    expect(listed).toEqual(['U1', 'R1', 'R2', 'R3', 'C1', 'LED', 'RL', 'C2', 'PCB', 'BH', 'BAT']);
    const timing = rolesOf(blinker.parts)
      .filter((role) => /^R4/.test(role))
      .join();
    expect(['R4', 'R4A,R4B']).toContain(timing);
  });

  it.each([
    // IEC 60062 colours and codes; E96 chip code from the reference tables.
    [resistor(887e3, 0.01), 'grey grey violet orange brown'],
    [resistor(4700, 0.05), 'yellow violet red gold'],
    [resistor(10e3, 0.01, { mounting: 'surface-mount' }), '01C'],
    [resistor(4700, 0.05, { mounting: 'surface-mount' }), '472'],
    [capacitor(5.6e-7), '564J'],
    [capacitor(1e-7, 'X7R', { mounting: 'surface-mount' }), 'not marked; keep it in its bag'],
    [capacitor(4.7e-5, 'electrolytic'), '47\u202fµF 63\u202fV'],
    [comparator(1), 'TW-C1'],
    [trimmer(5e5), '504'],
    [diode(), 'a band round one end marks the cathode'],
    [board(1), ''],
  ])('are marked as one reads them (%#)', (one, text) => {
    expect(markingOf(one).text.replace(/\s*\/.*/, '')).toBe(text);
  });

  it('say their value and tolerance', () => {
    expect(labelOf(resistor(887e3, 0.001))).toBe('887\u202fkΩ ±\u00a00.1\u202f%');
    expect(labelOf(capacitor(5.6e-7))).toBe('560\u202fnF ±\u00a05\u202f% film (PET)');
    expect(labelOf(board(1))).toBe('Board');
    expect(labelOf(trimmer(5e5))).toBe('500\u202fkΩ ±\u00a010\u202f% trimmer');
    expect(labelOf(diode())).toBe('Diode, silicon signal');
  });
});

describe('the promise in words', () => {
  it('holds its own numbers, whatever the unit', () => {
    for (const unit of ['Hz', 'kHz', 'per_minute', 's', 'ms'] as const) {
      const { inHand, packs } = find({
        target: { value: unit === 'kHz' ? 1 : 50, unit },
        load: { kind: 'logic' },
      });
      for (const pack of packs) {
        const promise = promiseOf(pack, inHand.brief);
        const inUnit = (hertz: number) =>
          ({ Hz: hertz, kHz: hertz / 1e3, per_minute: hertz * 60, s: 1 / hertz, ms: 1e3 / hertz })[
            unit
          ];
        const ends = [promise.band.minHz, promise.band.maxHz].map(inUnit).sort((a, b) => a - b);
        expect(Number(promise.text.from)).toBeLessThanOrEqual(ends[0]! * (1 + 1e-8));
        expect(Number(promise.text.to)).toBeGreaterThanOrEqual(ends[1]! * (1 - 1e-8));
        const half = Number(promise.text.band.replace(/[^\d.]/g, '')) / 100;
        expect(promise.frequencyHz * (1 + half)).toBeGreaterThanOrEqual(
          promise.band.maxHz * (1 - 1e-9),
        );
        expect(promise.frequencyHz * (1 - half)).toBeLessThanOrEqual(
          promise.band.minHz * (1 + 1e-9),
        );
        expect(promise.text.error).toMatch(/on target|\d.*% (fast|slow)/);
        expect(promise.duty).toBeCloseTo(0.5, 1);
        expect(promise.averageSupplyAmps).toBeGreaterThan(9e-6);
      }
    }
  });

  it('never says 100 % of a share that is not all', () => {
    const { inHand, packs } = find({
      target: { value: 50, unit: 'Hz' },
      load: { kind: 'logic' },
      band: 0.05,
    });
    const worded = (yieldWithinBand: number) =>
      promiseOf(
        { ...packs[0]!, yieldWithinBand, guaranteed: { minHz: 1, maxHz: 99 } },
        inHand.brief,
      ).text.yield;
    expect(worded(0.99996)).not.toMatch(/^100/);
    expect(worded(0.9839)).toBe('98.3\u202f%');
  });
});

describe('the causes of the spread', () => {
  it('are sorted, add up to about half the guaranteed band, and name the first', () => {
    for (const pack of blinker.packs) {
      const causes = spreadCauses(pack, blinker.inHand.search, blinker.shelf);
      const fractions = causes.map(({ fraction }) => fraction);
      expect([...fractions].sort((a, b) => b - a)).toEqual(fractions);
      const half = Math.log(pack.guaranteed.maxHz / pack.guaranteed.minHz) / 2;
      expect(fractions.reduce((a, b) => a + b, 0) / half).toBeGreaterThan(0.9);
      expect(causesSentence(causes)).toMatch(
        /^The (capacitor|timing|comparator|threshold).* makes? \d+(\.\d)?\u202f% of the spread\.$/,
      );
    }
    expect(causesSentence([])).toBe('Nothing spreads this pack.');
  });
});

describe('the mails', () => {
  const shop = {
    name: 'Tockwell',
    address: ['The Old Clock House', 'Merrow Quay'],
    email: 'shop@tockwell.example',
  };
  const shipTo = {
    name: 'Ann <b>"O’Quay"</b> & Sons',
    line1: '1 Pier',
    city: 'Eelmouth',
    postalCode: 'EM1',
    country: 'IE',
  };
  const order = {
    ref: 'TQ-1041',
    shipTo,
    shippingName: 'Letter',
    goodsMinor: 1234,
    shippingMinor: 357,
    taxMinor: 298,
    taxBasisPoints: 2300,
    totalMinor: 1591,
    shipBy: new Date('2026-12-02T16:00:00Z'),
  };
  const line = {
    identifier: 'TQ-1041-1',
    sentence: 'A red LED blinks <fast>',
    quantity: 2,
    lineGrossMinor: 1234,
    promise: promiseOf(blinker.packs[0]!, blinker.inHand.brief),
    cautions: [{ code: 'flash' as const, text: 'Do not stare & keep away', mustAcknowledge: true }],
  };
  const confirmation = confirmationMail({
    shop,
    order,
    lines: [line, line],
    link: 'https://tockwell.example/o?a=1&b="2"',
    countryName: 'Ireland',
  });

  it('confirm with totals, tax, the day, withdrawal and cautions, as text and as HTML', () => {
    for (const body of [confirmation.text, confirmation.html]) {
      for (const words of [
        '12.34',
        '3.57',
        '15.91',
        '2.98',
        '23',
        'Wednesday',
        '2 December',
        '14 days',
        'TQ-1041-1',
        'shop@tockwell.example',
      ]) {
        expect(body).toContain(words);
      }
    }
    expect(confirmation.text).toContain('Do not stare & keep away');
    expect(confirmation.text.split('Do not stare').length).toBe(2);
    expect(confirmation.subject).toContain('TQ-1041');
  });

  it('never let a name or an address become markup', () => {
    expect(confirmation.html).not.toMatch(/<b>|<fast>|stare & keep/);
    expect(confirmation.html).toContain('&#60;b&#62;');
    expect(confirmation.html).toContain('href="https://tockwell.example/o?a=1&#38;b=&#34;2&#34;"');
    expect(confirmation.text).toContain('Ann <b>"O’Quay"</b> & Sons');
  });

  it('say how the parcel goes, and what comes back', () => {
    const shipped = shippedMail({
      shop,
      order,
      lines: [line],
      carrier: 'Quay Post',
      tracking: 'QP<1>',
      link: 'https://x.example',
    });
    expect(shipped.text).toContain('Tracking number: QP<1>');
    expect(shipped.html).toContain('QP&#60;1&#62;');
    expect(shipped.text).toContain('Do not stare');
    const refund = refundMail({ shop, order, amount: { amount: 1591, currency: 'EUR' } });
    for (const body of [refund.text, refund.html]) expect(body).toContain('15.91');
  });

  it('write an address without empty lines, the country last', () => {
    const lines = addressLines({ ...shipTo, name: 'Ann', region: 'West', line2: '' }, 'Ireland');
    expect(lines).toEqual(['Ann', '1 Pier', 'EM1 Eelmouth', 'West', 'IRELAND']);
    expect(addressLines({ ...shipTo, name: 'Ann', postalCode: '' }, 'Ireland')[2]).toBe('Eelmouth');
  });
});

describe('adviseOn', () => {
  const { brief } = find({ target: { value: 90, unit: 'per_minute' } }).inHand;
  const near = { ...blinker.packs[0]!, distance: 0.001 };
  const none = { packs: [], considered: 0 };
  const codes = (...args: Parameters<typeof adviseOn>) => adviseOn(...args).map(({ code }) => code);

  it('has nothing to say where a pack holds the band', () => {
    const best: RankedPack = { ...near, wins: ['best-value'] };
    expect(adviseOn(brief, { packs: [best], considered: 1 }, null, () => null)).toEqual([]);
  });

  it('says how often the shelves hold the brief, to the last kit', () => {
    const retry = ({ quantity }: { quantity?: number }) =>
      quantity !== undefined && quantity <= 37 ? near : null;
    const advice = adviseOn({ ...brief, quantity: 400 }, none, null, retry);
    expect(advice[0]).toMatchObject({ code: 'quantity', change: { quantity: 37 } });
    expect(advice[0]!.text).toContain('37 times');
  });

  it('turns to the nearest duty, the other mounting, or no LED, where that helps', () => {
    expect(adviseOn({ ...brief, duty: 0.97 }, none, null, () => null)[0]).toMatchObject({
      code: 'duty',
      change: { duty: 0.95 },
    });
    expect(codes(brief, none, null, (change) => (change.mounting ? near : null))).toContain(
      'mounting',
    );
    const withoutLed: Parameters<typeof adviseOn>[3] = (change) =>
      change.load?.kind === 'logic' ? near : null;
    expect(codes(brief, none, null, withoutLed)).toContain('load');
    const gentler = adviseOn(brief, none, null, (change) =>
      change.load?.kind === 'led' ? near : null,
    );
    expect(gentler[0]).toMatchObject({ code: 'current', change: { load: { amps: 0.001 } } });
    expect(codes(brief, none, null, () => null)).toEqual(['out-of-reach']);
    expect(codes(brief, none, 'Only 1 left.', () => null)).toEqual(['missing-part']);
  });

  it('turns to as stocked where the shelves cannot give the care asked for', () => {
    const [first] = adviseOn({ ...brief, careLevel: 'bench-tuned' }, none, null, () => near);
    expect(first).toMatchObject({ code: 'care-level', change: { careLevel: 'as-stocked' } });
    expect(first!.worseEnd).toBeGreaterThan(0);
  });

  it('offers the stronger care levels that narrow the band, with how far each does', () => {
    const guaranteed = (half: number) => ({ minHz: 1.5 * (1 - half), maxHz: 1.5 * (1 + half) });
    const steadiest: RankedPack = {
      ...near,
      wins: ['steadiest'],
      guaranteed: guaranteed(0.06),
      yieldWithinBand: 0.5,
    };
    const tight = { ...brief, targetHz: 1.5, band: 0.01, careLevel: 'lot-checked' as const };
    const halves = { 'bench-tuned': 0.02, 'trimmer-fitted': 0.058 };
    const advice = adviseOn(tight, { packs: [steadiest], considered: 1 }, null, ({ careLevel }) =>
      careLevel === 'bench-tuned' || careLevel === 'trimmer-fitted'
        ? { ...steadiest, guaranteed: guaranteed(halves[careLevel]) }
        : null,
    );
    const care = advice.filter(({ code }) => code === 'care-level');
    expect(care.map(({ change }) => change)).toEqual([{ careLevel: 'bench-tuned' }]);
    expect(care[0]!.worseEnd).toBeCloseTo(0.02, 9);
    expect(care[0]!.text).toMatch(/^Bench-tuned, every kit stays within ±\u00a02\u202f%/);
  });

  it('names the band that the steadiest pack holds, or how far the nearest rate is', () => {
    const steadiest: RankedPack = {
      ...near,
      wins: ['steadiest'],
      guaranteed: { minHz: 1.4, maxHz: 1.6 },
    };
    const tight = { ...brief, targetHz: 1.5, band: 0.01 };
    const [band] = adviseOn(tight, { packs: [steadiest], considered: 1 }, null, () => null);
    expect(band).toMatchObject({ code: 'band', change: { band: 0.067 } });
    const far = { ...steadiest, distance: 0.2 };
    expect(codes(tight, { packs: [far], considered: 1 }, null, () => null)).toEqual(['rate']);
    const wild = { ...steadiest, guaranteed: { minHz: 0.1, maxHz: 9 } };
    expect(codes(tight, { packs: [wild], considered: 1 }, null, () => null)).toEqual([]);
  });
});
