import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect, useState } from 'react';
import { useForm } from 'react-hook-form';
import { type Scene, sceneSchema } from '../../../../shared/contracts/scene.ts';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ConflictNote } from '../../components/ui/conflict-note.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { ProblemError } from '../../lib/problem-error.ts';
import { CoarseNote } from './about-panel.tsx';
import { type PresetResult, applyValueScale, fillFromInstrument } from './band-presets.ts';
import { BandTable } from './band-table.tsx';
import { PresetMenus } from './preset-menus.tsx';
import { presetNote } from './preset-note.ts';
import {
  type SceneFormInput,
  type SceneValues,
  overwrittenValues,
  sceneFormSchema,
  sceneValuesOf,
} from './scene-values.ts';
import { useUpdateScene } from './update-scene.ts';

interface SceneFormProps {
  formId: string;
  scene: Scene;
  /** Told whenever there is something to lose, and while it is being saved. */
  onStanding: (standing: { isDirty: boolean; isSaving: boolean }) => void;
}

const NAMED_FIELDS = /^(name|acquiredOn|bands\.\d+\.\w+)$/;

/** Name, date and band table of a scene, saved against the version the form was opened on. */
export function SceneForm({ formId, scene, onStanding }: SceneFormProps) {
  const update = useUpdateScene(scene.projectId, scene.id);
  const [baseVersion, setBaseVersion] = useState(scene.version);
  const [preset, setPreset] = useState<{ note: string; before: SceneValues['bands'] | null } | null>(null);
  const { register, control, handleSubmit, reset, setError, setValue, getValues, formState } = useForm<
    SceneFormInput,
    unknown,
    SceneValues
  >({ resolver: zodResolver(sceneFormSchema), defaultValues: sceneValuesOf(scene) });
  const { isDirty, errors } = formState;
  const isSaving = update.isPending;
  useEffect(() => onStanding({ isDirty, isSaving }), [isDirty, isSaving, onStanding]);

  const conflict = readConflict(update.error);
  const save = (values: SceneValues, version: number) =>
    update.mutate(
      { ...values, version },
      {
        onSuccess: (saved) => {
          reset(sceneValuesOf(saved));
          setBaseVersion(saved.version);
          setPreset(null);
          sayDone(`${saved.name} saved`);
        },
        onError: (error) => {
          if (!(error instanceof ProblemError)) return;
          for (const { path, message } of error.errors) {
            if (NAMED_FIELDS.test(path)) setError(path as 'name', { type: 'server', message });
          }
        },
      },
    );
  const setBands = (bands: SceneValues['bands']) => setValue('bands', bands, { shouldDirty: true });
  const applyPreset = (name: string, make: (bands: SceneValues['bands']) => PresetResult) => {
    const before = structuredClone(getValues('bands')) as SceneValues['bands'];
    const result = make(before);
    setBands(result.bands);
    setPreset({ note: presetNote(name, result), before: result.nChanged > 0 ? before : null });
  };
  return (
    <form
      id={formId}
      noValidate
      onSubmit={(event) => void handleSubmit((values) => save(values, baseVersion))(event)}
      className="flex flex-col gap-4"
    >
      {conflict && (
        <ConflictNote
          what="this scene"
          rows={overwrittenValues(
            formState.defaultValues as SceneValues,
            sceneValuesOf(conflict),
            getValues() as SceneValues,
          )}
          isPending={isSaving}
          onTakeTheirs={() => {
            reset(sceneValuesOf(conflict));
            setBaseVersion(conflict.version);
            update.reset();
          }}
          onKeepMine={() => {
            setBaseVersion(conflict.version);
            void handleSubmit((values) => save(values, conflict.version))();
          }}
        />
      )}
      {scene.guessedRoles && (
        <Callout tone="beware" title="These roles are guessed">
          from the number of bands alone. Check them against the description of your product, then save; composites,
          indices and spectra rest on them.
        </Callout>
      )}
      <div className="grid max-w-2xl gap-4 sm:grid-cols-[1fr_11rem]">
        <Field label="Name" error={errors.name?.message}>
          <TextInput autoComplete="off" {...register('name')} />
        </Field>
        <Field label="Acquired on" isOptional error={errors.acquiredOn?.message}>
          <TextInput type="date" {...register('acquiredOn')} />
        </Field>
      </div>
      <div className="flex flex-wrap items-end gap-x-6 gap-y-2">
        <div className="min-w-0 flex-1 basis-96">
          <h2 className="text-lg font-semibold">Bands</h2>
          <p className="text-sm text-ink-soft">
            A value is the stored figure (DN) times the scale, plus the offset. The stored figures never change.
          </p>
        </div>
        <PresetMenus
          onInstrument={(one) => applyPreset(one.name, (bands) => fillFromInstrument(bands, one))}
          onScale={(one) => applyPreset(one.name, (bands) => applyValueScale(bands, one))}
        />
      </div>
      <div aria-live="polite" className="empty:-mt-4">
        {preset && (
          <Callout tone={preset.before ? 'ok' : 'beware'}>
            {preset.note}{' '}
            {preset.before && (
              <Button
                size="sm"
                kind="ghost"
                onClick={() => {
                  if (preset.before) setBands(preset.before);
                  setPreset(null);
                }}
              >
                Take it back
              </Button>
            )}
          </Callout>
        )}
      </div>
      <BandTable bands={scene.bands} control={control} register={register} errors={errors} />
      <CoarseNote scene={scene} />
      {update.error && !conflict && <ErrorState error={update.error} isInline />}
    </form>
  );
}

/** The scene as it stands, out of a refusal for a stale version. */
function readConflict(error: Error | null): Scene | null {
  if (!(error instanceof ProblemError) || error.status !== 409) return null;
  const parsed = sceneSchema.safeParse(error.current);
  return parsed.success ? parsed.data : null;
}
