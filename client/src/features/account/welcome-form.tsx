import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { type Welcome, acceptWelcomeSchema } from '../../../../shared/contracts/account.ts';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { type WelcomeAnswer, useAcceptWelcome } from './accept-welcome.ts';

interface WelcomeFormProps {
  secret: string;
  welcome: Welcome;
  onDone: () => void;
}

/** Chooses name and password through a link. A reset keeps the name, so only the password is asked. */
export function WelcomeForm({ secret, welcome, onDone }: WelcomeFormProps) {
  const accept = useAcceptWelcome(secret);
  const isReset = welcome.purpose === 'reset';
  const { register, handleSubmit, setError, formState } = useForm<WelcomeAnswer>({
    resolver: zodResolver(acceptWelcomeSchema),
    defaultValues: { name: welcome.name, password: '' },
  });
  const submit = handleSubmit((values) =>
    accept.mutate(values, {
      onSuccess: onDone,
      onError: (error) => applyFieldErrors(error, setError, ['name', 'password']),
    }),
  );
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <Field label="E-mail">
        <TextInput type="email" autoComplete="username" readOnly value={welcome.email} />
      </Field>
      {!isReset && (
        <Field
          label="Your name"
          hint="Your team sees it beside your samples and runs."
          error={formState.errors.name?.message}
        >
          <TextInput autoComplete="name" {...register('name')} />
        </Field>
      )}
      <Field
        label={isReset ? 'New password' : 'Password'}
        hint="At least 12 characters; a few words in a row are good."
        error={formState.errors.password?.message}
      >
        <TextInput type="password" autoComplete="new-password" {...register('password')} />
      </Field>
      {accept.error && <ErrorState error={accept.error} isInline />}
      <Button
        kind="primary"
        type="submit"
        isPending={accept.isPending}
        pendingLabel="Signing in…"
        className="mt-1 min-h-10"
      >
        {isReset ? 'Save password and sign in' : 'Open Groundsel'}
      </Button>
    </form>
  );
}
