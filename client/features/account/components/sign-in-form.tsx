import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { signInSchema } from '../../../../server/contracts/auth.ts';
import type { Me, SignIn } from '../../../../server/contracts/auth.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import { Field } from '../../../ui/field.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useSignIn } from '../api/account.ts';

export function SignInForm({ onDone }: { onDone: (me: Me) => void }) {
  const form = useForm<SignIn>({
    resolver: zodResolver(signInSchema),
    defaultValues: { email: '', password: '' },
  });
  const signIn = useSignIn();
  const { errors } = form.formState;
  return (
    <form
      noValidate
      className="max-w-md space-y-4"
      onSubmit={(event) =>
        void form.handleSubmit((values) =>
          signIn.mutate(values, { onSuccess: (me) => onDone(me) }),
        )(event)
      }
    >
      <Field
        label="E-mail"
        type="email"
        autoComplete="username"
        error={errors.email?.message}
        {...form.register('email')}
      />
      <Field
        label="Password"
        type="password"
        autoComplete="current-password"
        error={errors.password?.message}
        {...form.register('password')}
      />
      {signIn.isError && (
        <Notice tone="danger" urgent>
          {sentenceOf(signIn.error)}
        </Notice>
      )}
      <Button type="submit" busy={signIn.isPending} busyWords="Signing in">
        Sign in
      </Button>
    </form>
  );
}
