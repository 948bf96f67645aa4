import type { CareLevel } from '../contracts/brief.ts';
import { withTax } from './money.ts';

/** How the shop prices a kit. */
export interface PriceRule {
  /** Net fee per kit for bag, build sheet and picking, in minor units. */
  kitFeeMinor: number;
  /** Net fee per kit for what the shop does beyond that, by care level. */
  careFeesMinor: Readonly<Record<CareLevel, number>>;
  taxBasisPoints: number;
}

const careLabels: Record<CareLevel, string> = {
  'as-stocked': 'As stocked',
  'lot-checked': 'Checking against the lot',
  'bench-tuned': 'Tuning on the bench',
  'trimmer-fitted': 'Fitting the trimmer',
};

export interface PriceLine {
  label: string;
  netMinor: number;
}

export interface KitPrice {
  netMinor: number;
  grossMinor: number;
  /** Gross amounts that add up to `grossMinor` exactly. */
  lines: { label: string; grossMinor: number }[];
}

/**
 * Price of one kit. Tax is put on the sum of the net amounts, then shared out over the shown lines by
 * largest remainder, so that the lines always add up to the price. All amounts in minor units.
 */
export function kitPrice(
  partLines: readonly PriceLine[],
  rule: PriceRule,
  careLevel: CareLevel,
): KitPrice {
  const careFee = rule.careFeesMinor[careLevel];
  const net = [
    ...partLines,
    { label: 'Picking, bag and build sheet', netMinor: rule.kitFeeMinor },
    ...(careFee > 0 ? [{ label: careLabels[careLevel], netMinor: careFee }] : []),
  ];
  const netMinor = net.reduce((sum, line) => sum + line.netMinor, 0);
  const grossMinor = withTax(netMinor, rule.taxBasisPoints);
  const shares = shareOut(
    grossMinor,
    net.map((line) => line.netMinor),
  );
  return {
    netMinor,
    grossMinor,
    lines: net.map((line, k) => ({ label: line.label, grossMinor: shares[k]! })),
  };
}

/**
 * Splits a whole amount in proportion to weights into whole parts that add up to it; what rounding
 * leaves goes to the largest remainders, the earlier one first among equals.
 */
export function shareOut(total: number, weights: readonly number[]): number[] {
  const sum = weights.reduce((a, b) => a + b, 0);
  if (sum === 0) return weights.map((_, k) => (k === 0 ? total : 0));
  const exact = weights.map((weight) => (total * weight) / sum);
  const shares = exact.map(Math.floor);
  const left = total - shares.reduce((a, b) => a + b, 0);
  exact
    .map((value, k) => ({ k, remainder: value - Math.floor(value) }))
    .sort((a, b) => b.remainder - a.remainder || a.k - b.k)
    .slice(0, left)
    .forEach(({ k }) => (shares[k]! += 1));
  return shares;
}
