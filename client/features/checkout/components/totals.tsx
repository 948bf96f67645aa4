import { clsx } from 'clsx';
import type { Quote } from '../../../../server/contracts/orders.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Money } from '../../../ui/money.tsx';
import { Waiting } from '../../../ui/waiting.tsx';

/** What the order comes to, for this country and this way of sending. */
export function Totals(props: { quote: Quote | undefined; updating: boolean; error: unknown }) {
  const { quote } = props;
  if (quote === undefined) {
    return props.error === null ? (
      <Waiting words="Adding up" />
    ) : (
      <ErrorPanel title="The total could not be worked out" error={props.error} />
    );
  }
  const rows = [
    { name: 'Kits', value: quote.goods },
    { name: 'Sending', value: quote.shipping },
  ];
  return (
    <dl
      aria-busy={props.updating}
      className={clsx('border-t-2 border-ink', props.updating && 'text-soft')}
    >
      {rows.map((row) => (
        <div key={row.name} className="ledger-line flex justify-between py-2">
          <dt>{row.name}</dt>
          <dd>
            <Money value={row.value} />
          </dd>
        </div>
      ))}
      <div className="flex items-baseline justify-between pt-3 text-title font-heavy">
        <dt>To pay</dt>
        <dd>
          <Money value={quote.total} className="text-head" />
        </dd>
      </div>
      <div className="flex justify-between text-small text-soft">
        <dt>of which tax ({formatPercent(quote.taxRate, 3)})</dt>
        <dd>
          <Money value={quote.tax} />
        </dd>
      </div>
    </dl>
  );
}
