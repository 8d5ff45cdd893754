import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { changePasswordSchema } from '../../../../shared/contracts/account.ts';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { type PasswordChange, useChangePassword } from './change-password.ts';

/** Changes the password; other browsers are signed out by it. */
export function PasswordForm() {
  const change = useChangePassword();
  const { register, handleSubmit, setError, reset, formState } = useForm<PasswordChange>({
    resolver: zodResolver(changePasswordSchema),
    defaultValues: { current: '', next: '' },
  });
  const submit = handleSubmit((values) =>
    change.mutate(values, {
      onSuccess: () => {
        reset();
        sayDone('Password changed; other browsers are signed out');
      },
      onError: (error) => {
        // The answer names the field that is wrong; the whole problem would say it twice.
        if (applyFieldErrors(error, setError, ['current', 'next'])) change.reset();
      },
    }),
  );
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-3">
      <Field label="Present password" error={formState.errors.current?.message}>
        <TextInput type="password" autoComplete="current-password" {...register('current')} />
      </Field>
      <Field label="New password" hint="At least 12 characters." error={formState.errors.next?.message}>
        <TextInput type="password" autoComplete="new-password" {...register('next')} />
      </Field>
      {change.error && <ErrorState error={change.error} isInline />}
      <div>
        <Button type="submit" isPending={change.isPending} pendingLabel="Changing…">
          Change password
        </Button>
      </div>
    </form>
  );
}
