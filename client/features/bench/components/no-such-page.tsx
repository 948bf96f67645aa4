import { usePageTitle } from '../../../lib/use-page-title.ts';
import { ButtonLink } from '../../../ui/button.tsx';
import { Opening, Page } from '../../../ui/page.tsx';
import { benchPaths } from '../bench-paths.ts';

export function NoSuchPage() {
  usePageTitle('Not on the bench');
  return (
    <Page className="pb-16">
      <Opening>
        The bench has <strong>no such page</strong>.
      </Opening>
      <ButtonLink size="bench" to={benchPaths.queue.link()}>
        Go to the queue
      </ButtonLink>
    </Page>
  );
}
