import { describe, expect, it } from 'vitest';
import { shipByWords, timeLeftWords } from '../../client/features/bench/ship-by.ts';
import {
  lastStop,
  nextKit,
  nextStop,
  picksWith,
  readScan,
  stageOf,
  walkablePicks,
  withPicked,
} from '../../client/features/bench/walk.ts';
import { noBreak } from '../../client/lib/spaces.ts';
import { sampleOrder, samplePick, sampleTuned, sampleTunedOrder } from './bench-samples.ts';

const plain = (text: string) => text.replaceAll(noBreak, ' ');

describe('nextStop', () => {
  const taken = (id: string) => samplePick({ id, picked: 2 });
  const open = (id: string) => samplePick({ id });

  it('is the first open stop after the last one made', () => {
    expect(nextStop([open('1'), taken('2'), open('3')], '2')?.id).toBe('3');
  });
  it('comes back to a stop that was passed over', () => {
    expect(nextStop([open('1'), taken('2'), taken('3')], '3')?.id).toBe('1');
  });
  it('counts a stop with too few pieces in the tray as open', () => {
    expect(nextStop([samplePick({ id: '1', picked: 1 })], null)?.id).toBe('1');
  });
  it('is none when everything is in the tray', () => {
    expect(nextStop([taken('1'), taken('2')], '1')).toBeNull();
  });
});

describe('lastStop', () => {
  const picks = [
    samplePick({ id: '1', picked: 2 }),
    samplePick({ id: '2', picked: 2 }),
    samplePick({ id: '3' }),
  ];

  it('is the stop made last here, not the last of the walk', () => {
    expect(lastStop(picks, ['2', '1'])?.id).toBe('1');
  });
  it('is the last one done of the walk when nothing was made here yet', () => {
    expect(lastStop(picks, [])?.id).toBe('2');
  });
  it('is none when the tray is empty', () => {
    expect(lastStop([samplePick({ id: '1' })], ['1'])).toBeNull();
  });
});

describe('readScan', () => {
  const { picks } = sampleOrder();
  const stop = picks[1];
  if (stop === undefined) throw new Error('The sample has three stops.');

  it.each(['D-64', 'd64', ' D 64 ', 'TW-R1-453K', 'tw_r1_453k'])('takes %j at D-64', (code) => {
    expect(readScan(code, stop, picks).kind).toBe('right');
  });
  it('says which stop a code of this walk belongs to, and what is wanted here', () => {
    expect(readScan('J-08', stop, picks)).toEqual({
      kind: 'wrong',
      sentence: 'J-08 is stop 3 of this walk. This stop wants bin D-64 or TW-R1-453K.',
    });
  });
  it('says that a strange code is not on this walk', () => {
    expect(readScan('Z-99', stop, picks)).toMatchObject({
      sentence: expect.stringContaining('Z-99 is not on this walk.') as string,
    });
  });
  it('asks for the part where the bin holds another value of this walk', () => {
    const other = samplePick({ id: '4', bin: 'D-64', sku: 'TW-R1-464K' });
    const shared = [...picks, other];
    expect(readScan('d64', stop, shared)).toEqual({
      kind: 'unclear',
      sentence: 'D-64 holds several values of this walk; scan the part, TW-R1-453K.',
    });
    expect(readScan('TW-R1-453K', stop, shared).kind).toBe('right');
    expect(readScan('TW-R1-464K', stop, shared)).toEqual({
      kind: 'wrong',
      sentence: 'TW-R1-464K is stop 4 of this walk. This stop wants TW-R1-453K.',
    });
  });
  it('takes the bin for two lots of the same part', () => {
    const lot = samplePick({ id: '4', lot: '2609-B' });
    expect(readScan('D-64', stop, [...picks, lot]).kind).toBe('right');
  });
  it('takes a bare Enter, as scanners send it, for nothing at all', () => {
    expect(readScan('  ', stop, picks).kind).toBe('empty');
  });
});

describe('stageOf', () => {
  const allTaken = sampleOrder().picks.map((pick) => ({ ...pick, picked: pick.quantity }));
  const allButTiming = allTaken.map((pick) => (pick.id === '2' ? { ...pick, picked: 0 } : pick));
  it.each([
    ['unclaimed', sampleOrder({ status: 'paid', claimedBy: null, mine: false })],
    ['elsewhere', sampleOrder({ claimedBy: 'Maud Tarrow', mine: false })],
    ['walk', sampleOrder()],
    ['walk', sampleTunedOrder([null])],
    ['tune', sampleTunedOrder([null], { picks: allButTiming })],
    ['walk', sampleTunedOrder([sampleTuned()], { picks: allButTiming })],
    ['bag', sampleTunedOrder([sampleTuned()], { picks: allTaken })],
    ['bag', sampleOrder({ picks: allTaken })],
    ['ship', sampleOrder({ status: 'packed', picks: allTaken })],
    ['shipped', sampleOrder({ status: 'shipped', picks: allTaken })],
  ])('is %s', (stage, order) => {
    expect(stageOf(order)).toBe(stage);
  });
});

describe('the walk of a bench-tuned order', () => {
  it('leaves R4 alone until every capacitor is measured', () => {
    const ids = (order: ReturnType<typeof sampleOrder>) => walkablePicks(order).map(({ id }) => id);
    expect(ids(sampleTunedOrder([sampleTuned(), null]))).toEqual(['1', '3']);
    expect(ids(sampleTunedOrder([sampleTuned()]))).toEqual(['1', '2', '3']);
    expect(ids(sampleOrder())).toEqual(['1', '2', '3']);
  });
  it('takes a resistor that is R1 as well as R4 at once', () => {
    const picks = [samplePick({ id: '1', roles: ['R1', 'R4'] })];
    expect(walkablePicks(sampleTunedOrder([null], { picks }))).toHaveLength(1);
  });
  it('measures the kits in turn', () => {
    expect(nextKit(sampleTunedOrder([sampleTuned(), null, null]))?.unit).toBe(2);
    expect(nextKit(sampleTunedOrder([sampleTuned()]))).toBeNull();
    expect(nextKit(sampleOrder())).toBeNull();
  });
});

describe('picksWith', () => {
  const [part] = sampleTuned().take;
  if (part === undefined) throw new Error('The sample takes one resistor.');

  it('adds what was taken to what lies in the tray', () => {
    const picks = [samplePick({ id: '2', quantity: 3, picked: 1 })];
    expect(picksWith(sampleOrder({ picks }), [part])).toEqual([{ id: '2', quantity: 2 }]);
    expect(picksWith(sampleOrder({ picks }), [part, part])).toEqual([{ id: '2', quantity: 3 }]);
  });
  it('goes on in the next lot where one is used up, and never beyond what is wanted', () => {
    const picks = [
      samplePick({ id: '2', quantity: 1 }),
      samplePick({ id: '4', quantity: 1, lot: '2609-B' }),
    ];
    expect(picksWith(sampleOrder({ picks }), [part, part, part])).toEqual([
      { id: '2', quantity: 1 },
      { id: '4', quantity: 1 },
    ]);
  });
});

describe('withPicked', () => {
  it('changes one pick and leaves the order it was given alone', () => {
    const order = sampleOrder();
    expect(withPicked(order, '2', 2).picks.map((pick) => pick.picked)).toEqual([0, 2, 0]);
    expect(order.picks.map((pick) => pick.picked)).toEqual([0, 0, 0]);
  });
});

describe('ship-by words', () => {
  const at = (hour: number, day = 1) => new Date(2026, 11, day, hour, 0);
  const iso = (date: Date) => date.toISOString();

  it('say today and tomorrow, and the day of the week further on', () => {
    expect(plain(shipByWords(iso(at(16)), at(9)))).toBe('16:00 today');
    expect(plain(shipByWords(iso(at(16, 2)), at(9)))).toBe('16:00 tomorrow');
    expect(plain(shipByWords(iso(at(16, 4)), at(9)))).toBe('Fri 4 Dec, 16:00');
  });
  it('say how much time is left, or how late it is', () => {
    expect(plain(timeLeftWords(iso(at(16)), at(14)))).toBe('in 2 h');
    expect(plain(timeLeftWords(iso(at(14)), new Date(2026, 11, 1, 14, 40)))).toBe('late by 40 min');
    expect(plain(timeLeftWords(iso(at(16, 2)), new Date(2026, 11, 1, 14, 7)))).toBe('in 26 h');
    expect(plain(timeLeftWords(iso(at(16, 5)), at(16)))).toBe('in 4 days');
  });
});
