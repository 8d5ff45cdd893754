import { zodResolver } from '@hookform/resolvers/zod';
import { Controller, useForm } from 'react-hook-form';
import { createAccountSchema } from '../../../../shared/contracts/account.ts';
import { Button } from '../../components/ui/button.tsx';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { AccountLinkNote, describeLink } from './account-link-note.tsx';
import { type NewAccount, useCreateSiteAccount } from './create-site-account.ts';

interface CreateAccountDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

const FORM_ID = 'create-account';

/** Makes an account for a person, then says how they get in. */
export function CreateAccountDialog({ isOpen, onOpenChange }: CreateAccountDialogProps) {
  const create = useCreateSiteAccount();
  const close = (next: boolean) => {
    if (!next) create.reset();
    onOpenChange(next);
  };
  return (
    <Dialog
      isOpen={isOpen}
      onOpenChange={close}
      size="sm"
      title={create.data ? `${create.data.account.name} has an account` : 'New account'}
      description={
        create.data
          ? describeLink(create.data)
          : 'An account alone opens no project: the lead of a project adds people to it.'
      }
      footer={
        create.data ? (
          <>
            <Button onClick={() => create.reset()}>Create another</Button>
            <Button kind="strong" onClick={() => close(false)}>
              Done
            </Button>
          </>
        ) : (
          <>
            <Button onClick={() => close(false)}>Cancel</Button>
            <Button kind="strong" type="submit" form={FORM_ID} isPending={create.isPending} pendingLabel="Creating…">
              Create account
            </Button>
          </>
        )
      }
    >
      {create.data ? <AccountLinkNote result={create.data} /> : <CreateAccountForm create={create} />}
    </Dialog>
  );
}

function CreateAccountForm({ create }: { create: ReturnType<typeof useCreateSiteAccount> }) {
  const { register, control, handleSubmit, setError, formState } = useForm<NewAccount>({
    resolver: zodResolver(createAccountSchema),
    defaultValues: { email: '', name: '', siteAdmin: false },
  });
  const submit = handleSubmit((values) =>
    create.mutate(values, { onError: (error) => applyFieldErrors(error, setError, ['email', 'name']) }),
  );
  return (
    <form id={FORM_ID} noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <Field label="E-mail" error={formState.errors.email?.message}>
        <TextInput type="email" inputMode="email" autoComplete="off" {...register('email')} />
      </Field>
      <Field label="Name" hint="The person may change it." error={formState.errors.name?.message}>
        <TextInput autoComplete="off" {...register('name')} />
      </Field>
      <Controller
        control={control}
        name="siteAdmin"
        render={({ field }) => (
          <Checkbox
            label="Site administrator"
            hint="Manages accounts and storage; sees no project by it."
            isChecked={field.value ?? false}
            onChange={field.onChange}
          />
        )}
      />
      {create.error && <ErrorState error={create.error} isInline />}
    </form>
  );
}
