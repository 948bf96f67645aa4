import { useEffect, useRef } from 'react';
import { useParams } from 'react-router-dom';
import type { BenchOrder } from '../../../../server/contracts/bench.ts';
import { isProblem, sentenceOf } from '../../../lib/problem-error.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { ButtonLink } from '../../../ui/button.tsx';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { Page } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useBenchOrder } from '../api/bench-order.ts';
import { benchPaths } from '../bench-paths.ts';
import { stageOf } from '../walk.ts';
import { BagView } from './bag-view.tsx';
import { ClaimView } from './claim-view.tsx';
import { ShipView } from './ship-view.tsx';
import { ShippedView } from './shipped-view.tsx';
import { WalkView } from './walk-view.tsx';

/** One order from claim to parcel; what it shows is what there is to do next. */
export function OrderPage() {
  const { ref = '' } = useParams();
  usePageTitle(`Bench, ${ref}`);
  const order = useBenchOrder(ref);
  if (order.data !== undefined) {
    const isGone = isProblem(order.error);
    return (
      <Page className="pb-12">
        {order.isError && (
          <Notice
            tone="caution"
            className="mt-4"
            title={isGone ? 'This order has left the bench' : 'The connection is down'}
          >
            {sentenceOf(order.error)} {!isGone && 'It is tried again by itself; you can go on.'}
          </Notice>
        )}
        <Stage key={ref} order={order.data} />
      </Page>
    );
  }
  return (
    <Page className="pb-12">
      {order.isError ? (
        <div className="space-y-6 pt-10">
          <ErrorPanel
            isPage
            title="This order is not on the bench"
            error={order.error}
            onRetry={() => void order.refetch()}
          />
          <ButtonLink size="bench" look="outline" to={benchPaths.queue.link()}>
            Back to the queue
          </ButtonLink>
        </div>
      ) : (
        <Waiting words="Fetching the order" />
      )}
    </Page>
  );
}

function Stage({ order }: { order: BenchOrder }) {
  const stage = stageOf(order);
  const last = useRef(stage);
  useEffect(() => {
    // A new stage begins at its top; the button that led here may have been far down.
    if (last.current !== stage) window.scrollTo({ top: 0 });
    last.current = stage;
  }, [stage]);
  switch (stage) {
    case 'unclaimed':
    case 'elsewhere':
      return <ClaimView order={order} />;
    case 'walk':
    case 'tune':
    case 'bag':
      return <WalkView order={order} bag={<BagView order={order} />} />;
    case 'ship':
      return <ShipView order={order} />;
    case 'shipped':
      return <ShippedView order={order} />;
  }
}
