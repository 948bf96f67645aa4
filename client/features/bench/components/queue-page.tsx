import { useState } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import type { QueueItem, QueuePage as QueueData } from '../../../../server/contracts/bench.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { Opening, Page } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useQueue } from '../api/queue.ts';
import { benchPaths } from '../bench-paths.ts';
import { shipByWords } from '../ship-by.ts';
import { QueueLine } from './queue-line.tsx';

/** What waits for the bench, the most urgent first. */
export function QueuePage() {
  usePageTitle('Bench');
  const [query] = useSearchParams();
  const page = Math.max(1, Math.trunc(Number(query.get('page') ?? 1)) || 1);
  const queue = useQueue(page);
  const [claimSaid, setClaimSaid] = useState<string | null>(null);
  return (
    <Page className="pb-16">
      {queue.isPending && <Waiting words="Fetching the queue" />}
      {queue.isError && queue.data === undefined && (
        <div className="pt-10">
          <ErrorPanel isPage error={queue.error} onRetry={() => void queue.refetch()} />
        </div>
      )}
      {queue.data !== undefined && (
        <>
          <QueueOpening queue={queue.data} />
          {queue.isError && (
            <Notice tone="caution" className="mb-6" title="The queue below may be out of date">
              {sentenceOf(queue.error)} It asks again by itself.
            </Notice>
          )}
          {claimSaid !== null && (
            <Notice tone="danger" urgent className="mb-6">
              {claimSaid}
            </Notice>
          )}
          <QueueLines queue={queue.data} onClaimSaid={setClaimSaid} />
        </>
      )}
    </Page>
  );
}

function ordersWords(count: number): string {
  return count === 1 ? 'one order' : `${count} orders`;
}

function lateWords(late: number): string {
  return late === 1 ? 'one is late' : `${late} are late`;
}

function QueueOpening({ queue }: { queue: QueueData }) {
  const [first] = queue.items;
  const late = queue.items.filter((item) => item.late).length;
  if (first === undefined) {
    return (
      <Opening>
        The queue is <strong>empty</strong>.
      </Opening>
    );
  }
  const next = queue.items.find((item) => !item.late);
  return (
    <Opening>
      The queue holds <strong>{ordersWords(queue.total)}</strong>
      {late > 0 && (
        <>
          , <strong>{lateWords(late)}</strong>
        </>
      )}
      .{' '}
      {next !== undefined && (
        <>
          The next parcel leaves at <strong>{shipByWords(next.shipBy, new Date())}</strong>.
        </>
      )}
    </Opening>
  );
}

interface QueueLinesProps {
  queue: QueueData;
  onClaimSaid: (sentence: string | null) => void;
}

function isForMe(item: QueueItem): boolean {
  return item.mine && item.status !== 'paid';
}

function QueueLines({ queue, onClaimSaid }: QueueLinesProps) {
  if (queue.items.length === 0) {
    return (
      <EmptyState title="Nothing to pack just now.">
        Paid orders appear here by themselves, a few seconds after they are paid.
      </EmptyState>
    );
  }
  const lead =
    queue.items.find(isForMe)?.ref ?? queue.items.find((item) => item.claimedBy === null)?.ref;
  return (
    <>
      <ol aria-label="Orders by ship-by time" className="border-t-2 border-ink">
        {queue.items.map((item) => (
          <QueueLine
            key={item.ref}
            item={item}
            isLead={item.ref === lead}
            onClaimSaid={onClaimSaid}
          />
        ))}
      </ol>
      <Pages queue={queue} />
    </>
  );
}

function Pages({ queue: { page, pageSize, total } }: { queue: QueueData }) {
  if (total <= pageSize) return null;
  return (
    <nav aria-label="Pages of the queue" className="flex justify-between py-4">
      {page > 1 ? (
        <Link
          className="link inline-flex min-h-14 items-center"
          to={benchPaths.queue.link(page - 1)}
        >
          More urgent
        </Link>
      ) : (
        <span />
      )}
      {page * pageSize < total && (
        <Link
          className="link inline-flex min-h-14 items-center"
          to={benchPaths.queue.link(page + 1)}
        >
          Less urgent
        </Link>
      )}
    </nav>
  );
}
