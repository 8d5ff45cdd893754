import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { Controller, useForm } from 'react-hook-form';
import { type Project, updateProjectSchema } from '../../../../shared/contracts/project.ts';
import { ConflictNote } from '../../components/ui/conflict-note.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { TextArea, TextInput } from '../../components/ui/text-input.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { ProblemError } from '../../lib/problem-error.ts';
import { type ProjectDetails, detailsOf, differingDetails } from './project-details.ts';
import type { useUpdateProject } from './update-project.ts';

interface ProjectDetailsFormProps {
  formId: string;
  project: Project;
  update: ReturnType<typeof useUpdateProject>;
  onDone: () => void;
}

const FIELDS = ['name', 'client', 'description', 'targetOverallAccuracy', 'targetSamplesPerClass'] as const;
const formSchema = updateProjectSchema.omit({ version: true }).required();

/** Saves against the version the form was opened on; when someone was first, both versions are shown. */
export function ProjectDetailsForm({ formId, project, update, onDone }: ProjectDetailsFormProps) {
  const [baseVersion, setBaseVersion] = useState(project.version);
  const { register, control, handleSubmit, reset, setError, getValues, formState } = useForm<ProjectDetails>({
    resolver: zodResolver(formSchema),
    defaultValues: detailsOf(project),
  });
  const save = (values: ProjectDetails, version: number) =>
    update.mutate(
      { ...values, version },
      {
        onSuccess: () => {
          sayDone('Project details saved');
          onDone();
        },
        onError: (error) => applyFieldErrors(error, setError, FIELDS),
      },
    );
  const submit = handleSubmit((values) => save(values, baseVersion));
  const isConflict = update.error instanceof ProblemError && update.error.code === 'stale-version';
  const takeTheirs = () => {
    reset(detailsOf(project));
    setBaseVersion(project.version);
    update.reset();
  };
  return (
    <form id={formId} noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      {isConflict && project.version !== baseVersion && (
        <ConflictNote
          what="this project"
          rows={differingDetails(detailsOf(project), getValues())}
          isPending={update.isPending}
          onTakeTheirs={takeTheirs}
          onKeepMine={() => {
            setBaseVersion(project.version);
            save(getValues(), project.version);
          }}
        />
      )}
      <Field label="Name" error={formState.errors.name?.message}>
        <TextInput autoComplete="off" {...register('name')} />
      </Field>
      <Field label="Client" isOptional error={formState.errors.client?.message}>
        <TextInput autoComplete="off" {...register('client')} />
      </Field>
      <Field label="What it is for" isOptional error={formState.errors.description?.message}>
        <TextArea rows={4} {...register('description')} />
      </Field>
      <fieldset>
        <legend className="text-base font-semibold">Targets</legend>
        <p className="text-xs text-ink-soft">
          What the commission asks for. Figures are read against them; leave empty for none.
        </p>
        <div className="mt-3 grid gap-4 sm:grid-cols-2">
          <Controller
            control={control}
            name="targetOverallAccuracy"
            render={({ field, fieldState }) => (
              <Field label="Overall accuracy" hint="Percent of reference units" error={fieldState.error?.message}>
                <NumberInput
                  ref={field.ref}
                  unit="%"
                  value={field.value === null ? null : roundTo(field.value * 100, 2)}
                  onChange={(percent) => field.onChange(percent === null ? null : roundTo(percent / 100, 4))}
                  onBlur={field.onBlur}
                />
              </Field>
            )}
          />
          <Controller
            control={control}
            name="targetSamplesPerClass"
            render={({ field, fieldState }) => (
              <Field label="Samples of each class" hint="Polygons, not pixels" error={fieldState.error?.message}>
                <NumberInput ref={field.ref} value={field.value} onChange={field.onChange} onBlur={field.onBlur} />
              </Field>
            )}
          />
        </div>
      </fieldset>
      {update.error && !isConflict && <ErrorState error={update.error} isInline />}
    </form>
  );
}

/** 0.9 × 100 is 90.00000000000001 in binary: the field shows what was typed. */
function roundTo(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
