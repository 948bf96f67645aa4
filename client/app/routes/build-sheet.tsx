import { Link, useParams, useSearchParams } from 'react-router-dom';
import type { BuildSheet } from '../../../server/contracts/orders.ts';
import { sheetPdfUrl, useBuildSheet } from '../../features/build-sheet/api/build-sheet.ts';
import type { SheetAddress } from '../../features/build-sheet/api/build-sheet.ts';
import { SheetView } from '../../features/build-sheet/components/sheet-view.tsx';
import { bindUnits, insideSentence, keepTogether } from '../../lib/spaces.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { Button, ButtonAnchor } from '../../ui/button.tsx';
import { ErrorPanel } from '../../ui/error-panel.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import { paths } from '../paths.ts';

export function Component() {
  const { ref = '', lineId = '' } = useParams();
  const [query] = useSearchParams();
  const address = { ref, lineId, token: query.get('token') };
  const sheet = useBuildSheet(address);
  usePageTitle(`Build sheet ${ref}`);
  return (
    <Page>
      {sheet.isPending && <Waiting words="Fetching the build sheet" />}
      {sheet.isError && (
        <div className="pt-10">
          <ErrorPanel isPage error={sheet.error} onRetry={() => void sheet.refetch()} />
        </div>
      )}
      {sheet.data !== undefined && (
        <>
          <SheetHead sheet={sheet.data} address={address} />
          <SheetView sheet={sheet.data} />
        </>
      )}
    </Page>
  );
}

function SheetHead({ sheet, address }: { sheet: BuildSheet; address: SheetAddress }) {
  const { text } = sheet.promise;
  return (
    <>
      <Opening>
        Built right, it makes <strong>{keepTogether(`${text.rate} ${text.unit}`)}</strong>, and
        always between <strong>{text.from}</strong> and{' '}
        <strong>{keepTogether(`${text.to} ${text.unit}`)}</strong>.
      </Opening>
      <p className="-mt-4 mb-4 max-w-[60em] text-soft">
        Build sheet for: {bindUnits(insideSentence(sheet.sentence))}. Order{' '}
        <Link className="link whitespace-nowrap" to={paths.order.link(sheet.ref, address.token)}>
          {sheet.ref}
        </Link>
        , pack {sheet.identifier}, {sheet.kits === 1 ? 'one kit' : `${sheet.kits} kits`}.
      </p>
      <div className="no-print mb-8 flex flex-wrap gap-3">
        <ButtonAnchor href={sheetPdfUrl(address)} look="outline" size="small">
          Open as PDF
        </ButtonAnchor>
        <Button look="outline" size="small" onClick={() => window.print()}>
          Print
        </Button>
      </div>
    </>
  );
}
