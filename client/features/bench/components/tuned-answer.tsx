import { clsx } from 'clsx';
import type { LineTuning, ReadingResponse, Take } from '../../../../server/contracts/bench.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useFocusOnArrival } from '../use-focus-on-arrival.ts';
import { MarkingView } from './marking-view.tsx';

export interface TunedAnswerProps {
  answer: ReadingResponse;
  tuning: LineTuning;
  isLast: boolean;
  onTook: () => void;
  onAgain: () => void;
}

/** What the reading comes to: which R4 from which bin, and what this very kit will do. */
export function TunedAnswer({ answer, tuning, isLast, onTook, onAgain }: TunedAnswerProps) {
  const heading = useFocusOnArrival();
  const { unit, reading, take, join } = answer;
  return (
    <section aria-labelledby="taken" className="animate-rise">
      <h1 ref={heading} id="taken" tabIndex={-1} className="mt-4 text-head font-light outline-none">
        Kit {unit} reads <strong className="font-heavy">{reading}</strong>. Take{' '}
        {join === null ? 'this R4' : `these two, to go in ${join}`}:
      </h1>
      {take.map((part) => (
        <TakePart key={part.role} part={part} />
      ))}
      <KitPromise answer={answer} tuning={tuning} />
      {answer.putBack.map((part, index) => (
        <Notice key={index} tone="caution" className="mt-4" title="Out of the tray first">
          {bindUnits(part.label)} goes back to bin {part.bins.join(' or ')}; this kit no longer
          takes it.
        </Notice>
      ))}
      <div className="mt-5 flex flex-wrap gap-4">
        <Button
          size="bench"
          className="min-h-20 text-title max-sm:w-full sm:min-w-88"
          onClick={onTook}
        >
          {take.length === 1 ? 'Took it' : 'Took both'}, {isLast ? 'that was the last' : 'next kit'}
        </Button>
        <Button size="bench" look="outline" className="min-h-20" onClick={onAgain}>
          Measure again
        </Button>
      </div>
    </section>
  );
}

function TakePart({ part }: { part: Take }) {
  return (
    <div className="mt-5 grid items-center gap-x-8 gap-y-3 sm:grid-cols-[auto_1fr]">
      <p className="text-[clamp(4rem,11vw,7rem)] leading-[0.9] font-heavy tracking-tight whitespace-nowrap">
        <span className="sr-only">Bin </span>
        {part.bins.join(' ')}
      </p>
      <div className="min-w-0">
        <p className="text-head leading-tight font-strong">
          {part.role} {bindUnits(part.label)}
        </p>
        <MarkingView marking={part.marking} />
      </div>
    </div>
  );
}

function KitPromise({ answer, tuning }: Pick<TunedAnswerProps, 'answer' | 'tuning'>) {
  const { text } = answer.promise;
  const sold = tuning.sold.text;
  return (
    <dl className="mt-6 grid gap-x-8 gap-y-3 border-y-2 border-ink py-3 sm:grid-cols-3">
      <Figure name="This kit runs at" value={text.rate} unit={text.unit} />
      <Figure
        name={`It holds ${text.band}`}
        value={`${text.from} to ${text.to}`}
        unit={text.unit}
      />
      <Figure name="The promise was" value={`${sold.from} to ${sold.to}`} unit="kept" ticked />
    </dl>
  );
}

function Figure(props: { name: string; value: string; unit: string; ticked?: boolean }) {
  return (
    <div>
      <dt className="text-soft">{bindUnits(props.name)}</dt>
      <dd className="text-title font-heavy">
        {props.value}{' '}
        <span
          className={clsx(
            'whitespace-nowrap',
            props.ticked === true ? 'text-spruce' : 'font-normal',
          )}
        >
          {props.ticked === true && <Tick />} {props.unit}
        </span>
      </dd>
    </div>
  );
}

function Tick() {
  return (
    <svg aria-hidden="true" viewBox="0 0 20 20" className="mb-1 inline-block size-5">
      <path
        d="M3 11L8 16L17 5"
        fill="none"
        className="stroke-spruce"
        strokeWidth="3.5"
        strokeLinecap="round"
        strokeLinejoin="round"
      />
    </svg>
  );
}
