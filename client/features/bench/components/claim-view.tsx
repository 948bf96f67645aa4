import type { BenchOrder } from '../../../../server/contracts/bench.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button, ButtonLink } from '../../../ui/button.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { Opening } from '../../../ui/page.tsx';
import { useMove } from '../api/bench-order.ts';
import { benchPaths } from '../bench-paths.ts';
import { stageOf } from '../walk.ts';
import { BenchFrame } from './bench-frame.tsx';
import { WalkLine } from './walk-line.tsx';

/** An order that is not this packer's: free to claim, or in somebody else's hands. */
export function ClaimView({ order }: { order: BenchOrder }) {
  const claim = useMove(order.ref);
  const isFree = stageOf(order) === 'unclaimed';
  const stops = order.picks.length;
  return (
    <BenchFrame
      order={order}
      place={order.shippingMethod}
      line={<WalkLine picks={order.picks} current={null} end="ahead" />}
    >
      <Opening>
        {isFree ? (
          <>
            <strong>Nobody</strong> has this order yet; its walk has{' '}
            <strong>{stops === 1 ? 'one stop' : `${stops} stops`}</strong>.
          </>
        ) : (
          <>
            <strong>{order.claimedBy}</strong> has this order
            {order.status === 'packed' ? ', packed and ready to send.' : '.'}
          </>
        )}
      </Opening>
      <ul className="mb-6 border-t-2 border-ink">
        {order.lines.map((line) => (
          <li key={line.id} className="ledger-line flex justify-between gap-6 py-3">
            <span>{bindUnits(line.sentence)}</span>
            <strong className="font-heavy whitespace-nowrap">
              {line.quantity === 1 ? 'one kit' : `${line.quantity} kits`}
            </strong>
          </li>
        ))}
      </ul>
      {claim.isError && (
        <Notice tone="danger" urgent className="mb-6">
          {sentenceOf(claim.error)}
        </Notice>
      )}
      <div className="flex flex-wrap gap-4">
        {isFree && (
          <Button
            size="bench"
            busy={claim.isPending}
            busyWords="Claiming"
            onClick={() => claim.mutate('claim')}
          >
            Claim it
          </Button>
        )}
        <ButtonLink size="bench" look="outline" to={benchPaths.queue.link()}>
          Back to the queue
        </ButtonLink>
      </div>
    </BenchFrame>
  );
}
