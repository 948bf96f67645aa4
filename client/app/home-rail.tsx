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
import { Button } from '../ui/button.tsx';
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
  const failed = solved.isError && !props.refused;
  if (answer === undefined) return <NoAnswerYet {...props} failed={failed} />;
  const isOlder = props.refused || solved.isPlaceholderData || solved.data === undefined;
  return (
    <section aria-label="Packs from stock" aria-busy={solved.isFetching}>
      <StatusLine {...props} answer={answer} isOlder={isOlder} />
      <LiveRegion words={isOlder || solved.isFetching ? '' : answerInWords(answer)} />
      <div
        className={clsx(
          'transition-opacity duration-200',
          isOlder && 'opacity-45',
          // An answer that comes at once should not make the tags flicker.
          isOlder && solved.isFetching && 'delay-200',
        )}
      >
        {answer.packs.length === 0 && <NothingFits />}
        <div className={answer.advice.length > 0 ? 'mb-10' : undefined}>
          <AdviceList advice={answer.advice} onApply={props.onAdvice} />
        </div>
        <Packs answer={answer} isOlder={isOlder} />
      </div>
    </section>
  );
}

function NoAnswerYet(props: HomeRailProps & { failed: boolean }) {
  const { solved } = props;
  if (props.failed) {
    return (
      <ErrorPanel
        title="The shelves could not be asked"
        error={solved.error}
        onRetry={() => void solved.refetch()}
      />
    );
  }
  return props.refused ? null : <Waiting words="Walking the shelves" />;
}

interface StatusProps extends HomeRailProps {
  answer: SolveResponse;
  isOlder: boolean;
}

/** Which brief the packs below belong to, and what keeps the newer answer away. */
function StatusLine(props: StatusProps) {
  const { solved } = props;
  const failed = solved.isError && !props.refused && !solved.isFetching;
  const words = statusWords(props, failed);
  if (words === '') return null;
  return (
    <div
      role={failed ? 'alert' : undefined}
      className="mb-5 flex min-h-6 flex-wrap items-center gap-3 text-soft"
    >
      <p className={clsx(failed && 'font-strong text-brick')}>{words}</p>
      {failed && (
        <Button look="outline" size="small" onClick={() => void solved.refetch()}>
          Try again
        </Button>
      )}
    </div>
  );
}

function statusWords(props: StatusProps, failed: boolean): string {
  const { answer, isOlder } = props;
  if (props.refused)
    return 'These were made for the brief before; the new one needs a change first.';
  if (failed) {
    const why = isProblem(props.solved.error)
      ? 'The shop could not answer'
      : 'No connection to the shop';
    return isOlder ? `${why}; these are the packs for the brief before.` : `${why} just now.`;
  }
  if (isOlder || props.solved.isFetching) return 'Working out the new brief …';
  if (answer.packs.length === 0) return '';
  const considered = answer.considered.toLocaleString('en-GB');
  return `${considered} combinations of parts on the shelf, weighed one by one.`;
}

function NothingFits() {
  return (
    <EmptyState title="No pack on the shelves fits this brief.">
      Change one of the facts in the sentence above. The lines below say which change would help.
    </EmptyState>
  );
}

function Packs({ answer, isOlder }: { answer: SolveResponse; isOlder: boolean }) {
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
                  disabled={isOlder}
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
