import { useState } from 'react';
import type { BenchOrder, Pick } from '../../../../server/contracts/bench.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';
import { PartDrawing } from '../../../ui/part-drawing.tsx';
import { rolesText } from '../../../ui/part-groups.ts';
import { drawableOf, isTaken, readScan, sharesBin } from '../walk.ts';
import { MarkingView } from './marking-view.tsx';
import { ScanField } from './scan-field.tsx';
import type { Refused } from './scan-field.tsx';

const largeClass = 'min-h-20 text-title max-sm:w-full sm:min-w-88';

const lastWords = { meter: 'Took it, on to the meter', bag: 'Took it, close the bag' };

export interface StopViewProps {
  stop: Pick;
  order: BenchOrder;
  next: Pick | null;
  /** What follows the last stop. */
  after: 'meter' | 'bag';
  undo: Pick | null;
  onTake: () => void;
  onPutBack: (stop: Pick) => void;
  onGoOn: () => void;
}

/** One stop: the bin as large as the screen allows, what to take, how many, and one big button. */
export function StopView(props: StopViewProps) {
  const { stop, order } = props;
  const [wrong, setWrong] = useState<Refused | null>(null);
  const done = isTaken(stop);
  const scanLabel = sharesBin(stop, order.picks)
    ? `Scan the part, ${stop.sku}`
    : `Scan ${stop.bin} or the part`;
  const onCode = (text: string) => {
    const scan = readScan(text, stop, order.picks);
    if (scan.kind === 'wrong' || scan.kind === 'unclear') setWrong(scan);
    if (scan.kind !== 'right') return;
    setWrong(null);
    if (done) props.onGoOn();
    else props.onTake();
  };
  return (
    <section aria-labelledby="stop" className="animate-rise">
      <BinAndCount stop={stop} />
      <WhatToTake stop={stop} order={order} />
      <ScanField label={scanLabel} wrong={wrong} onCode={onCode} />
      <div className="mt-5 flex flex-wrap gap-4">
        {done ? (
          <>
            <Button size="bench" className={largeClass} onClick={props.onGoOn}>
              {props.next === null ? `On to the ${props.after}` : `On to ${props.next.bin}`}
            </Button>
            <Button
              size="bench"
              look="outline"
              className="min-h-20"
              onClick={() => props.onPutBack(stop)}
            >
              Put it back
            </Button>
          </>
        ) : (
          <Button size="bench" className={largeClass} onClick={props.onTake}>
            {props.next === null ? lastWords[props.after] : 'Took it, next stop'}
          </Button>
        )}
        {props.undo !== null && <Undo stop={props.undo} onUndo={props.onPutBack} />}
      </div>
    </section>
  );
}

function Undo({ stop, onUndo }: { stop: Pick; onUndo: (stop: Pick) => void }) {
  return (
    <Button size="bench" look="outline" className="min-h-20" onClick={() => onUndo(stop)}>
      Undo {stop.bin}
    </Button>
  );
}

function BinAndCount({ stop }: { stop: Pick }) {
  const done = isTaken(stop);
  return (
    <div className="mt-4 flex flex-wrap items-end justify-between gap-x-4 gap-y-2">
      <h1
        id="stop"
        className="text-[clamp(4rem,15vw,9.5rem)] leading-[0.9] font-heavy tracking-tight whitespace-nowrap"
      >
        <span className="sr-only">Bin </span>
        {stop.bin}
      </h1>
      <p className="flex items-baseline gap-2 leading-none whitespace-nowrap sm:gap-3 sm:pb-2">
        <span className="text-lead text-soft sm:text-title">{done ? 'in the tray' : 'take'}</span>
        <strong className="text-[clamp(3.25rem,9vw,6rem)] leading-[0.9] font-heavy">
          {done ? stop.picked : stop.quantity - stop.picked}
        </strong>
      </p>
    </div>
  );
}

function WhatToTake({ stop, order }: { stop: Pick; order: BenchOrder }) {
  const roles = rolesText(stop.roles);
  return (
    <div className="mt-5 grid items-center gap-x-8 gap-y-3 sm:grid-cols-[auto_1fr]">
      <div className="flex justify-center rounded-edge bg-paper-deep p-4 sm:w-60 [&_svg]:h-auto! [&_svg]:max-h-16 [&_svg]:w-auto! [&_svg]:min-w-28 sm:[&_svg]:max-h-22">
        <PartDrawing part={drawableOf(stop, order.lines)} />
      </div>
      <div className="min-w-0">
        <p className="text-head leading-tight font-strong">{bindUnits(stop.label)}</p>
        <MarkingView marking={stop.marking} />
        <p className="mt-2 text-soft">
          {roles !== '' && <>for {roles} · </>}
          {stop.sku} · lot {stop.lot}
          {stop.picked > 0 && stop.picked < stop.quantity && (
            <>
              {' '}
              · {stop.picked} of {stop.quantity} in the tray already
            </>
          )}
        </p>
      </div>
    </div>
  );
}
