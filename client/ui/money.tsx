import type { Money as MoneyValue } from '../../server/contracts/common.ts';
import { formatMoney } from '../lib/format-money.ts';

/** An amount that never breaks across lines. */
export function Money({ value, className }: { value: MoneyValue; className?: string }) {
  return <span className={`whitespace-nowrap ${className ?? ''}`}>{formatMoney(value)}</span>;
}
