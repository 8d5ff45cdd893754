import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { type Account, renameAccountSchema } from '../../../../shared/contracts/account.ts';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { useRenameAccount } from './rename-account.ts';

/** The name others see beside what this person does. */
export function NameForm({ account }: { account: Account }) {
  const rename = useRenameAccount();
  const { register, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(renameAccountSchema),
    values: { name: account.name },
  });
  const submit = handleSubmit(({ name }) =>
    rename.mutate(name, {
      onSuccess: () => sayDone('Name saved'),
      onError: (error) => applyFieldErrors(error, setError, ['name']),
    }),
  );
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-3">
      <Field label="Name" hint="Your team sees it beside your samples and runs." error={formState.errors.name?.message}>
        <TextInput autoComplete="name" {...register('name')} />
      </Field>
      <Field label="E-mail" hint="You sign in with it. A site administrator can make an account with another.">
        <TextInput readOnly value={account.email} />
      </Field>
      {rename.error && <ErrorState error={rename.error} isInline />}
      <div>
        <Button type="submit" disabled={!formState.isDirty} isPending={rename.isPending} pendingLabel="Saving…">
          Save name
        </Button>
      </div>
    </form>
  );
}
