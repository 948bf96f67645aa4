import type { PackPage } from '../../../../server/contracts/packs.ts';
import { formatQuantity } from '../../../lib/format-number.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { BarTable } from './bar-table.tsx';

/** Where the current goes, and how long the cells last. */
export function SupplyCurrent({ page }: { page: PackPage }) {
  const { supply } = page;
  const largest = Math.max(...supply.causes.map((cause) => cause.amps), 1e-15);
  const amps = (value: number) => formatQuantity(value, 'A', 2);
  return (
    <section aria-labelledby="supply-current">
      <h2 id="supply-current" className="mb-3 text-title font-strong">
        Draws {bindUnits(supply.text)}
      </h2>
      <BarTable
        caption="Supply current by where it goes"
        heads={['Where it goes', 'Average current']}
        bars={supply.causes.map((cause) => ({
          key: cause.code,
          name: cause.label,
          share: cause.amps / largest,
          value: amps(cause.amps),
        }))}
        total={supply.causes.length > 1 ? amps(supply.totalAmps) : undefined}
      />
    </section>
  );
}
