import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import { SignUpForm } from '../../features/account/components/sign-up-form.tsx';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { Opening, Page } from '../../ui/page.tsx';
import { paths, safeNext } from '../paths.ts';

export function Component() {
  usePageTitle('Make an account');
  const navigate = useNavigate();
  const [query] = useSearchParams();
  const next = query.get('next');
  return (
    <Page>
      <Opening>
        <strong>An account</strong> keeps your orders and build sheets in one place.
      </Opening>
      <SignUpForm onDone={() => void navigate(safeNext(next), { replace: true })} />
      <p className="mt-8">
        Have one already?{' '}
        <Link className="link" to={paths.signIn.link(next ?? undefined)}>
          Sign in
        </Link>
        .
      </p>
    </Page>
  );
}
