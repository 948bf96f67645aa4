import { Link } from 'react-router-dom';
import type { DeskPart } from '../../../../server/contracts/desk.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Money } from '../../../ui/money.tsx';
import { Table } from '../../../ui/table.tsx';
import type { Column } from '../../../ui/table.tsx';
import { deskPaths } from '../desk-paths.ts';
import type { PartsQuery, PartsSort } from '../parts-query.ts';
import { StockSign } from './stock-sign.tsx';

type Direction = 'up' | 'down';
interface Sorting {
  query: PartsQuery;
  onSort: (sort: PartsSort, direction: Direction) => void;
}

/** The shelves as a ruled table; a column's head sorts by it, pressed again the other way round. */
export function PartsList({ parts, ...sorting }: Sorting & { parts: readonly DeskPart[] }) {
  return (
    <Table
      caption="Parts"
      rows={parts}
      rowKey={(row) => row.id}
      rowClass={() => 'hover:bg-wash/50'}
      columns={columns(sorting)}
    />
  );
}

function sortable(
  { query, onSort }: Sorting,
  sort: PartsSort,
  words: string,
): Pick<Column<DeskPart>, 'head' | 'sorted'> {
  const isSorted = query.sort === sort;
  const direction: Direction = query.direction ?? 'up';
  const next: Direction = isSorted && direction === 'up' ? 'down' : 'up';
  return {
    sorted: !isSorted ? 'none' : direction === 'up' ? 'ascending' : 'descending',
    head: (
      <button
        type="button"
        onClick={() => onSort(sort, next)}
        className="inline-flex min-h-8 items-center gap-1 font-strong text-spruce underline decoration-dotted underline-offset-4 hover:decoration-solid"
      >
        {words}
        <SortSign direction={isSorted ? direction : null} />
      </button>
    ),
  };
}

function SortSign({ direction }: { direction: Direction | null }) {
  if (direction === null) return null;
  return (
    <svg aria-hidden="true" viewBox="0 0 10 10" className="size-2.5">
      <path d={direction === 'up' ? 'M5 1L9.5 9H.5Z' : 'M5 9L.5 1H9.5Z'} className="fill-spruce" />
    </svg>
  );
}

function columns(sorting: Sorting): Column<DeskPart>[] {
  return [
    {
      key: 'sku',
      ...sortable(sorting, 'sku', 'Stock number'),
      isRowHead: true,
      cell: (row) => (
        <Link className="link whitespace-nowrap" to={deskPaths.part.link(row.id)}>
          {row.part.sku}
        </Link>
      ),
    },
    {
      key: 'name',
      ...sortable(sorting, 'value', 'Part, by value'),
      className: 'min-w-56',
      cell: (row) => (
        <>
          {bindUnits(row.part.name)}
          <span className="text-soft">
            {row.part.mounting === 'surface-mount' && ' · surface-mount'}
            {!row.active && ' · not sold any more'}
          </span>
        </>
      ),
    },
    {
      key: 'bins',
      head: 'Bins',
      cell: (row) => (
        <span className="whitespace-nowrap">
          {[...new Set(row.lots.map((lot) => lot.bin))].slice(0, 3).join(', ')}
        </span>
      ),
    },
    {
      key: 'onHand',
      ...sortable(sorting, 'onHand', 'On hand'),
      align: 'end',
      cell: (row) => row.onHand,
    },
    {
      key: 'available',
      ...sortable(sorting, 'available', 'Available'),
      align: 'end',
      cell: (row) => <StockSign available={row.part.available} />,
    },
    {
      key: 'price',
      ...sortable(sorting, 'price', 'Price'),
      align: 'end',
      cell: (row) => <Money value={row.part.unitPrice} className="font-strong" />,
    },
    {
      key: 'cost',
      head: 'Cost',
      align: 'end',
      cell: (row) => <Money value={row.cost} className="text-soft" />,
    },
  ];
}
