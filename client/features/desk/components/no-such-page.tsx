import { Link } from 'react-router-dom';
import { usePageTitle } from '../../../lib/use-page-title.ts';
import { Opening } from '../../../ui/page.tsx';
import { deskPaths } from '../desk-paths.ts';

export function NoSuchPage() {
  usePageTitle('Not on the desk');
  return (
    <>
      <Opening>
        The desk has <strong>no such page</strong>.
      </Opening>
      <Link className="link" to={deskPaths.today.link()}>
        Go to today
      </Link>
    </>
  );
}
