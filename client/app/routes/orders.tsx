import { Link, useSearchParams } from 'react-router-dom';
import { OrderList } from '../../features/orders/components/order-list.tsx';
import { UnpaidNotice } from '../../features/orders/components/unpaid-notice.tsx';
import { useMyOrders } from '../../features/orders/api/orders.ts';
import { isProblem } from '../../lib/problem-error.ts';
import { useSession } from '../../lib/session.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { ButtonLink } from '../../ui/button.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import { paths } from '../paths.ts';

export function Component() {
  usePageTitle('My orders');
  const me = useSession();
  if (me === undefined) {
    return (
      <Page>
        <Waiting words="Opening the ledger" />
      </Page>
    );
  }
  return <Page>{me === null ? <Guest /> : <Orders />}</Page>;
}

function Guest() {
  return (
    <>
      <h1 className="sr-only">My orders</h1>
      <UnpaidNotice />
      <EmptyState
        title="Sign in to see your orders."
        action={<ButtonLink to={paths.signIn.link(paths.orders.link())}>Sign in</ButtonLink>}
      >
        If you ordered without an account, open the link in the confirmation mail; it leads to the
        order.
      </EmptyState>
    </>
  );
}

function Orders() {
  const [query] = useSearchParams();
  const page = Math.max(1, Math.trunc(Number(query.get('page') ?? 1)) || 1);
  const orders = useMyOrders(page);
  if (orders.isPending) return <Waiting words="Opening the ledger" />;
  if (isProblem(orders.error) && orders.error.status === 401) return <Guest />;
  if (orders.isError)
    return <ErrorPanel isPage error={orders.error} onRetry={() => void orders.refetch()} />;
  const { items, total, pageSize } = orders.data;
  if (total === 0) {
    return (
      <>
        <h1 className="sr-only">My orders</h1>
        <UnpaidNotice />
        <EmptyState
          title="No orders yet."
          action={<ButtonLink to={paths.home.link()}>Make a kit</ButtonLink>}
        />
      </>
    );
  }
  return (
    <>
      <Opening>
        Your ledger has <strong>{total === 1 ? 'one order' : `${total} orders`}</strong>.
      </Opening>
      <OrderList orders={items} orderPath={(ref) => paths.order.link(ref)} />
      <nav aria-label="Pages" className="flex justify-between py-4">
        {page > 1 ? (
          <Link className="link" to={paths.orders.link(page - 1)}>
            Newer orders
          </Link>
        ) : (
          <span />
        )}
        {page * pageSize < total && (
          <Link className="link" to={paths.orders.link(page + 1)}>
            Older orders
          </Link>
        )}
      </nav>
    </>
  );
}
