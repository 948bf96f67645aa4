import type { PackPage } from '../../../../server/contracts/packs.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { bindUnits, narrow } from '../../../lib/spaces.ts';

/** What moves the rate, largest first: a conclusion, then a bar for each cause. */
export function Causes({ page }: { page: PackPage }) {
  const largest = Math.max(...page.causes.map((cause) => cause.fraction), 1e-12);
  return (
    <section aria-labelledby="causes">
      <h2 id="causes" className="text-title font-strong">
        {bindUnits(page.causesText)}
      </h2>
      <p className="mt-1 text-soft">What each cause alone can move the rate by, either way.</p>
      <ul className="mt-4 space-y-2">
        {page.causes.map((cause) => (
          <li
            key={`${cause.role}${cause.label}`}
            className="grid grid-cols-[minmax(7rem,12rem)_1fr_4.75rem] items-center gap-3"
          >
            <span className="leading-tight">
              <strong className="font-heavy">{cause.role}</strong>{' '}
              <span className="text-small text-soft">{bindUnits(cause.label)}</span>
            </span>
            <svg
              aria-hidden="true"
              viewBox="0 0 100 10"
              preserveAspectRatio="none"
              className="h-4 w-full"
            >
              <rect
                width={Math.max(0.6, (cause.fraction / largest) * 100)}
                height="10"
                className="fill-spruce"
              />
            </svg>
            <span className="text-right font-strong whitespace-nowrap">
              ±{narrow}
              {formatPercent(cause.fraction)}
            </span>
          </li>
        ))}
      </ul>
    </section>
  );
}
