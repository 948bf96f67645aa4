import type { ResolvedBrief } from '../../../../server/contracts/brief.ts';
import type { Pack } from '../../../../server/contracts/packs.ts';
import { bindUnits, keepTogether, narrow } from '../../../lib/spaces.ts';
import { Scale } from '../../../ui/scale.tsx';
import { bandOff, rateClause, supplyRange } from '../model.ts';

/** The promise as one framed statement that could be signed, and is: by the identifier under it. */
export function PromiseCard(props: { brief: ResolvedBrief; pack: Pack; identifier: string }) {
  const { brief, pack } = props;
  const { text } = pack.promise;
  const said = rateClause(pack.promise.text, brief.load.kind === 'led');
  const { low, high } = bandOff(pack, brief.targetHz);
  return (
    <section aria-label="The promise" className="framed px-6 pt-7 pb-5 sm:px-8">
      <p className="text-[clamp(1.375rem,1.1rem+1.1vw,1.75rem)] leading-[1.42] font-light [&_strong]:font-heavy">
        This kit {said.verb} <strong>{keepTogether(said.rate)}</strong>. Every kit we send stays
        between <strong className="whitespace-nowrap">{text.from}</strong> and{' '}
        <strong className="whitespace-nowrap">{keepTogether(`${text.to} ${text.unit}`)}</strong>,
        from {brief.ambient.minCelsius} to {keepTogether(`${brief.ambient.maxCelsius}${narrow}°C`)},{' '}
        {bindUnits(supplyRange(brief))}.
      </p>
      <div className="mt-5">
        <Scale asked={brief.band} error={pack.promise.error} low={low} high={high} />
      </div>
      <dl className="mt-3 grid gap-x-8 gap-y-1 border-t border-line pt-4 sm:grid-cols-2">
        <Fact name="Off the rate asked for" value={text.error} />
        <Fact name="Kits inside your band" value={text.yield} />
        <Fact name="Supply current, average" value={text.supply} />
        <Fact
          name={brief.load.kind === 'led' ? 'Lit share of a beat' : 'High share of a cycle'}
          value={`${Number((pack.promise.duty * 100).toPrecision(3))} %`}
        />
      </dl>
      <Signature identifier={props.identifier} />
    </section>
  );
}

function Fact({ name, value }: { name: string; value: string }) {
  return (
    <div className="flex items-baseline justify-between gap-4">
      <dt className="text-soft">{name}</dt>
      <dd className="font-heavy whitespace-nowrap">{bindUnits(value)}</dd>
    </div>
  );
}

function Signature({ identifier }: { identifier: string }) {
  return (
    <div className="mt-6 flex items-end justify-between gap-6">
      <div className="flex-1">
        <svg aria-hidden="true" viewBox="0 0 190 44" className="h-11 w-48 max-w-full">
          <path
            d="M8 12C22 7 42 6 58 8M33 9C30 20 27 30 24 37M46 27C41 27 38 33 41 35C46 37 52 30 48 27C53 30 57 29 61 27C56 27 53 35 58 35C63 35 66 31 68 28M72 10C70 20 68 28 67 36C71 29 76 26 79 26C77 29 73 31 71 31C75 32 78 36 82 34C87 32 88 27 90 26C88 31 88 35 91 35C95 34 97 30 99 26C98 31 98 36 102 34C106 32 107 29 107 26C112 29 117 32 117 28C117 24 110 30 113 34C117 38 124 20 126 11C123 20 119 35 123 35C128 35 134 18 135 10C132 20 128 34 132 35C140 37 156 26 182 31"
            className="fill-none stroke-spruce"
            strokeWidth="1.75"
            strokeLinecap="round"
            strokeLinejoin="round"
          />
        </svg>
        <p className="border-t border-ink pt-1 text-small text-soft">for Tockwell, the bench</p>
      </div>
      <p className="text-right text-small text-soft">
        pack
        <span className="block font-strong break-all text-ink">{identifier}</span>
      </p>
    </div>
  );
}
