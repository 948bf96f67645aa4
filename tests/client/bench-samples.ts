import type { BenchOrder, Pick, TunedUnit } from '../../server/contracts/bench.ts';
import { samplePack } from './support/sample-pack.ts';

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

/** A kit that reads 818.2 nF and takes one 453 kΩ from D-64; give what differs. */
export function sampleTuned(changes: Partial<TunedUnit> = {}): TunedUnit {
  const take = {
    role: 'R4' as const,
    sku: 'TW-R1-453K',
    kind: 'resistor' as const,
    quantity: 1,
    label: '453 kΩ ± 1 %',
    value: '453 kΩ',
    mounting: 'through-hole' as const,
    marking: { bands: null, code: null, text: '453 kΩ' },
    bins: ['D-64'],
  };
  const { promise } = samplePack('tuned', 0.02, 725);
  const reading = '818.2 nF';
  return { unit: 1, farads: 8.182e-7, reading, take: [take], join: null, promise, ...changes };
}

/** The sample order with one bench-tuned line of as many kits as are given; null is one not tuned yet. */
export function sampleTunedOrder(
  kits: readonly (TunedUnit | null)[],
  changes: Partial<BenchOrder> = {},
): BenchOrder {
  const line = {
    id: '6b0e4b6e-0d0f-4b7a-9b62-0f3f5b2f8a11',
    sentence: 'A red LED blinks 90 times a minute',
    quantity: kits.length,
    parts: [],
    cautions: [],
    tuning: {
      capacitor: '820 nF ± 5 % film (PET)',
      from: '777.05 nF',
      to: '863.15 nF',
      sold: samplePack('sold', 0.03, 725).promise,
      units: kits.map((kit, k) => kit ?? { unit: k + 1, farads: null }),
    },
  };
  return sampleOrder({ lines: [line], ...changes });
}
