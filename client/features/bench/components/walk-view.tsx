import { useState } from 'react';
import type { ReactNode } from 'react';
import type { BenchOrder, Pick } from '../../../../server/contracts/bench.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { LiveRegion } from '../../../ui/live-region.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useHeldPicks, usePick } from '../api/bench-order.ts';
import { isTaken, lastStop, nextStop } from '../walk.ts';
import { BenchFrame } from './bench-frame.tsx';
import { HandBack } from './hand-back.tsx';
import { StopView } from './stop-view.tsx';
import { WalkLine } from './walk-line.tsx';

/** Which stop is shown, and what was done here: enough to go on, look back and undo. */
function useWalk(order: BenchOrder) {
  const pick = usePick(order.ref);
  const [chosen, setChosen] = useState<string | null>(null);
  const [made, setMade] = useState<readonly string[]>([]);
  const [said, setSaid] = useState('');
  const shown =
    order.picks.find((each) => each.id === chosen) ?? nextStop(order.picks, made.at(-1) ?? null);
  const take = (stop: Pick) => {
    pick.mutate({ id: stop.id, quantity: stop.quantity });
    setMade([...made.filter((id) => id !== stop.id), stop.id]);
    setChosen(null);
    setSaid(`${stop.bin}: ${stop.quantity} in the tray.`);
  };
  const putBack = (stop: Pick) => {
    pick.mutate({ id: stop.id, quantity: 0 });
    setMade(made.filter((id) => id !== stop.id));
    setChosen(stop.id);
    setSaid(`${stop.bin}: put back.`);
  };
  return { pick, shown, said, take, putBack, choose: setChosen, made };
}

/** The walk along the bins, one next thing at a time; when all is in the tray, the bag. */
export function WalkView({ order, bag }: { order: BenchOrder; bag: ReactNode }) {
  const { pick, shown, said, take, putBack, choose, made } = useWalk(order);
  const held = useHeldPicks(order.ref);
  const place =
    shown === null
      ? 'all in the tray'
      : `stop ${order.picks.indexOf(shown) + 1} of ${order.picks.length}`;
  return (
    <BenchFrame
      order={order}
      place={place}
      lineScrolls
      line={
        <WalkLine
          picks={order.picks}
          current={shown?.id ?? null}
          end={shown === null ? 'bag' : 'ahead'}
          onChoose={choose}
        />
      }
    >
      <LiveRegion words={said} />
      {held > 0 && (
        <Notice tone="caution" className="mt-4" title="The connection is down">
          {held === 1 ? 'One stop is' : `${held} stops are`} kept here and sent when it is back. You
          can go on.
        </Notice>
      )}
      {pick.isError && (
        <Notice tone="danger" urgent className="mt-4" title="The last stop was not written down">
          {sentenceOf(pick.error)}
        </Notice>
      )}
      {shown === null ? (
        bag
      ) : (
        <StopView
          key={shown.id}
          stop={shown}
          order={order}
          next={nextStop(order.picks, shown.id)}
          undo={isTaken(shown) ? null : lastStop(order.picks, made)}
          onTake={() => take(shown)}
          onPutBack={putBack}
          onGoOn={() => choose(null)}
        />
      )}
      <HandBack order={order} />
    </BenchFrame>
  );
}
