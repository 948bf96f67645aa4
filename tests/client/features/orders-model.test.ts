import { describe, expect, it } from 'vitest';
import {
  openingFor,
  statusWords,
  stepsOf,
  wordsForStatus,
} from '../../../client/features/orders/model.ts';
import { orderStatuses } from '../../../server/contracts/orders.ts';

describe('stepsOf', () => {
  it('marks what is done, what is now and what is ahead', () => {
    expect(stepsOf('picking')?.map((step) => step.state)).toEqual([
      'done',
      'done',
      'now',
      'ahead',
      'ahead',
    ]);
  });

  it('is all done once shipped', () => {
    expect(stepsOf('shipped')?.every((step) => step.state === 'done')).toBe(true);
  });

  it.each(['on_hold', 'cancelled', 'refunded'] as const)(
    'has no walk for an order that is %s',
    (status) => {
      expect(stepsOf(status)).toBeNull();
    },
  );
});

describe('an order in words', () => {
  it.each(orderStatuses)('has an opening sentence for %s', (status) => {
    const { light, heavy } = openingFor({ status, shipment: null });
    expect(`${light} ${heavy}`).not.toMatch(/_|undefined/);
    expect(statusWords[status]).not.toMatch(/_/);
  });

  it('puts the codes of the ledger into words and leaves other text alone', () => {
    expect(wordsForStatus('awaiting_payment')).toBe('waiting for payment');
    expect(wordsForStatus('Quay Post')).toBe('Quay Post');
    expect(wordsForStatus(null)).toBeNull();
  });

  it('names the carrier', () => {
    const shipment = { carrier: 'Quay Post', tracking: 'QP1', shippedAt: '2026-12-01T10:00:00Z' };
    expect(openingFor({ status: 'shipped', shipment }).heavy).toBe('Quay Post');
  });
});
