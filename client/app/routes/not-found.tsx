import { usePageTitle } from '../../lib/use-page-title.ts';
import { ButtonLink } from '../../ui/button.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { Page } from '../../ui/page.tsx';
import { paths } from '../paths.ts';

export function Component() {
  usePageTitle('Nothing here');
  return (
    <Page>
      <h1 className="sr-only">Nothing here</h1>
      <EmptyState
        title="Nothing hangs on this hook."
        action={<ButtonLink to={paths.home.link()}>Make a kit</ButtonLink>}
      >
        The address may be mistyped, or the page was taken down.
      </EmptyState>
    </Page>
  );
}
