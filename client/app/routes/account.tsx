import { Navigate, useNavigate } from 'react-router-dom';
import { useSignOut } from '../../features/account/api/account.ts';
import { sentenceOf } from '../../lib/problem-error.ts';
import { useSession } from '../../lib/session.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { Button, ButtonLink } from '../../ui/button.tsx';
import { Notice } from '../../ui/notice.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import type { Me } from '../../../server/contracts/auth.ts';
import { paths } from '../paths.ts';

const roleWords: Record<Me['role'], string> = {
  customer: 'maker',
  packer: 'packer at the bench',
  owner: 'owner',
};

export function Component() {
  usePageTitle('Account');
  const me = useSession();
  const signOut = useSignOut();
  const navigate = useNavigate();
  if (me === undefined) {
    return (
      <Page>
        <Waiting words="Looking you up" />
      </Page>
    );
  }
  if (me === null) return <Navigate to={paths.signIn.link(paths.account.link())} replace />;
  return (
    <Page>
      <Opening>
        You are signed in as <strong>{me.name}</strong>, {roleWords[me.role]}.
      </Opening>
      <p className="text-soft">{me.email}</p>
      <div className="mt-8 flex flex-wrap gap-3">
        <ButtonLink to={paths.orders.link()}>My orders</ButtonLink>
        <Button
          look="outline"
          busy={signOut.isPending}
          busyWords="Signing out"
          onClick={() =>
            signOut.mutate(undefined, { onSuccess: () => void navigate(paths.home.link()) })
          }
        >
          Sign out
        </Button>
      </div>
      {signOut.isError && (
        <Notice tone="danger" urgent className="mt-6">
          {sentenceOf(signOut.error)}
        </Notice>
      )}
    </Page>
  );
}
