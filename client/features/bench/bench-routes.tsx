import { queryOptions, useQuery } from '@tanstack/react-query';
import { queuePageSchema } from '../../../server/contracts/bench.ts';
import type { QueueItem } from '../../../server/contracts/bench.ts';
import { formatMoment } from '../../lib/format-time.ts';
import { request } from '../../lib/http.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Table } from '../../ui/table.tsx';
import { Waiting } from '../../ui/waiting.tsx';

const queueOptions = queryOptions({
  queryKey: ['bench', 'queue'],
  queryFn: ({ signal }) => request(queuePageSchema, '/api/bench/queue', { signal }),
});

/** The packers' side: the queue by ship-by date. */
export function BenchRoutes() {
  usePageTitle('Bench');
  const queue = useQuery(queueOptions);
  return (
    <Page>
      {queue.isPending && <Waiting words="Fetching the queue" />}
      {queue.isError && <ErrorPanel error={queue.error} onRetry={() => void queue.refetch()} />}
      {queue.data !== undefined && <Queue items={queue.data.items} total={queue.data.total} />}
    </Page>
  );
}

function Queue({ items, total }: { items: readonly QueueItem[]; total: number }) {
  return (
    <>
      <Opening>
        The queue holds <strong>{total === 1 ? 'one order' : `${total} orders`}</strong>.
      </Opening>
      <Table
        caption="Orders to pack, by ship-by date"
        rows={items}
        rowKey={(item) => item.ref}
        columns={[
          { key: 'ref', head: 'Order', isRowHead: true, cell: (item) => item.ref },
          { key: 'by', head: 'Ship by', cell: (item) => formatMoment(item.shipBy) },
          { key: 'kits', head: 'Kits', align: 'end', cell: (item) => item.kits },
          { key: 'what', head: 'What', cell: (item) => item.sentence },
          { key: 'who', head: 'Claimed by', cell: (item) => item.claimedBy ?? 'nobody yet' },
        ]}
      />
    </>
  );
}
