import { Link } from 'react-router-dom';
import type { Pack, SolveResponse } from '../../../../server/contracts/packs.ts';
import { formatMoney } from '../../../lib/format-money.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { narrow } from '../../../lib/spaces.ts';
import { Table } from '../../../ui/table.tsx';
import { placeTags } from '../scatter.ts';
import type { PlacedTag } from '../scatter.ts';
import { bandOff } from '../model.ts';

interface ScatterProps {
  packs: readonly Pack[];
  answer: SolveResponse;
  packPath: (token: string) => string;
}

function words(pack: Pack, targetHz: number): string {
  const { text } = pack.promise;
  const worse = formatPercent(bandOff(pack, targetHz).worse);
  return `${text.rate} ${text.unit}, stays within ±${narrow}${worse}, ${formatMoney(pack.price.unit)}`;
}

/** The packs that stand behind: price to the right, guaranteed band downwards, a small tag for each. */
export function PackScatter(props: ScatterProps) {
  const { packs, answer } = props;
  const placed = placeTags(packs, answer.brief.targetHz);
  const pack = packs.length === 1 ? 'One more pack' : `${packs.length} more packs`;
  return (
    <section aria-labelledby="behind" className="mt-20">
      <h2 id="behind" className="text-head font-light">
        <strong className="font-heavy">{pack}</strong> from the same shelves, by price and by band.
      </h2>
      <div className="mt-6 hidden sm:block">
        <Plot placed={placed} {...props} />
      </div>
      <details className="mt-6 sm:mt-8" open={packs.length <= 4 ? true : undefined}>
        <summary className="inline-block py-2 font-strong text-spruce underline underline-offset-4">
          The same as a list
        </summary>
        <PackList {...props} />
      </details>
    </section>
  );
}

function Plot({ placed, packs, answer, packPath }: ScatterProps & { placed: PlacedTag[] }) {
  const bands = packs.map((pack) => bandOff(pack, answer.brief.targetHz).worse);
  const prices = packs
    .map((pack) => pack.price.unit)
    .sort((a, b) => a.amount - b.amount)
    .map(formatMoney);
  return (
    <div className="grid grid-cols-[auto_1fr] gap-x-3">
      <p
        aria-hidden="true"
        className="flex flex-col justify-between py-1 text-right text-small text-soft"
      >
        <span>
          steadier
          <span className="block">
            ±{narrow}
            {formatPercent(Math.min(...bands))}
          </span>
        </span>
        <span>
          <span className="block">
            ±{narrow}
            {formatPercent(Math.max(...bands))}
          </span>
          wider
        </span>
      </p>
      <ul
        aria-label="Further packs by price and band"
        className="relative h-72 border-b-2 border-l-2 border-steel/70"
      >
        {placed.map((tag) => (
          <Point key={tag.pack.token} tag={tag} answer={answer} packPath={packPath} />
        ))}
      </ul>
      <span />
      <p aria-hidden="true" className="mt-1.5 flex justify-between text-small text-soft">
        <span>{prices[0]}, cheaper</span>
        <span>dearer, {prices.at(-1)}</span>
      </p>
    </div>
  );
}

function Point(props: {
  tag: PlacedTag;
  answer: SolveResponse;
  packPath: (token: string) => string;
}) {
  const { pack, x, y } = props.tag;
  const said = words(pack, props.answer.brief.targetHz);
  return (
    <li
      className="absolute -translate-x-1/2 -translate-y-1/2 focus-within:z-10 hover:z-10"
      style={{ left: `${4 + x * 92}%`, top: `${12 + y * 76}%` }}
    >
      <Link to={props.packPath(pack.token)} className="group relative block" aria-label={said}>
        <MiniTag />
        <span
          aria-hidden="true"
          className={`pointer-events-none absolute bottom-full z-10 mb-1 hidden rounded-edge bg-ink px-2.5 py-1 text-small whitespace-nowrap text-paper group-hover:block group-focus-visible:block ${x < 0.5 ? 'left-0' : 'right-0'}`}
        >
          {said}
        </span>
      </Link>
    </li>
  );
}

function MiniTag() {
  return (
    <svg viewBox="0 0 30 38" aria-hidden="true" className="h-9.5 w-7.5">
      <path
        fillRule="evenodd"
        d="M7 1H23L29 7V36.4C26 37.6 23 35.6 20 36.6C17 37.4 14 35.8 11 36.6C7 37.6 4 36 1 36.6V7ZM10 6.2a2.8 2.8 0 1 0 0 5.6a2.8 2.8 0 1 0 0-5.6Z"
        className="fill-card stroke-soft group-hover:fill-wash group-focus-visible:fill-wash"
      />
      <path
        d="M4 26V18H11V26H19V18H26V26"
        fill="none"
        className="stroke-spruce"
        strokeWidth="1.75"
      />
    </svg>
  );
}

function PackList({ packs, answer, packPath }: ScatterProps) {
  return (
    <Table
      caption="Further packs"
      rows={packs}
      rowKey={(pack) => pack.token}
      columns={[
        {
          key: 'rate',
          head: 'Rate',
          isRowHead: true,
          cell: (pack) => (
            <Link className="link" to={packPath(pack.token)}>
              {pack.promise.text.rate} {pack.promise.text.unit}
            </Link>
          ),
        },
        {
          key: 'band',
          head: 'Stays within',
          align: 'end',
          cell: (pack) => `±${narrow}${formatPercent(bandOff(pack, answer.brief.targetHz).worse)}`,
        },
        {
          key: 'yield',
          head: 'Hold your band',
          align: 'end',
          cell: (pack) => pack.promise.text.yield,
        },
        { key: 'made', head: 'Can be made', align: 'end', cell: (pack) => pack.makeable },
        { key: 'price', head: 'A kit', align: 'end', cell: (pack) => formatMoney(pack.price.unit) },
      ]}
    />
  );
}
