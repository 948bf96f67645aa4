import { BasketLine } from '../../features/basket/components/basket-line.tsx';
import { useBasket } from '../../features/basket/api/basket.ts';
import { UnpaidNotice } from '../../features/orders/components/unpaid-notice.tsx';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { ButtonLink } from '../../ui/button.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Money } from '../../ui/money.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import type { Basket } from '../../../server/contracts/basket.ts';
import { paths } from '../paths.ts';

export function Component() {
  usePageTitle('Basket');
  const basket = useBasket();
  return (
    <Page>
      <UnpaidNotice />
      {basket.isPending && <Waiting words="Fetching your basket" />}
      {basket.isError && (
        <ErrorPanel isPage error={basket.error} onRetry={() => void basket.refetch()} />
      )}
      {basket.data !== undefined && <BasketView basket={basket.data} />}
    </Page>
  );
}

function BasketView({ basket }: { basket: Basket }) {
  const short = basket.lines.some((line) => line.problem !== null);
  if (basket.lines.length === 0) {
    return (
      <>
        <h1 className="sr-only">Basket</h1>
        <EmptyState
          title="Your basket is empty."
          action={<ButtonLink to={paths.home.link()}>Make a kit</ButtonLink>}
        >
          Say how fast it should blink or tick, and hang a pack in here.
        </EmptyState>
      </>
    );
  }
  return (
    <>
      <Opening>
        Your basket holds <strong>{basket.kits === 1 ? 'one kit' : `${basket.kits} kits`}</strong>.
      </Opening>
      <ul className="border-t-2 border-ink">
        {basket.lines.map((line) => (
          <BasketLine
            key={line.id}
            line={line}
            packPath={paths.pack.link(line.pack.token, line.quantity)}
          />
        ))}
      </ul>
      <div className="mt-6 flex flex-wrap items-end justify-between gap-6">
        <p className="max-w-prose text-soft">
          Prices are with tax. Sending is added on the next page, before you pay.
        </p>
        <div className="flex flex-col items-end gap-3">
          <p className="text-lead">
            Together <Money value={basket.total} className="ml-2 text-head font-heavy" />
          </p>
          {short ? (
            <p className="font-strong text-brick">
              Change the marked lines first; then you can order.
            </p>
          ) : (
            <ButtonLink to={paths.checkout.link()}>Go to checkout</ButtonLink>
          )}
        </div>
      </div>
    </>
  );
}
