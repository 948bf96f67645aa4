import type { Pack, PackPart } from '../../../server/contracts/packs.ts';
import { idealStrip } from '../../../client/ui/strip-geometry.ts';

export function samplePart(changes: Partial<PackPart> & Pick<PackPart, 'role'>): PackPart {
  return {
    sku: `S-${changes.role}`,
    kind: 'resistor',
    quantity: 1,
    label: '1 MΩ ± 1 %',
    value: '1 MΩ',
    mounting: 'through-hole',
    marking: {
      bands: ['brown', 'black', 'black', 'yellow', 'brown'],
      code: null,
      text: 'brown black black yellow brown',
    },
    ...changes,
  };
}

const rateText = {
  rate: '90.1',
  unit: 'a minute',
  band: '± 4.6 %',
  from: '86.0',
  to: '94.3',
  error: '0.1 % fast',
  yield: '99.6 %',
  supply: '1.0 mA',
};

/** A pack at 1.5 Hz whose guaranteed band reaches `half` either side, at `cents` a kit. */
export function samplePack(
  token: string,
  half: number,
  cents: number,
  changes: Partial<Pack> = {},
): Pack {
  return {
    token,
    topology: 'equal-thresholds',
    why: 'Three like resistors set thresholds at a third and two thirds of the supply.',
    careLevel: 'as-stocked',
    buffered: false,
    notes: [],
    join: null,
    timingOhms: 887_000,
    parts: [
      samplePart({ role: 'R1', sku: 'R-1M' }),
      samplePart({ role: 'R2', sku: 'R-1M' }),
      samplePart({ role: 'R3', sku: 'R-1M' }),
      samplePart({ role: 'R4', sku: 'R-887k', value: '887 kΩ' }),
      samplePart({
        role: 'C1',
        kind: 'capacitor',
        value: '560 nF',
        marking: { bands: null, code: '564J', text: '564J' },
      }),
    ],
    promise: {
      frequencyHz: 1.5,
      error: 0,
      band: { minHz: 1.5 * (1 - half), maxHz: 1.5 * (1 + half) },
      yieldWithinBand: 0.996,
      yieldStandardError: 0.001,
      duty: 0.5,
      averageSupplyAmps: 0.001,
      text: rateText,
    },
    price: {
      unit: { amount: cents, currency: 'EUR' },
      total: { amount: cents, currency: 'EUR' },
    },
    makeable: 41,
    cautions: [],
    strip: idealStrip(0.5, 2 / 3),
    wins: [],
    ...changes,
  };
}
