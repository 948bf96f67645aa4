import type { BenchOrder } from '../../../../server/contracts/bench.ts';
import { ButtonLink } from '../../../ui/button.tsx';
import { benchPaths } from '../bench-paths.ts';
import { useFocusOnArrival } from '../use-focus-on-arrival.ts';
import { BenchFrame } from './bench-frame.tsx';
import { WalkLine } from './walk-line.tsx';

/** The end of the walk. */
export function ShippedView({ order }: { order: BenchOrder }) {
  const heading = useFocusOnArrival();
  return (
    <BenchFrame
      order={order}
      place="shipped"
      line={<WalkLine picks={order.picks} current={null} end="done" />}
    >
      <h1
        ref={heading}
        tabIndex={-1}
        className="py-6 text-[clamp(2rem,5vw,4rem)] leading-[1.1] font-light outline-none [&_strong]:font-heavy"
      >
        <strong>{order.ref}</strong> is on its way
        {order.shipment !== null && (
          <>
            {' '}
            with <strong>{order.shipment.carrier}</strong>
          </>
        )}
        .
      </h1>
      {order.shipment !== null && (
        <p className="mb-8 text-lead">
          Tracking <strong className="font-heavy">{order.shipment.tracking}</strong>. The maker has
          been written to, and the parts have left the shelves&apos; ledger.
        </p>
      )}
      <ButtonLink size="bench" to={benchPaths.queue.link()}>
        Back to the queue
      </ButtonLink>
    </BenchFrame>
  );
}
