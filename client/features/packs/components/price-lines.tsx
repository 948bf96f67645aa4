import type { PackPage } from '../../../../server/contracts/packs.ts';
import { Money } from '../../../ui/money.tsx';

/** What the price is made of; the lines add up to the price of one kit. */
export function PriceLines({ page }: { page: PackPage }) {
  return (
    <section aria-labelledby="price-lines">
      <h2 id="price-lines" className="text-title font-strong">
        What the price is made of
      </h2>
      <dl className="mt-3 border-t-2 border-ink">
        {page.priceLines.map((line) => (
          <div key={line.label} className="ledger-line flex justify-between gap-4 py-1.5">
            <dt>{line.label}</dt>
            <dd>
              <Money value={line.amount} />
            </dd>
          </div>
        ))}
        <div className="flex justify-between gap-4 py-2 font-heavy">
          <dt>One kit</dt>
          <dd>
            <Money value={page.pack.price.unit} />
          </dd>
        </div>
      </dl>
    </section>
  );
}
