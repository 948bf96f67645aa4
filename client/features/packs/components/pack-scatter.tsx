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

function Plot({ placed, answer, packPath }: ScatterProps & { placed: PlacedTag[] }) {
  return (
    <div className="grid grid-cols-[auto_1fr] grid-rows-[1fr_auto] gap-x-3">
      <p className="[transform:rotate(180deg)] self-stretch text-small text-soft [writing-mode:vertical-rl]">
        <span className="flex justify-between">
          <span>wider band</span>
          <span>steadier</span>
        </span>
      </p>
      <ul className="relative h-64 border-b-2 border-l-2 border-steel/70">
        {placed.map(({ pack, x, y }) => (
          <li
            key={pack.token}
            className="absolute -translate-x-1/2 -translate-y-1/2"
            style={{ left: `${4 + x * 92}%`, top: `${9 + y * 80}%` }}
          >
            <Link
              to={packPath(pack.token)}
              className="group relative block"
              aria-label={words(pack, answer.brief.targetHz)}
            >
              <MiniTag />
              <span
                aria-hidden="true"
                className="pointer-events-none absolute bottom-full left-1/2 z-10 mb-1 hidden -translate-x-1/2 rounded-edge bg-ink px-2.5 py-1 text-small whitespace-nowrap text-paper group-hover:block group-focus-visible:block"
              >
                {words(pack, answer.brief.targetHz)}
              </span>
            </Link>
          </li>
        ))}
      </ul>
      <span />
      <p className="mt-1.5 flex justify-between text-small text-soft">
        <span>cheaper</span>
        <span>dearer</span>
      </p>
    </div>
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
