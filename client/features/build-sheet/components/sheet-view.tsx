import { useState } from 'react';
import type { BuildSheet } from '../../../../server/contracts/orders.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { PartsTable } from '../../../ui/parts-table.tsx';
import { PulseStrip } from '../../../ui/pulse-strip.tsx';
import { Schematic } from '../../../ui/schematic.tsx';
import { AssemblySteps } from './assembly-steps.tsx';

function Title({ id, children }: { id: string; children: string }) {
  return (
    <h2 id={id} className="mb-3 text-title font-strong">
      {children}
    </h2>
  );
}

/** The sheet that lies beside the soldering iron. */
export function SheetView({ sheet }: { sheet: BuildSheet }) {
  const [lit, setLit] = useState<readonly string[]>([]);
  const litSet = new Set(lit);
  return (
    <div className="space-y-12">
      <div>
        <PulseStrip strip={sheet.strip} withAxis className="h-20" />
      </div>
      <div className="grid items-start gap-x-12 gap-y-10 pt-6 lg:grid-cols-[1fr_1.25fr] print:grid-cols-2">
        <section aria-labelledby="parts">
          <Title id="parts">What is in the bag</Title>
          <PartsTable
            parts={sheet.parts}
            lit={litSet}
            onLight={setLit}
            caption="Parts of the kit"
          />
        </section>
        <section aria-labelledby="circuit" className="min-w-0 lg:sticky lg:top-6">
          <Title id="circuit">How it is joined</Title>
          <div className="ruled border border-line px-3 py-6 sm:pl-13">
            <Schematic
              drawing={sheet.drawing}
              lit={litSet}
              onLight={(role) => setLit(role === null ? [] : [role])}
              label="Circuit diagram; its connections follow in words"
            />
          </div>
          <details className="mt-1">
            <summary className="inline-block py-2 font-strong text-spruce underline underline-offset-4">
              The connections in words
            </summary>
            <ul className="list-disc space-y-1 pl-5">
              {sheet.drawing.description.map((sentence) => (
                <li key={sentence}>{sentence}</li>
              ))}
            </ul>
          </details>
        </section>
      </div>
      <section aria-labelledby="order">
        <Title id="order">In this order</Title>
        <AssemblySteps sheet={sheet} onLight={setLit} />
      </section>
      <Readings sheet={sheet} />
      <section aria-labelledby="mind">
        <Title id="mind">Mind this</Title>
        <ul className="space-y-2 border-l-[6px] border-marigold pl-4">
          {sheet.cautions.map((caution) => (
            <li key={caution.code} className={caution.mustAcknowledge ? 'font-strong' : undefined}>
              {bindUnits(caution.text)}
            </li>
          ))}
        </ul>
      </section>
    </div>
  );
}

function Readings({ sheet }: { sheet: BuildSheet }) {
  return (
    <section aria-labelledby="readings">
      <Title id="readings">What it should read</Title>
      <dl className="border-t-2 border-ink">
        {sheet.readings.map((reading) => (
          <div
            key={reading.point}
            className="ledger-line grid gap-x-8 py-2.5 sm:grid-cols-[12rem_1fr_1.2fr]"
          >
            <dt className="font-strong">{bindUnits(reading.point)}</dt>
            <dd className="font-heavy">{bindUnits(reading.expect)}</dd>
            <dd className="text-soft">{bindUnits(reading.how)}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}
