import { useState } from 'react';
import { useParams, useSearchParams } from 'react-router-dom';
import type { PackPage } from '../../../server/contracts/packs.ts';
import { PutInBasket } from '../../features/basket/components/put-in-basket.tsx';
import { usePackPage } from '../../features/packs/api/get-pack.ts';
import { Causes } from '../../features/packs/components/causes.tsx';
import { GraveCautions, PlainCautions } from '../../features/packs/components/cautions.tsx';
import { CircuitPanel } from '../../features/packs/components/circuit-panel.tsx';
import { LampPreview } from '../../features/packs/components/lamp-preview.tsx';
import { Making } from '../../features/packs/components/making.tsx';
import { PriceLines } from '../../features/packs/components/price-lines.tsx';
import { PromiseCard } from '../../features/packs/components/promise-card.tsx';
import { SupplyCurrent } from '../../features/packs/components/supply-current.tsx';
import { WaveformSection } from '../../features/packs/components/waveform-section.tsx';
import { makeableWords } from '../../features/packs/model.ts';
import { bindUnits } from '../../lib/spaces.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Money } from '../../ui/money.tsx';
import { Page } from '../../ui/page.tsx';
import { PartsTable } from '../../ui/parts-table.tsx';
import { PulseStrip } from '../../ui/pulse-strip.tsx';
import { Stepper } from '../../ui/stepper.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import { paths } from '../paths.ts';

export function Component() {
  const { token = '' } = useParams();
  const page = usePackPage(token);
  usePageTitle('A pack');
  return (
    <Page className="pt-6 sm:pt-10">
      {page.isPending && <Waiting words="Fetching the pack" />}
      {page.isError && (
        <ErrorPanel
          isPage
          title="This pack is not to be had"
          error={page.error}
          onRetry={() => void page.refetch()}
        />
      )}
      {page.data !== undefined && <PackView page={page.data} />}
    </Page>
  );
}

function PackView({ page }: { page: PackPage }) {
  const [lit, setLit] = useState<readonly string[]>([]);
  const litSet = new Set(lit);
  const { pack, brief } = page;
  return (
    <>
      <p className="text-soft">From your brief</p>
      <h1 className="max-w-[46em] text-title font-strong">{bindUnits(brief.sentence)}.</h1>
      <PulseStrip strip={pack.strip} withAxis className="mt-6 mb-12 h-16" />
      <div className="mb-8 empty:hidden">
        <GraveCautions cautions={pack.cautions} />
      </div>
      <div className="grid items-start gap-x-12 gap-y-10 lg:grid-cols-[1.2fr_1fr] lg:grid-rows-[auto_1fr]">
        <CircuitPanel drawing={page.circuit} lit={litSet} onLight={setLit} />
        <div className="space-y-9 lg:col-start-2 lg:row-span-2 lg:row-start-1">
          <PromiseCard brief={brief} pack={pack} identifier={page.identifier} />
          <Buy page={page} />
          <Making pack={pack} />
          <SupplyCurrent page={page} />
          <PriceLines page={page} />
          {brief.load.kind === 'led' && (
            <LampPreview frequencyHz={pack.promise.frequencyHz} duty={pack.promise.duty} />
          )}
        </div>
        <div className="space-y-10">
          <section aria-labelledby="parts">
            <h2 id="parts" className="mb-3 text-title font-strong">
              What is in the bag
            </h2>
            <PartsTable
              parts={pack.parts}
              lit={litSet}
              onLight={setLit}
              caption="Parts of this pack"
            />
          </section>
          <PlainCautions cautions={pack.cautions} />
        </div>
      </div>
      <div className="mt-20 space-y-16">
        <Causes page={page} />
        <WaveformSection page={page} />
      </div>
      <Maker page={page} />
    </>
  );
}

function Buy({ page }: { page: PackPage }) {
  const [query] = useSearchParams();
  const { pack } = page;
  const asked = Number(query.get('kits') ?? page.brief.quantity);
  const most = Math.min(500, pack.makeable);
  const [kits, setKits] = useState(
    Math.max(1, Math.min(most, Number.isInteger(asked) ? asked : 1)),
  );
  const total = { ...pack.price.unit, amount: pack.price.unit.amount * kits };
  return (
    <section
      aria-label="Buy"
      className="flex flex-wrap items-start justify-between gap-x-6 gap-y-4"
    >
      <div>
        <Money value={total} className="text-display leading-none font-heavy" />
        <p className="mt-1 text-small text-soft">
          with tax
          {kits > 1 && (
            <>
              , {kits} kits at <Money value={pack.price.unit} />
            </>
          )}
          ; {makeableWords(pack.makeable)}
        </p>
      </div>
      <div className="flex flex-wrap items-start gap-3">
        <Stepper label="Kits" value={kits} min={1} max={most} onCommit={setKits} />
        <PutInBasket
          token={pack.token}
          quantity={kits}
          basketPath={paths.basket.link()}
          about={`${pack.promise.text.rate} ${pack.promise.text.unit}`}
        />
      </div>
    </section>
  );
}

function Maker({ page }: { page: PackPage }) {
  return (
    <section
      aria-label="Who makes it"
      className="mt-16 border-t border-line pt-5 text-small text-soft"
    >
      <p>
        Put together by <strong className="font-strong text-ink">{page.maker.name}</strong>,{' '}
        {page.maker.address.join(', ')};{' '}
        <a className="link" href={`mailto:${page.maker.email}`}>
          {page.maker.email}
        </a>
        . Pack <strong className="font-strong text-ink">{page.identifier}</strong>.
      </p>
    </section>
  );
}
