import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect, useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { type Recipe, type Run, recipeSchema, startRunSchema } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextArea, TextInput } from '../../components/ui/text-input.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { ClassFields } from './class-fields.tsx';
import { ClassifierFields } from './classifier-fields.tsx';
import type { RunDraft } from './default-recipe.ts';
import { describeIssue } from './form-messages.ts';
import type { RunFormInput, RunFormOutput } from './run-form-values.ts';
import { SceneFields } from './scene-fields.tsx';
import { SplitFields } from './split-fields.tsx';
import type { useStartRun } from './start-run.ts';

interface RecipeFormProps {
  formId: string;
  draft: RunDraft;
  scenes: readonly Scene[];
  classes: readonly LandClass[];
  start: ReturnType<typeof useStartRun>;
  /** The recipe as it stands, once typing rests; null while a field of it is wrong. */
  onRecipe: (recipe: Recipe | null) => void;
  onStarted: (run: Run) => void;
}

const FIELDS = [
  'name',
  'note',
  'recipe.sceneId',
  'recipe.bandIds',
  'recipe.classIds',
  'recipe.heldOutShare',
  'recipe.sampleStates',
  'recipe.seed',
  'recipe.maxPixelsPerClass',
  'recipe.classifier.featuresPerTree',
] as const;

/** The recipe of a run: scene, bands, classes, split and classifier. */
export function RecipeForm({ formId, draft, scenes, classes, start, onRecipe, onStarted }: RecipeFormProps) {
  const { register, control, handleSubmit, setError, formState } = useForm<RunFormInput, unknown, RunFormOutput>({
    resolver: zodResolver(startRunSchema, { error: describeIssue }),
    defaultValues: draft,
    mode: 'onChange',
  });
  const settled = useSettled(useWatch({ control, name: 'recipe' }));
  useEffect(() => {
    const parsed = recipeSchema.safeParse(settled);
    onRecipe(parsed.success ? parsed.data : null);
  }, [settled, onRecipe]);
  const submit = handleSubmit((values) =>
    start.mutate(values, {
      onSuccess: onStarted,
      onError: (error) => applyFieldErrors(error, setError, FIELDS),
    }),
  );
  return (
    <form id={formId} noValidate onSubmit={(event) => void submit(event)} className="space-y-7">
      <div className="grid gap-4 sm:grid-cols-2">
        <Field label="Name" isOptional hint="To tell runs apart in lists." error={formState.errors.name?.message}>
          <TextInput autoComplete="off" {...register('name')} />
        </Field>
        <Field label="Note" isOptional hint="What you want to find out." error={formState.errors.note?.message}>
          <TextArea rows={1} {...register('note')} />
        </Field>
      </div>
      <SceneFields control={control} scenes={scenes} />
      <ClassFields control={control} classes={classes} />
      <SplitFields control={control} />
      <ClassifierFields control={control} />
      {start.error && <ErrorState error={start.error} isInline />}
    </form>
  );
}

const REST_MS = 350;

/** A value once it has rested for a moment, so that a figure half typed asks nothing of the server. */
function useSettled<T>(value: T): T {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), REST_MS);
    return () => clearTimeout(timer);
  }, [value]);
  return settled;
}
