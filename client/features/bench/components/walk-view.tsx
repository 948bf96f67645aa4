import { useState } from 'react';
import type { ReactNode } from 'react';
import type { BenchOrder, Pick } from '../../../../server/contracts/bench.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { LiveRegion } from '../../../ui/live-region.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useHeldPicks, usePick } from '../api/bench-order.ts';
import { isTaken, lastStop, nextKit, nextStop, walkablePicks } from '../walk.ts';
import { BenchFrame } from './bench-frame.tsx';
import { HandBack } from './hand-back.tsx';
import { StopView } from './stop-view.tsx';
import { TuneView } from './tune-view.tsx';
import { WalkLine } from './walk-line.tsx';

/** Chosen in place of a stop: the place where capacitors are measured. */
const atTheMeter = 'meter';

/** Which stop is shown, and what was done here: enough to go on, look back and undo. */
function useWalk(order: BenchOrder) {
  const pick = usePick(order.ref);
  const [chosen, setChosen] = useState<string | null>(null);
  const [made, setMade] = useState<readonly string[]>([]);
  const [said, setSaid] = useState('');
  const open = walkablePicks(order);
  const stop =
    order.picks.find((each) => each.id === chosen) ?? nextStop(open, made.at(-1) ?? null);
  const tuning = chosen === atTheMeter || (stop === null && nextKit(order) !== null);
  const shown = tuning ? null : stop;
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
  return { pick, open, shown, tuning, said, take, putBack, choose: setChosen, made };
}

/** The walk along the bins, one next thing at a time; when all is in the tray, the bag. */
export function WalkView({ order, bag }: { order: BenchOrder; bag: ReactNode }) {
  const { pick, open, shown, tuning, said, take, putBack, choose, made } = useWalk(order);
  const toTune = nextKit(order) !== null;
  const held = useHeldPicks(order.ref);
  const place =
    shown === null
      ? tuning
        ? 'at the meter'
        : 'all in the tray'
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
          end={shown === null && !tuning ? 'bag' : 'ahead'}
          tune={hasTuning(order) ? (tuning ? 'now' : toTune ? 'ahead' : 'done') : undefined}
          onTune={() => choose(atTheMeter)}
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
        tuning ? (
          <TuneView
            order={order}
            onTook={(picks) => picks.forEach((each) => pick.mutate(each))}
            onMeasured={() => choose(atTheMeter)}
            onDone={() => choose(null)}
          />
        ) : (
          bag
        )
      ) : (
        <StopView
          key={shown.id}
          stop={shown}
          order={order}
          next={nextStop(open, shown.id)}
          after={toTune ? 'meter' : 'bag'}
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

function hasTuning(order: BenchOrder): boolean {
  return order.lines.some((line) => line.tuning !== null);
}
