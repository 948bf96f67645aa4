import type { ReactNode } from 'react';
import { useLocation } from 'react-router-dom';
import type { Me } from '../../../server/contracts/auth.ts';
import { useSession } from '../../lib/session.ts';
import { ButtonLink } from '../../ui/button.tsx';
import { Opening, Page } from '../../ui/page.tsx';
import { Waiting } from '../../ui/waiting.tsx';
import { paths } from '../paths.ts';

/** Opens a side of the shop to those who work there; the server keeps the door, this says so kindly. */
export function StaffOnly(props: {
  place: string;
  may: (me: Me | null) => boolean;
  children: ReactNode;
}) {
  const me = useSession();
  const { pathname, search } = useLocation();
  if (me === undefined) {
    return (
      <Page>
        <Waiting words={`Opening the ${props.place}`} />
      </Page>
    );
  }
  if (props.may(me)) return props.children;
  return (
    <Page className="pb-16">
      <Opening>
        The {props.place} is for <strong>those who work here</strong>.
      </Opening>
      {me === null ? (
        <ButtonLink to={paths.signIn.link(`${pathname}${search}`)}>Sign in</ButtonLink>
      ) : (
        <p className="max-w-prose">
          You are signed in as {me.email}, and that account does not open it. Sign out and come back
          with another, or ask the owner.
        </p>
      )}
    </Page>
  );
}
