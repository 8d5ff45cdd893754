import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { Link } from 'react-router-dom';
import { type SignIn, signInSchema } from '../../../../shared/contracts/account.ts';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { paths } from '../../lib/paths.ts';
import { useSignIn } from './sign-in.ts';

/** E-mail and password. `onDone` is called once the session stands. */
export function SignInForm({ onDone }: { onDone: () => void }) {
  const signIn = useSignIn();
  const { register, handleSubmit, formState } = useForm<SignIn>({
    resolver: zodResolver(signInSchema),
    defaultValues: { email: '', password: '' },
  });
  const submit = handleSubmit((values) => signIn.mutate(values, { onSuccess: onDone }));
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <Field label="E-mail" error={formState.errors.email?.message}>
        <TextInput type="email" autoComplete="username" inputMode="email" {...register('email')} />
      </Field>
      <Field label="Password" error={formState.errors.password?.message}>
        <TextInput type="password" autoComplete="current-password" {...register('password')} />
      </Field>
      {signIn.error && <ErrorState error={signIn.error} isInline />}
      <Button
        kind="primary"
        type="submit"
        isPending={signIn.isPending}
        pendingLabel="Signing in…"
        className="mt-1 min-h-10"
      >
        Sign in
      </Button>
      <p className="text-sm">
        <Link to={paths.forgotPassword()} className="link">
          Forgotten your password?
        </Link>
      </p>
    </form>
  );
}
