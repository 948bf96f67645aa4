import { Link, useParams } from 'react-router-dom';
import type { DeskPart } from '../../../../server/contracts/desk.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Opening } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useHistory, usePart } from '../api/parts.ts';
import { deskPaths } from '../desk-paths.ts';
import { factsOf } from '../part-facts.ts';
import { ChangeLedger } from './change-ledger.tsx';
import { Lots } from './lots.tsx';
import { PriceForm } from './price-form.tsx';
import { StockLedger } from './stock-ledger.tsx';

/** One part: how many can be sold, what it is, where it lies, what it costs, what happened to it. */
export function PartPage() {
  const { id = '' } = useParams();
  const part = usePart(id);
  usePageTitle(part.data?.part.sku ?? 'Part');
  return (
    <>
      <p className="pt-5">
        <Link className="link" to={deskPaths.parts.link()}>
          All parts
        </Link>
      </p>
      {part.isPending && <Waiting words="Looking in the bins" />}
      {part.isError && (
        <div className="pt-6">
          <ErrorPanel isPage error={part.error} onRetry={() => void part.refetch()} />
        </div>
      )}
      {part.data !== undefined && <PartView key={part.data.id} part={part.data} />}
    </>
  );
}

function PartView({ part }: { part: DeskPart }) {
  return (
    <>
      <PartOpening part={part} />
      <div className="grid gap-x-14 gap-y-12 lg:grid-cols-[1.35fr_1fr]">
        <div className="space-y-12">
          <Lots part={part} />
          <History id={part.id} />
        </div>
        <div className="space-y-12">
          <PriceForm part={part} />
          <Facts part={part} />
        </div>
      </div>
    </>
  );
}

function PartOpening({ part }: { part: DeskPart }) {
  const { available } = part.part;
  return (
    <>
      <Opening>
        {bindUnits(part.part.name)}:{' '}
        {available === 0 ? (
          <strong>none can be sold</strong>
        ) : (
          <>
            <strong>{available}</strong> can be sold
          </>
        )}
        {part.reserved > 0 && (
          <>
            , <strong>{part.reserved}</strong> {part.reserved === 1 ? 'is' : 'are'} promised
          </>
        )}
        .
      </Opening>
      <p className="-mt-5 mb-8 text-soft">
        <strong className="font-heavy text-ink">{part.part.sku}</strong>
        {!part.active && ' · not sold any more'}
      </p>
    </>
  );
}

function Facts({ part }: { part: DeskPart }) {
  return (
    <section aria-labelledby="facts">
      <h2 id="facts" className="mb-2 text-title font-strong">
        What it is
      </h2>
      <dl className="border-t-2 border-ink">
        {factsOf(part.part).map((fact) => (
          <div key={fact.name} className="ledger-line flex justify-between gap-6 py-2">
            <dt className="text-soft">{fact.name}</dt>
            <dd className="text-right font-strong">{fact.value}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

function History({ id }: { id: string }) {
  const history = useHistory(id);
  if (history.isPending) return <Waiting words="Opening the ledger" />;
  if (history.isError) {
    return <ErrorPanel error={history.error} onRetry={() => void history.refetch()} />;
  }
  const { ledger, audit } = history.data;
  return (
    <>
      <section aria-labelledby="movements">
        <h2 id="movements" className="mb-2 text-title font-strong">
          Pieces in and out
        </h2>
        {ledger.length === 0 ? (
          <p className="text-soft">No piece has moved yet.</p>
        ) : (
          <StockLedger entries={ledger} label="Pieces in and out" />
        )}
      </section>
      {audit.length > 0 && (
        <section aria-labelledby="changes">
          <h2 id="changes" className="mb-2 text-title font-strong">
            Who changed what
          </h2>
          <ChangeLedger label="Who changed what" changes={audit} />
        </section>
      )}
    </>
  );
}
