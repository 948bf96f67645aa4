import type { BenchOrder, Pick } from '../../server/contracts/bench.ts';

/** A stop for two resistors in D-64; give what differs. */
export function samplePick(changes: Partial<Pick> & { id: string }): Pick {
  return {
    bin: 'D-64',
    sku: 'TW-R1-453K',
    lot: '2608-A',
    label: '453 kΩ ± 1 %',
    marking: { bands: null, code: null, text: '' },
    kind: 'resistor',
    roles: ['R4'],
    quantity: 2,
    picked: 0,
    ...changes,
  };
}

/** An order with three stops, claimed by whoever looks at it. */
export function sampleOrder(changes: Partial<BenchOrder> = {}): BenchOrder {
  return {
    ref: 'TQ-1041',
    status: 'picking',
    shipBy: '2026-12-01T16:00:00.000Z',
    claimedBy: 'Ivo Brandreth',
    mine: true,
    shippingMethod: 'Letter, tracked',
    address: ['Pim Dorn', '1 Reed Lane', 'Sandwick'],
    lines: [],
    picks: [
      samplePick({ id: '1', bin: 'A-01', sku: 'TW-BT1', kind: 'board', roles: ['PCB'] }),
      samplePick({ id: '2' }),
      samplePick({ id: '3', bin: 'J-08', sku: 'TW-CP-330N', kind: 'capacitor', roles: ['C1'] }),
    ],
    shipment: null,
    ...changes,
  };
}
