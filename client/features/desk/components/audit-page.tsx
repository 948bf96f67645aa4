import type { AuditPage as AuditData } from '../../../../server/contracts/desk.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { ErrorPanel } from '../../../ui/error-panel.tsx';
import { Ledger } from '../../../ui/ledger.tsx';
import { LiveRegion } from '../../../ui/live-region.tsx';
import { Opening } from '../../../ui/page.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useAudit } from '../api/audit.ts';
import { useListQuery } from '../list-query.ts';
import { Pager } from './pager.tsx';
import { SearchField } from './search-field.tsx';

/** Who changed what, and why: the newest line first. */
export function AuditPage() {
  usePageTitle('Audit');
  const list = useListQuery();
  const search = list.value('search').slice(0, 100);
  const audit = useAudit({ search, page: list.page });
  return (
    <>
      {audit.data === undefined ? (
        <h1 className="sr-only">Audit</h1>
      ) : (
        <Opening>
          {search === '' ? 'The audit has' : 'This finds'}{' '}
          <strong>{audit.data.total === 1 ? 'one line' : `${audit.data.total} lines`}</strong>.
        </Opening>
      )}
      <search className="mb-6 block max-w-xl">
        <SearchField
          label="Search"
          value={search}
          onSearch={(text) => list.change({ search: text })}
        />
      </search>
      {audit.isPending && <Waiting words="Opening the audit" />}
      {audit.isError && <ErrorPanel error={audit.error} onRetry={() => void audit.refetch()} />}
      {audit.data !== undefined && (
        <div className={audit.isPlaceholderData ? 'opacity-60' : undefined}>
          <LiveRegion
            words={audit.data.total === 1 ? 'One line found.' : `${audit.data.total} lines found.`}
          />
          <AuditLines page={audit.data} isSearch={search !== ''} />
          <Pager {...audit.data} linkTo={list.linkTo} />
        </div>
      )}
    </>
  );
}

function AuditLines({ page, isSearch }: { page: AuditData; isSearch: boolean }) {
  if (page.items.length === 0) {
    return (
      <EmptyState title={isSearch ? 'No line answers to that.' : 'Nothing was changed yet.'}>
        Changed prices, corrected counts and refunds are written down here, with who and why.
      </EmptyState>
    );
  }
  return (
    <Ledger
      label="Audit"
      entries={page.items.map((entry, index) => ({
        key: `${entry.at} ${index}`,
        at: entry.at,
        who: entry.who,
        from: entry.from,
        to: entry.to,
        what: (
          <>
            <strong className="font-strong">{entry.subject}</strong>, {entry.what}
            {entry.note !== null && entry.note !== '' && `: ${bindUnits(entry.note)}`}
          </>
        ),
      }))}
    />
  );
}
