import { clsx } from 'clsx';
import { useDeferredValue, useState } from 'react';
import type { UseQueryResult } from '@tanstack/react-query';
import type { SolveResponse } from '../../server/contracts/packs.ts';
import { PutInBasket } from '../features/basket/components/put-in-basket.tsx';
import { AdviceList } from '../features/packs/components/advice-list.tsx';
import { PackScatter } from '../features/packs/components/pack-scatter.tsx';
import { PackTag } from '../features/packs/components/pack-tag.tsx';
import { answerInWords, frontAndBehind } from '../features/packs/model.ts';
import { isProblem } from '../lib/problem-error.ts';
import { EmptyState } from '../ui/empty-state.tsx';
import { ErrorPanel } from '../ui/error-panel.tsx';
import { LiveRegion } from '../ui/live-region.tsx';
import { Rail, RailHook } from '../ui/rail.tsx';
import { Waiting } from '../ui/waiting.tsx';
import { paths } from './paths.ts';

interface HomeRailProps {
  solved: UseQueryResult<SolveResponse>;
  asking: boolean;
  /** The brief as typed cannot be answered; its sentence stands above already. */
  refused: boolean;
  onAdvice: (change: Record<string, unknown>) => void;
}

/** The newest answer there was: a refused brief leaves the tags of the one before hanging. */
function useLastAnswer(newest: SolveResponse | undefined): SolveResponse | undefined {
  const [last, setLast] = useState(newest);
  if (newest !== undefined && newest !== last) setLast(newest);
  return newest ?? last;
}

/** The rail with what the shelves answer, kept in place while the next answer is worked out. */
export function HomeRail(props: HomeRailProps) {
  const { solved } = props;
  const answer = useDeferredValue(useLastAnswer(solved.data));
  const stale = solved.isFetching || props.refused;
  if (solved.isError && !isProblem(solved.error)) {
    return (
      <ErrorPanel
        title="The shelves could not be asked"
        error={solved.error}
        onRetry={() => void solved.refetch()}
      />
    );
  }
  if (answer === undefined) {
    if (props.refused) return null;
    return <Waiting words="Walking the shelves" />;
  }
  return (
    <section aria-label="Packs from stock" aria-busy={solved.isFetching}>
      <Answered answer={answer} stale={stale} refused={props.refused} />
      <LiveRegion words={stale ? '' : answerInWords(answer)} />
      <div className={clsx('transition-opacity duration-200', props.refused && 'opacity-45')}>
        {answer.packs.length === 0 && <NothingFits />}
        <div className={answer.advice.length > 0 ? 'mb-10' : undefined}>
          <AdviceList advice={answer.advice} onApply={props.onAdvice} />
        </div>
        <Packs answer={answer} />
      </div>
    </section>
  );
}

function Answered(props: { answer: SolveResponse; stale: boolean; refused: boolean }) {
  const { answer } = props;
  const considered = answer.considered.toLocaleString('en-GB');
  return (
    <p className="mb-5 flex min-h-6 items-center gap-3 text-soft">
      {props.refused
        ? 'These were made for the brief before; the new one needs a change first.'
        : props.stale
          ? 'Working out the new brief …'
          : `${considered} combinations of parts on the shelf, weighed one by one.`}
    </p>
  );
}

function NothingFits() {
  return (
    <EmptyState title="No pack on the shelves fits this brief.">
      Change one of the facts in the sentence above. The lines below say which change would help.
    </EmptyState>
  );
}

function Packs({ answer }: { answer: SolveResponse }) {
  const { front, behind } = frontAndBehind(answer.packs);
  const kits = answer.brief.quantity;
  const packPath = (token: string) => paths.pack.link(token, kits);
  if (front.length === 0) return null;
  return (
    <>
      <h2 className="sr-only">Packs that hang first</h2>
      <Rail label="Packs that hang first">
        {front.map((pack, index) => (
          <RailHook key={pack.token}>
            <PackTag
              pack={pack}
              brief={answer.brief}
              packPath={packPath(pack.token)}
              action={
                <PutInBasket
                  token={pack.token}
                  quantity={kits}
                  basketPath={paths.basket.link()}
                  look={index === 0 ? 'solid' : 'outline'}
                  about={`${pack.promise.text.rate} ${pack.promise.text.unit}`}
                />
              }
            />
          </RailHook>
        ))}
      </Rail>
      {behind.length > 0 && <PackScatter packs={behind} answer={answer} packPath={packPath} />}
    </>
  );
}
