import { clsx } from 'clsx';
import { useEffect, useRef } from 'react';
import type { Pick } from '../../../../server/contracts/bench.ts';
import { rolesText } from '../../../ui/part-groups.ts';
import { isTaken } from '../walk.ts';

type State = 'done' | 'now' | 'ahead';
const says: Record<State, string> = { done: 'done', now: 'now', ahead: 'to come' };

export interface WalkLineProps {
  picks: readonly Pick[];
  /** The pick that is shown; null when the walk is over. */
  current: string | null;
  /** The last stop of every walk: the bench itself, where the bag is closed and sent. */
  end: 'ahead' | 'bag' | 'ship' | 'done';
  /** Where the meter stands in the walk; left out where no kit is tuned. */
  tune?: State | undefined;
  onTune?: () => void;
  onChoose?: (id: string) => void;
}

/** The walk as a vertical line: what is done, where one stands, what is to come. */
export function WalkLine({ picks, current, end, tune, onTune, onChoose }: WalkLineProps) {
  const list = useRef<HTMLOListElement>(null);
  useEffect(() => {
    const stop = list.current?.querySelector<HTMLElement>('[aria-current]');
    const frame = list.current?.parentElement;
    if (!stop || !frame) return;
    frame.scrollTo({ top: stop.offsetTop - (frame.clientHeight - stop.offsetHeight) / 2 });
  }, [current, end, tune]);
  const bagState: State = end === 'bag' ? 'now' : end === 'ahead' ? 'ahead' : 'done';
  const shipState: State = end === 'ship' ? 'now' : end === 'done' ? 'done' : 'ahead';
  return (
    <ol aria-label="The walk" ref={list}>
      {picks.map((pick) => {
        const state = pick.id === current ? 'now' : isTaken(pick) ? 'done' : 'ahead';
        return (
          <Stop
            key={pick.id}
            state={state}
            head={pick.bin}
            words={stopWords(pick)}
            isTaken={isTaken(pick)}
            onChoose={onChoose === undefined ? undefined : () => onChoose(pick.id)}
          />
        );
      })}
      {tune !== undefined && (
        <Stop
          state={tune}
          head="Tune"
          words="measure C1, take R4"
          isTaken={tune === 'done'}
          onChoose={onTune}
        />
      )}
      <Stop state={bagState} head="Bag" words="contents, label" isTaken={bagState === 'done'} />
      <Stop
        state={shipState}
        head="Parcel"
        words="carrier, tracking"
        isTaken={shipState === 'done'}
        isLast
      />
    </ol>
  );
}

function stopWords(pick: Pick): string {
  const isByRole = ['resistor', 'capacitor', 'comparator'].includes(pick.kind);
  return isByRole ? `${rolesText(pick.roles)} ${pick.label}`.trim() : pick.label;
}

interface StopProps {
  state: State;
  head: string;
  words: string;
  isTaken: boolean;
  isLast?: boolean;
  onChoose?: (() => void) | undefined;
}

const stopClass =
  'relative flex min-h-14 w-full flex-col items-center gap-x-3 rounded-control py-1.5 text-left lg:flex-row lg:items-start lg:px-2 lg:py-2';

function Stop(props: StopProps) {
  const { state, onChoose } = props;
  const inner = (
    <>
      <Lamp state={state} isTaken={props.isTaken} />
      <span className={clsx('min-w-0 lg:pt-0.5', state === 'now' ? 'text-ink' : 'text-soft')}>
        <span
          className={clsx(
            'relative block bg-paper px-0.5 leading-tight lg:bg-transparent lg:px-0',
            state === 'now' ? 'font-heavy' : 'font-strong',
          )}
        >
          {props.head}
        </span>
        <span className="block text-small leading-snug max-lg:sr-only">{props.words}</span>
        <span className="sr-only">, {says[state]}</span>
      </span>
    </>
  );
  return (
    <li className="relative" aria-current={state === 'now' ? 'step' : undefined}>
      {props.isLast !== true && (
        <span
          aria-hidden="true"
          className={clsx(
            'absolute top-5 -bottom-3 left-1/2 -ml-[1.5px] border-l-[3px] lg:left-[20.5px] lg:ml-0',
            props.isTaken ? 'border-spruce' : 'border-dotted border-soft',
          )}
        />
      )}
      {onChoose === undefined ? (
        <span className={stopClass}>{inner}</span>
      ) : (
        <button type="button" onClick={onChoose} className={clsx(stopClass, 'hover:bg-wash/60')}>
          {inner}
        </button>
      )}
    </li>
  );
}

/** Done is filled with a tick, now is the lit lamp, ahead is an open ring. */
function Lamp({ state, isTaken }: { state: State; isTaken: boolean }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 28 28" className="relative size-7 shrink-0">
      {state === 'now' ? (
        <>
          <circle cx="14" cy="14" r="13" className="fill-paper" />
          <circle cx="14" cy="14" r="11" className="fill-marigold stroke-ink" strokeWidth="3" />
        </>
      ) : (
        <circle
          cx="14"
          cy="14"
          r="10"
          strokeWidth="3"
          className={isTaken ? 'fill-spruce stroke-spruce' : 'fill-paper stroke-soft'}
        />
      )}
      {isTaken && (
        <path
          d="M8.8 14.6L12.5 18.1L19.2 10.4"
          fill="none"
          className={state === 'now' ? 'stroke-[#1e2a2e]' : 'stroke-on-spruce'}
          strokeWidth="3"
          strokeLinecap="round"
          strokeLinejoin="round"
        />
      )}
    </svg>
  );
}
