import type { PackPage } from '../../../../server/contracts/packs.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { bindUnits, narrow } from '../../../lib/spaces.ts';
import { BarTable } from './bar-table.tsx';

const leastShown = 1e-4;

/** A cause that is next to nothing gets no figures of its own. */
function reachWords(fraction: number): string {
  return fraction < leastShown
    ? `under ${formatPercent(leastShown)}`
    : `±${narrow}${formatPercent(fraction)}`;
}

/** What moves the rate, largest first: a conclusion, then a bar for each cause. */
export function Causes({ page }: { page: PackPage }) {
  const largest = Math.max(...page.causes.map((cause) => cause.fraction), 1e-12);
  return (
    <section aria-labelledby="causes">
      <h2 id="causes" className="text-title font-strong">
        {bindUnits(page.causesText)}
      </h2>
      <p className="mt-1 mb-3 text-soft">What each cause alone can move the rate by, either way.</p>
      <BarTable
        caption="What moves the rate"
        heads={['Cause', 'Moves the rate by, either way']}
        bars={page.causes.map((cause) => ({
          key: `${cause.role}${cause.label}`,
          name: (
            <>
              <strong className="font-heavy">{cause.role}</strong>{' '}
              <span className="text-small text-soft">{bindUnits(cause.label)}</span>
            </>
          ),
          share: cause.fraction / largest,
          value: reachWords(cause.fraction),
        }))}
      />
    </section>
  );
}
