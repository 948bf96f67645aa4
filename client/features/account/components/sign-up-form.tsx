import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { signUpSchema } from '../../../../server/contracts/auth.ts';
import type { SignUp } from '../../../../server/contracts/auth.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import { Field } from '../../../ui/field.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useSignUp } from '../api/account.ts';

export function SignUpForm({ onDone }: { onDone: () => void }) {
  const form = useForm<SignUp>({
    resolver: zodResolver(signUpSchema),
    defaultValues: { name: '', email: '', password: '' },
  });
  const signUp = useSignUp();
  const { errors } = form.formState;
  return (
    <form
      noValidate
      className="max-w-md space-y-4"
      onSubmit={(event) =>
        void form.handleSubmit((values) => signUp.mutate(values, { onSuccess: onDone }))(event)
      }
    >
      <Field
        label="Name"
        autoComplete="name"
        error={errors.name?.message}
        {...form.register('name')}
      />
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
        autoComplete="new-password"
        hint="At least 15 characters. A few words in a row are easy to remember."
        error={errors.password?.message}
        {...form.register('password')}
      />
      {signUp.isError && (
        <Notice tone="danger" urgent>
          {sentenceOf(signUp.error)}
        </Notice>
      )}
      <Button type="submit" busy={signUp.isPending} busyWords="Making the account">
        Make an account
      </Button>
    </form>
  );
}
