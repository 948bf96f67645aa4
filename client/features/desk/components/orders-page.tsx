import { Link } from 'react-router-dom';
import type { DeskOrderRow, DeskOrdersPage } from '../../../../server/contracts/desk.ts';
import { orderStatuses, orderStatusSchema } from '../../../../server/contracts/orders.ts';
import { formatDateTime } from '../../../lib/format-time.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Select } from '../../../ui/field.tsx';
import { LiveRegion } from '../../../ui/live-region.tsx';
import { Money } from '../../../ui/money.tsx';
import { Opening } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useOrders } from '../api/orders.ts';
import { deskPaths } from '../desk-paths.ts';
import { useListQuery } from '../list-query.ts';
import { kitsWords, orderWords } from '../order-words.ts';
import { Pager } from './pager.tsx';
import { SearchField } from './search-field.tsx';

const states = [
  { value: '', label: 'Every state' },
  ...orderStatuses.map((status) => ({ value: status, label: orderWords[status] })),
];

/** All orders, newest first, as lines of the ledger. */
export function OrdersPage() {
  usePageTitle('Orders');
  const list = useListQuery();
  const status = orderStatusSchema.safeParse(list.value('status')).data ?? '';
  const search = list.value('search').slice(0, 100);
  const orders = useOrders({ search, status, page: list.page });
  return (
    <>
      {orders.data === undefined ? (
        <h1 className="sr-only">Orders</h1>
      ) : (
        <OrdersOpening page={orders.data} isWhole={search === '' && status === ''} />
      )}
      <search className="mb-6 grid max-w-3xl gap-x-6 gap-y-4 sm:grid-cols-[1.6fr_1fr]">
        <SearchField
          label="Search"
          value={search}
          onSearch={(text) => list.change({ search: text })}
        />
        <Select
          label="State"
          options={states}
          value={status}
          onChange={(event) => list.change({ status: event.target.value })}
        />
      </search>
      {orders.isPending && <Waiting words="Opening the ledger" />}
      {orders.isError && <ErrorPanel error={orders.error} onRetry={() => void orders.refetch()} />}
      {orders.data !== undefined && (
        <div className={orders.isPlaceholderData ? 'opacity-60' : undefined}>
          <LiveRegion
            words={
              orders.data.total === 1 ? 'One order found.' : `${orders.data.total} orders found.`
            }
          />
          <OrderLines orders={orders.data.items} />
          <Pager {...orders.data} linkTo={list.linkTo} />
        </div>
      )}
    </>
  );
}

function OrdersOpening({ page, isWhole }: { page: DeskOrdersPage; isWhole: boolean }) {
  return (
    <Opening>
      {isWhole ? 'The shop has taken' : 'This finds'}{' '}
      <strong>{page.total === 1 ? 'one order' : `${page.total} orders`}</strong>.
    </Opening>
  );
}

function OrderLines({ orders }: { orders: readonly DeskOrderRow[] }) {
  if (orders.length === 0) {
    return (
      <EmptyState title="No order answers to that.">
        Search for an order number, a name or an e-mail address.
      </EmptyState>
    );
  }
  return (
    <ol aria-label="Orders" className="border-t-2 border-ink">
      {orders.map((order) => (
        <li
          key={order.ref}
          className="ledger-line relative grid gap-x-8 gap-y-1 py-3.5 hover:bg-wash/50 md:grid-cols-[11rem_14rem_1fr_6rem]"
        >
          <div>
            <Link
              to={deskPaths.order.link(order.ref)}
              className="font-heavy text-spruce underline decoration-2 underline-offset-4 after:absolute after:inset-0"
            >
              {order.ref}
            </Link>
            <time dateTime={order.placedAt} className="block text-small text-soft">
              {formatDateTime(order.placedAt)}
            </time>
          </div>
          <div className="min-w-0">
            <span className="block truncate font-strong">{order.name}</span>
            <span className="block truncate text-small text-soft">{order.email}</span>
          </div>
          <div>
            <strong className="font-heavy">{orderWords[order.status]}</strong>
            <span className="text-soft"> · {kitsWords(order.kits)}</span>
            <span className="block text-small text-soft">{bindUnits(order.sentence)}</span>
          </div>
          <Money value={order.total} className="font-heavy md:text-right" />
        </li>
      ))}
    </ol>
  );
}
