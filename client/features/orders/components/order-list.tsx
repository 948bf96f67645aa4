import { Link } from 'react-router-dom';
import type { OrderSummary } from '../../../../server/contracts/orders.ts';
import { formatDate } from '../../../lib/format-time.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Money } from '../../../ui/money.tsx';
import { PulseStrip } from '../../../ui/pulse-strip.tsx';
import { statusWords } from '../model.ts';

/** Orders as ledger lines, each with its strip. */
export function OrderList(props: {
  orders: readonly OrderSummary[];
  orderPath: (ref: string) => string;
}) {
  return (
    <ol className="border-t-2 border-ink">
      {props.orders.map((order) => (
        <li
          key={order.ref}
          className="ledger-line relative grid items-center gap-x-8 gap-y-2 py-4 hover:bg-wash/50 sm:grid-cols-[8rem_1fr_9rem_auto]"
        >
          <div className="text-soft">
            <time dateTime={order.placedAt}>{formatDate(order.placedAt)}</time>
          </div>
          <div>
            <Link
              to={props.orderPath(order.ref)}
              className="font-heavy whitespace-nowrap text-spruce underline decoration-2 underline-offset-4 after:absolute after:inset-0"
            >
              {order.ref}
            </Link>
            <span className="text-soft">
              {' '}
              · {order.kits === 1 ? 'one kit' : `${order.kits} kits`} · {statusWords[order.status]}
            </span>
            <p>{bindUnits(order.sentence)}</p>
          </div>
          {order.strip === null ? (
            <span />
          ) : (
            <PulseStrip strip={order.strip} decorative className="h-12 w-36" />
          )}
          <Money value={order.total} className="font-heavy sm:text-right" />
        </li>
      ))}
    </ol>
  );
}
