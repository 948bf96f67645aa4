import type { BenchOrder } from '../../../../server/contracts/bench.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { PartsTable } from '../../../ui/parts-table.tsx';
import { useFocusOnArrival } from '../use-focus-on-arrival.ts';
import { useMove } from '../api/bench-order.ts';
import { isTimingRole } from '../walk.ts';
import { KitsOfLine } from './tuned-kits.tsx';

/** All is in the tray: what goes into each bag, what must be printed on it, and closing it. */
export function BagView({ order }: { order: BenchOrder }) {
  const pack = useMove(order.ref);
  const heading = useFocusOnArrival();
  const bags = order.lines.reduce((sum, line) => sum + line.quantity, 0);
  return (
    <section aria-labelledby="bag" className="animate-rise">
      <h1
        ref={heading}
        id="bag"
        tabIndex={-1}
        className="py-6 text-[clamp(2rem,5vw,4rem)] leading-[1.1] font-light outline-none print:hidden"
      >
        Everything is in the tray. Fill{' '}
        <strong className="font-heavy">{bags === 1 ? 'one bag' : `${bags} bags`}</strong>.
      </h1>
      <ul className="space-y-10">
        {order.lines.map((line) => (
          <li key={line.id}>
            <BagContents line={line} orderRef={order.ref} />
          </li>
        ))}
      </ul>
      {pack.isError && (
        <Notice tone="danger" urgent className="mt-6" title="Not packed yet">
          {sentenceOf(pack.error)}
        </Notice>
      )}
      <div className="no-print mt-8 flex flex-wrap gap-4">
        <Button
          size="bench"
          className="min-h-16 max-sm:w-full"
          busy={pack.isPending}
          busyWords="Packing"
          onClick={() => pack.mutate('pack')}
        >
          Bagged, pack it
        </Button>
        <Button size="bench" look="outline" onClick={() => window.print()}>
          Print the bag slips
        </Button>
      </div>
    </section>
  );
}

function BagContents(props: { line: BenchOrder['lines'][number]; orderRef: string }) {
  const { line } = props;
  const isTuned = line.tuning !== null;
  const parts = isTuned ? line.parts.filter(({ role }) => !isTimingRole(role)) : line.parts;
  return (
    <div className="border-t-2 border-ink pt-3">
      <p className="hidden text-title font-heavy print:block">{props.orderRef}</p>
      <div className="flex flex-wrap justify-between gap-x-8">
        <h2 className="text-title leading-snug font-strong">{bindUnits(line.sentence)}</h2>
        <p className="text-title font-heavy whitespace-nowrap">
          {line.quantity === 1 ? 'one bag' : `${line.quantity} bags, each with:`}
        </p>
      </div>
      <div className="mt-2">
        <PartsTable parts={parts} caption={`Parts in each bag of ${props.orderRef}`} />
      </div>
      {isTuned && <KitsOfLine line={line} />}
      {line.cautions.length > 0 && (
        <Notice tone="caution" className="mt-4" title="Printed on the bag">
          <ul className="space-y-1">
            {line.cautions.map((caution) => (
              <li key={caution}>{bindUnits(caution)}</li>
            ))}
          </ul>
        </Notice>
      )}
    </div>
  );
}
