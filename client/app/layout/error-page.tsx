import { Link, useRouteError } from 'react-router-dom';
import { sentenceOf } from '../../lib/problem-error.ts';
import { Button } from '../../ui/button.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { paths } from '../paths.ts';

/** Where a page ends up that broke while it was drawn. */
export function ErrorPage() {
  const error = useRouteError();
  return (
    <Page className="pb-16">
      <Opening>
        <strong>This page broke.</strong> Nothing was ordered or changed by that.
      </Opening>
      <p className="max-w-prose">{sentenceOf(error)}</p>
      <div className="mt-6 flex flex-wrap items-center gap-6">
        <Button onClick={() => window.location.reload()}>Load it again</Button>
        <Link className="link" to={paths.home.link()}>
          Make a kit
        </Link>
      </div>
    </Page>
  );
}
