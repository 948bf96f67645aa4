import { clsx } from 'clsx';
import type { ReactNode } from 'react';
import type { BenchOrder } from '../../../../server/contracts/bench.ts';
import { keepTogether } from '../../../lib/spaces.ts';
import { shipByWords, timeLeftWords } from '../ship-by.ts';
import { LateFlag } from './late-flag.tsx';

/** The walk on the left, the one thing to do on the right. */
export function BenchFrame(props: {
  order: BenchOrder;
  line: ReactNode;
  /** While the stops can be chosen, a long line scrolls beside the one that is shown. */
  lineScrolls?: boolean;
  place: ReactNode;
  children: ReactNode;
}) {
  return (
    <div className="grid grid-cols-[3.75rem_1fr] lg:grid-cols-[15rem_1fr] print:block">
      <div className="no-print border-r border-line">
        <div
          className={clsx(
            'py-4 pr-2 lg:py-6 lg:pr-4',
            props.lineScrolls === true &&
              'sticky top-0 max-h-dvh [scrollbar-width:thin] overflow-y-auto',
          )}
        >
          {props.line}
        </div>
      </div>
      <div className="min-w-0 py-5 pl-4 sm:pl-8 lg:py-6 lg:pl-12">
        <div className="no-print flex flex-wrap justify-between gap-x-6 text-soft">
          <span>
            <strong className="font-heavy text-ink">{props.order.ref}</strong> · {props.place}
          </span>
          {props.order.shipment === null && <ShipBy shipBy={props.order.shipBy} />}
        </div>
        {props.children}
      </div>
    </div>
  );
}

function ShipBy({ shipBy }: { shipBy: string }) {
  const now = new Date();
  const isLate = new Date(shipBy) < now;
  return (
    <span className={isLate ? 'font-heavy text-brick' : undefined}>
      {isLate && <LateFlag />}
      ship by {shipByWords(shipBy, now)}
      {isLate && `, ${keepTogether(timeLeftWords(shipBy, now))}`}
    </span>
  );
}
