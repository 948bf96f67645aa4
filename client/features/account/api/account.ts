import { useMutation, useQueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { meSchema } from '../../../../server/contracts/auth.ts';
import type { Me, SignIn, SignUp } from '../../../../server/contracts/auth.ts';
import { request } from '../../../lib/http.ts';
import { forgetAllKept } from '../../../lib/kept-session.ts';
import { sessionOptions } from '../../../lib/session.ts';

/** Who is at the screen changes what everything else answers: all of it is asked again. */
function usePersonChange<Input, Person extends Me | null>(send: (input: Input) => Promise<Person>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: send,
    onSuccess: async (me) => {
      client.setQueryData(sessionOptions.queryKey, me);
      await client.invalidateQueries({
        predicate: (query) => query.queryKey[0] !== 'session' && query.queryKey[0] !== 'shop',
      });
    },
  });
}

export function useSignIn() {
  return usePersonChange((body: SignIn) =>
    request(meSchema, '/api/auth/sign-in', { method: 'POST', body }),
  );
}

export function useSignUp() {
  return usePersonChange((body: SignUp) =>
    request(meSchema, '/api/auth/sign-up', { method: 'POST', body }),
  );
}

export function useSignOut() {
  return usePersonChange(async () => {
    await request(z.unknown(), '/api/auth/sign-out', { method: 'POST' });
    forgetAllKept();
    return null;
  });
}
