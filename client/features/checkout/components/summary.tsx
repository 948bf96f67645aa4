import { clsx } from 'clsx';
import { Link } from 'react-router-dom';
import type { Quote } from '../../../../server/contracts/orders.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Money } from '../../../ui/money.tsx';

/** What is ordered, at the prices of the country it goes to. */
export function Summary(props: {
  quote: Quote | undefined;
  updating: boolean;
  basketPath: string;
}) {
  return (
    <section aria-label="What you order" aria-busy={props.updating}>
      <ul className={clsx('border-t-2 border-ink', props.updating && 'text-soft')}>
        {(props.quote?.lines ?? []).map((line) => (
          <li key={line.id} className="ledger-line flex justify-between gap-4 py-2.5">
            <span>
              <strong className="font-heavy">{line.quantity} ×</strong> {bindUnits(line.sentence)}
            </span>
            <Money value={line.total} className="font-strong" />
          </li>
        ))}
      </ul>
      <Link className="link inline-block py-2" to={props.basketPath}>
        Change the basket
      </Link>
    </section>
  );
}
