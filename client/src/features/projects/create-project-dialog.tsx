import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { type CreateProject, createProjectSchema } from '../../../../shared/contracts/project.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextArea, TextInput } from '../../components/ui/text-input.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { useCreateProject } from './create-project.ts';

interface CreateProjectDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onCreated: (projectId: string) => void;
}

const FORM_ID = 'create-project';

/** Asks for what a commission is called, for whom, and what it is about. */
export function CreateProjectDialog({ isOpen, onOpenChange, onCreated }: CreateProjectDialogProps) {
  const create = useCreateProject();
  const close = (next: boolean) => {
    if (!next) create.reset();
    onOpenChange(next);
  };
  return (
    <Dialog
      isOpen={isOpen}
      onOpenChange={close}
      title="New project"
      description="A project holds one commission: its scenes, class scheme, samples, runs and handover. You become its lead."
      footer={
        <>
          <Button onClick={() => close(false)}>Cancel</Button>
          <Button
            kind="primary"
            type="submit"
            form={FORM_ID}
            isPending={create.isPending}
            pendingLabel="Creating project…"
          >
            Create project
          </Button>
        </>
      }
    >
      <CreateProjectForm create={create} onCreated={onCreated} />
    </Dialog>
  );
}

function CreateProjectForm({
  create,
  onCreated,
}: {
  create: ReturnType<typeof useCreateProject>;
  onCreated: (projectId: string) => void;
}) {
  const { register, handleSubmit, setError, formState } = useForm<CreateProject>({
    resolver: zodResolver(createProjectSchema),
    defaultValues: { name: '', client: '', description: '' },
  });
  const submit = handleSubmit((values) =>
    create.mutate(values, {
      onSuccess: (project) => onCreated(project.id),
      onError: (error) => applyFieldErrors(error, setError, ['name', 'client', 'description']),
    }),
  );
  return (
    <form id={FORM_ID} noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <Field label="Name" hint="As the client would call the map." error={formState.errors.name?.message}>
        <TextInput autoComplete="off" {...register('name')} />
      </Field>
      <Field label="Client" isOptional error={formState.errors.client?.message}>
        <TextInput autoComplete="off" {...register('client')} />
      </Field>
      <Field
        label="What it is for"
        hint="The area, the question, what the map will be used for."
        isOptional
        error={formState.errors.description?.message}
      >
        <TextArea rows={4} {...register('description')} />
      </Field>
      {create.error && <ErrorState error={create.error} isInline />}
    </form>
  );
}
