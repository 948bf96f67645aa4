import { queryOptions, useQuery } from '@tanstack/react-query';
import { deskPartsPageSchema } from '../../../server/contracts/desk.ts';
import { formatMoney } from '../../lib/format-money.ts';
import { request } from '../../lib/http.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Table } from '../../ui/table.tsx';
import { Waiting } from '../../ui/waiting.tsx';

const partsOptions = queryOptions({
  queryKey: ['desk', 'parts'],
  queryFn: ({ signal }) => request(deskPartsPageSchema, '/api/desk/parts', { signal }),
});

/** The owner's side: what lies on the shelves. */
export function DeskRoutes() {
  usePageTitle('Desk');
  const parts = useQuery(partsOptions);
  if (parts.isPending) {
    return (
      <Page>
        <Waiting words="Reading the shelves" />
      </Page>
    );
  }
  if (parts.isError) {
    return (
      <Page>
        <ErrorPanel error={parts.error} onRetry={() => void parts.refetch()} />
      </Page>
    );
  }
  return (
    <Page>
      <Opening>
        The shelves hold <strong>{parts.data.total} parts</strong>.
      </Opening>
      <Table
        caption="Parts"
        rows={parts.data.items}
        rowKey={(row) => row.id}
        columns={[
          { key: 'sku', head: 'Stock number', isRowHead: true, cell: (row) => row.part.sku },
          { key: 'name', head: 'Part', cell: (row) => row.part.name },
          { key: 'held', head: 'On hand', align: 'end', cell: (row) => row.onHand },
          { key: 'free', head: 'Available', align: 'end', cell: (row) => row.part.available },
          {
            key: 'price',
            head: 'Price',
            align: 'end',
            cell: (row) => formatMoney(row.part.unitPrice),
          },
        ]}
      />
    </Page>
  );
}
