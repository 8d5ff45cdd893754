import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { forgotPasswordSchema } from '../../../../shared/contracts/account.ts';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { useAskReset } from './ask-reset.ts';

/** Asks for a reset link. Whether the account exists is not given away. */
export function ForgottenForm() {
  const ask = useAskReset();
  const { register, handleSubmit, formState } = useForm({
    resolver: zodResolver(forgotPasswordSchema),
    defaultValues: { email: '' },
  });
  const submit = handleSubmit(({ email }) => ask.mutate(email));
  if (ask.isSuccess) {
    return (
      <Callout tone="ok" isAlert title="Asked for.">
        If {ask.variables} has an account here, a link is on its way to it and holds for two hours. No letter? Ask your
        site administrator for a link: this site may have no mail server.
      </Callout>
    );
  }
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <Field label="E-mail" error={formState.errors.email?.message}>
        <TextInput type="email" inputMode="email" autoComplete="username" {...register('email')} />
      </Field>
      {ask.error && <ErrorState error={ask.error} isInline />}
      <Button kind="primary" type="submit" isPending={ask.isPending} pendingLabel="Asking…" className="mt-1 min-h-10">
        Send me a link
      </Button>
    </form>
  );
}
