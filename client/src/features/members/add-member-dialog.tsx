import { zodResolver } from '@hookform/resolvers/zod';
import { Controller, useForm } from 'react-hook-form';
import { addMemberSchema } from '../../../../shared/contracts/project.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { PassOnLink } from '../../components/ui/pass-on-link.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { roleNames } from '../../lib/role-names.ts';
import { type AddedMember, type NewMember, useAddMember } from './add-member.ts';
import { RolePicker } from './role-picker.tsx';

interface AddMemberDialogProps {
  projectId: string;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

const FORM_ID = 'add-member';

/** Adds a person by e-mail, then says whether they were written to or gives the link to pass on. */
export function AddMemberDialog({ projectId, isOpen, onOpenChange }: AddMemberDialogProps) {
  const add = useAddMember(projectId);
  const close = (next: boolean) => {
    if (!next) add.reset();
    onOpenChange(next);
  };
  return (
    <Dialog
      isOpen={isOpen}
      onOpenChange={close}
      size="sm"
      title={add.data ? `${add.data.member.person.name} is in` : 'Add a person'}
      description={
        add.data
          ? describeResult(add.data)
          : 'By e-mail address. Someone without an account gets one, with a link to choose a password.'
      }
      footer={
        add.data ? (
          <>
            <Button onClick={() => add.reset()}>Add another</Button>
            <Button kind="strong" onClick={() => close(false)}>
              Done
            </Button>
          </>
        ) : (
          <>
            <Button onClick={() => close(false)}>Cancel</Button>
            <Button kind="strong" type="submit" form={FORM_ID} isPending={add.isPending} pendingLabel="Adding…">
              Add to project
            </Button>
          </>
        )
      }
    >
      {add.data ? (
        add.data.link && (
          <PassOnLink
            label={`Welcome link for ${add.data.member.email}`}
            hint="Holds for 14 days and is shown only now."
            link={add.data.link}
          />
        )
      ) : (
        <AddMemberForm add={add} />
      )}
    </Dialog>
  );
}

function AddMemberForm({ add }: { add: ReturnType<typeof useAddMember> }) {
  const { register, control, handleSubmit, setError, formState } = useForm<NewMember>({
    resolver: zodResolver(addMemberSchema),
    defaultValues: { email: '', roles: ['labeller'] },
  });
  const submit = handleSubmit((values) =>
    add.mutate(values, { onError: (error) => applyFieldErrors(error, setError, ['email', 'roles']) }),
  );
  return (
    <form id={FORM_ID} noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <Field label="E-mail" error={formState.errors.email?.message}>
        <TextInput type="email" inputMode="email" autoComplete="off" {...register('email')} />
      </Field>
      <Controller
        control={control}
        name="roles"
        render={({ field, fieldState }) => (
          <RolePicker value={field.value} onChange={field.onChange} error={fieldState.error?.message} />
        )}
      />
      {add.error && <ErrorState error={add.error} isInline />}
    </form>
  );
}

function describeResult({ member, mailed, link }: AddedMember): string {
  const asRoles = `${roleNames(member.roles)} of this project.`;
  if (mailed) return `${asRoles} A letter is on its way to ${member.email}.`;
  if (link) return `${asRoles} No mail server is set up here, so pass the link on yourself.`;
  return `${asRoles} They have an account already; tell them, as no mail server is set up here.`;
}
