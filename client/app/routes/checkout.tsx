import { useQuery } from '@tanstack/react-query';
import { Navigate } from 'react-router-dom';
import { useBasket } from '../../features/basket/api/basket.ts';
import { CheckoutForm } from '../../features/checkout/components/checkout-form.tsx';
import type { KnownBuyer } from '../../features/checkout/model.ts';
import { myOrdersOptions, orderOptions } from '../../features/orders/api/orders.ts';
import { UnpaidNotice } from '../../features/orders/components/unpaid-notice.tsx';
import { useSession } from '../../lib/session.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import { paths } from '../paths.ts';

/** What a signed-in buyer need not type again: name, e-mail, and where the last order went. */
function useKnownBuyer(): KnownBuyer | undefined {
  const me = useSession();
  const isSignedIn = me !== null && me !== undefined;
  const orders = useQuery({ ...myOrdersOptions(1), enabled: isSignedIn });
  const lastRef = orders.data?.items[0]?.ref ?? '';
  const last = useQuery({ ...orderOptions(lastRef, null), enabled: lastRef !== '' });
  if (me === null || me === undefined) return undefined;
  return { email: me.email, name: me.name, address: last.data?.shippingAddress };
}

export function Component() {
  usePageTitle('Checkout');
  const basket = useBasket();
  const known = useKnownBuyer();
  if (basket.isPending) {
    return (
      <Page>
        <Waiting words="Fetching your basket" />
      </Page>
    );
  }
  if (basket.isError) {
    return (
      <Page className="pt-10">
        <ErrorPanel isPage error={basket.error} onRetry={() => void basket.refetch()} />
      </Page>
    );
  }
  if (basket.data.lines.length === 0) return <Navigate to={paths.basket.link()} replace />;
  return (
    <Page>
      <UnpaidNotice />
      <Opening>
        Where {basket.data.kits === 1 ? 'does' : 'do'}{' '}
        <strong>{basket.data.kits === 1 ? 'your kit' : `your ${basket.data.kits} kits`}</strong> go,
        and how?
      </Opening>
      <CheckoutForm
        known={known}
        acknowledgements={basket.data.acknowledgements}
        basketPath={paths.basket.link()}
      />
    </Page>
  );
}
