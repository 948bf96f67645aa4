import { Link } from 'react-router-dom';
import type { Coverage, DeskToday } from '../../../../server/contracts/desk.ts';
import { formatMoney } from '../../../lib/format-money.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { narrow } from '../../../lib/spaces.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Opening } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useCoverage, useToday } from '../api/today.ts';
import { rateWords, widestHole } from '../coverage.ts';
import { deskPaths } from '../desk-paths.ts';
import { CoverageRibbon } from './coverage-ribbon.tsx';
import { Decisions } from './decisions.tsx';
import { StockLedger } from './stock-ledger.tsx';

/** What the shelves can serve today, what wants a decision, and what was last written down. */
export function TodayPage() {
  usePageTitle('Desk');
  const coverage = useCoverage();
  const today = useToday();
  return (
    <>
      {coverage.data !== undefined && <Conclusion coverage={coverage.data} />}
      {coverage.isPending && (
        <>
          <h1 className="sr-only">Today</h1>
          <div className="min-h-[26rem]">
            <Waiting words="Surveying the shelves from 0.01 Hz to 100 kHz" />
          </div>
        </>
      )}
      {coverage.isError && (
        <div className="py-8">
          <ErrorPanel
            isPage
            title="The coverage could not be worked out"
            error={coverage.error}
            onRetry={() => void coverage.refetch()}
          />
        </div>
      )}
      {coverage.data !== undefined && <CoverageRibbon coverage={coverage.data} />}
      {today.isPending && <Waiting words="Opening the ledger" />}
      {today.isError && <ErrorPanel error={today.error} onRetry={() => void today.refetch()} />}
      {today.data !== undefined && <Day today={today.data} />}
    </>
  );
}

function rates(coverage: Coverage): { from: string; to: string } {
  return {
    from: rateWords(coverage.points[0]?.frequencyHz ?? 0),
    to: rateWords(coverage.points.at(-1)?.frequencyHz ?? 0),
  };
}

function Conclusion({ coverage }: { coverage: Coverage }) {
  const { from, to } = rates(coverage);
  const hole = widestHole(coverage);
  return (
    <Opening>
      Today&apos;s shelves hold <strong>{formatPercent(coverage.covered)}</strong> of rates from{' '}
      {from} to {to} within ±{narrow}
      {formatPercent(coverage.band)}.{' '}
      {hole !== null && (
        <>
          The widest hole lies{' '}
          {hole.points === 1 ? (
            <>
              at <strong>{rateWords(hole.fromHz)}</strong>
            </>
          ) : (
            <>
              between <strong>{rateWords(hole.fromHz)}</strong> and{' '}
              <strong>{rateWords(hole.toHz)}</strong>
            </>
          )}
          , {hole.worst === null ? 'where some rates have no pack' : <Worst worst={hole.worst} />}.
        </>
      )}
    </Opening>
  );
}

function Worst({ worst }: { worst: number }) {
  return (
    <>
      where kits spread up to{' '}
      <strong>
        ±{narrow}
        {formatPercent(worst)}
      </strong>
    </>
  );
}

function Day({ today }: { today: DeskToday }) {
  return (
    <>
      <DaySentence today={today} />
      <div className="mt-8 grid gap-x-14 gap-y-12 lg:grid-cols-[1.25fr_1fr]">
        <Decisions decisions={today.decisions} />
        <section aria-labelledby="ledger">
          <h2 id="ledger" className="mb-2 text-title font-strong">
            Ledger, last lines
          </h2>
          {today.ledger.length === 0 ? (
            <p className="text-soft">No piece has moved yet.</p>
          ) : (
            <StockLedger
              entries={today.ledger.slice(0, 7)}
              label="Last lines of the stock ledger"
            />
          )}
        </section>
      </div>
    </>
  );
}

function DaySentence({ today }: { today: DeskToday }) {
  const waiting = today.waiting === 1 ? 'One order' : `${today.waiting} orders`;
  return (
    <p className="mt-10 text-lead">
      <Link className="link" to={deskPaths.orders.link()}>
        {today.waiting === 0 ? 'No order' : waiting}
      </Link>{' '}
      {today.waiting === 1 || today.waiting === 0 ? 'waits' : 'wait'} for the bench,{' '}
      {today.late === 0 ? 'none late' : <strong className="font-heavy">{today.late} late</strong>}.{' '}
      <strong className="font-heavy">{formatMoney(today.soldToday)}</strong> sold today.{' '}
      <Link className="link" to={deskPaths.parts.link({ stock: 'out' })}>
        {today.outOfStock === 1 ? 'One part' : `${today.outOfStock} parts`}
      </Link>{' '}
      {today.outOfStock === 1 ? 'is' : 'are'} out of stock.
    </p>
  );
}
