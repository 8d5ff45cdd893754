import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { type NamedRecipe, createNamedRecipeSchema } from '../../../../shared/contracts/named-recipe.ts';
import type { Recipe } from '../../../../shared/contracts/run.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextArea, TextInput } from '../../components/ui/text-input.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { useSaveRecipe, useUpdateRecipe } from './recipe-queries.ts';

interface RecipeNameDialogProps {
  projectId: string;
  /** A recipe to keep, or one kept already that gets another name. */
  of: { recipe: Recipe; suggestedName: string } | NamedRecipe;
  onClose: () => void;
}

const FORM_ID = 'recipe-name';
const formSchema = createNamedRecipeSchema.pick({ name: true, note: true });

/** Asks what a recipe is called. */
export function RecipeNameDialog({ projectId, of, onClose }: RecipeNameDialogProps) {
  const kept = 'id' in of ? of : null;
  const save = useSaveRecipe(projectId);
  const update = useUpdateRecipe(projectId);
  const { register, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(formSchema),
    defaultValues: { name: kept ? kept.name : 'suggestedName' in of ? of.suggestedName : '', note: kept?.note ?? '' },
  });
  const submit = handleSubmit(({ name, note }) => {
    const settle = {
      onSuccess: () => {
        sayDone(kept ? 'Recipe renamed' : `Recipe kept as “${name}”`);
        onClose();
      },
      onError: (error: unknown) => applyFieldErrors(error, setError, ['name', 'note']),
    };
    if (kept) update.mutate({ id: kept.id, version: kept.version, name, note }, settle);
    else save.mutate({ name, note, recipe: of.recipe }, settle);
  });
  const error = save.error ?? update.error;
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={kept ? 'Rename recipe' : 'Keep recipe under a name'}
      description="Anyone in the project who starts runs can start from it."
      size="sm"
      footer={
        <>
          <Button onClick={onClose}>Leave</Button>
          <Button
            kind="strong"
            type="submit"
            form={FORM_ID}
            isPending={save.isPending || update.isPending}
            pendingLabel="Saving…"
          >
            {kept ? 'Save' : 'Keep recipe'}
          </Button>
        </>
      }
    >
      <form id={FORM_ID} noValidate onSubmit={(event) => void submit(event)} className="space-y-4">
        <Field label="Name" error={formState.errors.name?.message}>
          <TextInput autoComplete="off" {...register('name')} />
        </Field>
        <Field label="Note" isOptional hint="What it is good for." error={formState.errors.note?.message}>
          <TextArea rows={2} {...register('note')} />
        </Field>
        {error && <ErrorState error={error} isInline />}
      </form>
    </Dialog>
  );
}
