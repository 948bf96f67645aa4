import type { DeskPartsPage } from '../../../../server/contracts/desk.ts';
import { partKinds } from '../../../../server/contracts/parts.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { Button } from '../../../ui/button.tsx';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Select } from '../../../ui/field.tsx';
import { LiveRegion } from '../../../ui/live-region.tsx';
import { Opening } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useParts } from '../api/parts.ts';
import { useListQuery } from '../list-query.ts';
import { readPartsQuery } from '../parts-query.ts';
import type { PartsQuery } from '../parts-query.ts';
import { Pager } from './pager.tsx';
import { PartsList } from './parts-list.tsx';
import { SearchField } from './search-field.tsx';

const capital = (word: string) => word.charAt(0).toUpperCase() + word.slice(1);
const kinds = [
  { value: '', label: 'Every kind' },
  ...partKinds.map((kind) => ({ value: kind, label: capital(kind) })),
];
const mountings = [
  { value: '', label: 'Either' },
  { value: 'through-hole', label: 'Through-hole' },
  { value: 'surface-mount', label: 'Surface-mount' },
];
const stocks = [
  { value: '', label: 'Whatever is left' },
  { value: 'in', label: 'In stock' },
  { value: 'low', label: 'Running low' },
  { value: 'out', label: 'Out of stock' },
];

/** Everything on the shelves: searched, filtered, sorted and paged, all of it in the address. */
export function PartsPage() {
  usePageTitle('Parts');
  const list = useListQuery();
  const query = readPartsQuery(list.value, list.page);
  const parts = useParts(query);
  return (
    <>
      <PartsOpening page={parts.data} query={query} />
      <search className="mb-6 grid gap-x-6 gap-y-4 sm:grid-cols-2 lg:grid-cols-[1.6fr_1fr_1fr_1fr]">
        <SearchField
          label="Search"
          value={query.search ?? ''}
          onSearch={(search) => list.change({ search })}
        />
        <Select
          label="Kind"
          options={kinds}
          value={query.kind ?? ''}
          onChange={(event) => list.change({ kind: event.target.value })}
        />
        <Select
          label="Mounting"
          options={mountings}
          value={query.mounting ?? ''}
          onChange={(event) => list.change({ mounting: event.target.value })}
        />
        <Select
          label="Stock"
          options={stocks}
          value={query.stock === 'all' ? '' : query.stock}
          onChange={(event) => list.change({ stock: event.target.value })}
        />
      </search>
      {parts.isPending && <Waiting words="Reading the shelves" />}
      {parts.isError && <ErrorPanel error={parts.error} onRetry={() => void parts.refetch()} />}
      {parts.data !== undefined && (
        <div className={parts.isPlaceholderData ? 'opacity-60' : undefined}>
          <LiveRegion
            words={parts.data.total === 1 ? 'One part found.' : `${parts.data.total} parts found.`}
          />
          <PartsResult page={parts.data} query={query} list={list} />
        </div>
      )}
    </>
  );
}

function PartsOpening(props: { page: DeskPartsPage | undefined; query: PartsQuery }) {
  const { page, query } = props;
  const isWhole =
    query.search === undefined && query.kind === undefined && query.mounting === undefined;
  if (page === undefined) return <h1 className="sr-only">Parts</h1>;
  const count = page.total === 1 ? 'one part' : `${page.total} parts`;
  if (query.stock === 'out' || query.stock === 'low') {
    return (
      <Opening>
        <strong>{count.charAt(0).toUpperCase() + count.slice(1)}</strong>{' '}
        {page.total === 1 ? 'is' : 'are'} {query.stock === 'out' ? 'out of stock' : 'running low'}.
      </Opening>
    );
  }
  return (
    <Opening>
      {isWhole && query.stock === 'all' ? 'The catalogue has' : 'This finds'}{' '}
      <strong>{count}</strong>.
    </Opening>
  );
}

function PartsResult(props: {
  page: DeskPartsPage;
  query: PartsQuery;
  list: ReturnType<typeof useListQuery>;
}) {
  const { page, query, list } = props;
  if (page.items.length === 0) {
    return (
      <EmptyState
        title="No part answers to that."
        action={
          <Button
            look="outline"
            onClick={() => list.change({ search: '', kind: '', mounting: '', stock: '', page: '' })}
          >
            Show every part
          </Button>
        }
      >
        Search for a stock number, a value like 820 nF, or a word of the name.
      </EmptyState>
    );
  }
  return (
    <>
      <PartsList
        parts={page.items}
        query={query}
        onSort={(sort, direction) =>
          list.change({
            sort: sort === 'sku' ? '' : sort,
            direction: direction === 'up' ? '' : direction,
          })
        }
      />
      <Pager {...page} linkTo={list.linkTo} />
    </>
  );
}
