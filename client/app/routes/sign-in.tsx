import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import { SignInForm } from '../../features/account/components/sign-in-form.tsx';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { Opening, Page } from '../../ui/page.tsx';
import { paths, safeNext } from '../paths.ts';

export function Component() {
  usePageTitle('Sign in');
  const navigate = useNavigate();
  const [query] = useSearchParams();
  const next = query.get('next');
  return (
    <Page>
      <Opening>
        <strong>Sign in</strong> to find your orders and build sheets again.
      </Opening>
      <SignInForm onDone={(me) => void navigate(safeNext(next, me.role), { replace: true })} />
      <p className="mt-8">
        No account yet?{' '}
        <Link className="link" to={paths.signUp.link(next ?? undefined)}>
          Make one
        </Link>
        . You can also order without.
      </p>
    </Page>
  );
}
