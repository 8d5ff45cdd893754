import { zodResolver } from '@hookform/resolvers/zod';
import { useMemo } from 'react';
import { Controller, useForm } from 'react-hook-form';
import { z } from 'zod';
import { type LandClass, createLandClassSchema } from '../../../../shared/contracts/land-class.ts';
import { ConflictNote } from '../../components/ui/conflict-note.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { TextArea, TextInput } from '../../components/ui/text-input.tsx';
import { applyFieldErrors } from '../../lib/apply-field-errors.ts';
import { ColourField } from './colour-field.tsx';
import { differingFields } from './class-conflict.tsx';

/** Here the code is always said; an emptied field is refused in words. */
const classFormSchema = createLandClassSchema.extend({
  code: z.number({ error: 'Type a code from 1 to 254.' }).pipe(createLandClassSchema.shape.code.unwrap()),
});
export type ClassValues = z.output<typeof classFormSchema>;

/** The fields of a class the form edits, without what the server adds. */
export function valuesOf({ code, name, colour, definition }: LandClass): ClassValues {
  return { code, name, colour, definition };
}

interface ClassFormProps {
  formId: string;
  initial: ClassValues;
  /** The other classes of the scheme: their codes and colours are taken. */
  others: readonly LandClass[];
  error: Error | null;
  isPending: boolean;
  /** The class as someone else saved it, when that stands in the way. */
  conflict: LandClass | null;
  onSubmit: (values: ClassValues, onRefused: (error: Error) => void) => void;
  /** Save over `conflict`, or take it. */
  onKeepMine: (values: ClassValues) => void;
  onTakeTheirs: () => void;
}

const FIELDS = ['code', 'name', 'colour', 'definition'] as const;

/** Code, name, colour and definition of a class. */
export function ClassForm(props: ClassFormProps) {
  const { formId, initial, others, error, conflict } = props;
  const schema = useMemo(() => refuseTakenCodes(others), [others]);
  const { register, control, handleSubmit, setError, getValues, reset, formState } = useForm<
    z.input<typeof classFormSchema>,
    unknown,
    ClassValues
  >({ resolver: zodResolver(schema), defaultValues: initial });
  const takenBy = useMemo(() => new Map(others.map(({ colour, name }) => [colour.toLowerCase(), name])), [others]);
  const submit = handleSubmit((values) =>
    props.onSubmit(values, (refusal) => applyFieldErrors(refusal, setError, FIELDS)),
  );
  return (
    <form id={formId} noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      {conflict && (
        <ConflictNote
          what="this class"
          rows={differingFields(conflict, getValues() as ClassValues)}
          isPending={props.isPending}
          onKeepMine={() => props.onKeepMine(schema.parse(getValues()))}
          onTakeTheirs={() => {
            reset(valuesOf(conflict));
            props.onTakeTheirs();
          }}
        />
      )}
      <div className="grid grid-cols-[1fr_6rem] gap-4">
        <Field label="Name" error={formState.errors.name?.message}>
          <TextInput autoComplete="off" {...register('name')} />
        </Field>
        <Controller
          control={control}
          name="code"
          render={({ field, fieldState }) => (
            <Field label="Code" error={fieldState.error?.message}>
              <NumberInput ref={field.ref} value={field.value} onChange={field.onChange} onBlur={field.onBlur} />
            </Field>
          )}
        />
      </div>
      <p className="-mt-3 text-xs text-ink-soft">
        The code is the pixel value in the class map, 1 to 254; 0 is unclassified and 255 is nodata.
      </p>
      <Controller
        control={control}
        name="colour"
        render={({ field, fieldState }) => (
          <ColourField
            value={field.value}
            onChange={field.onChange}
            error={fieldState.error?.message}
            takenBy={takenBy}
          />
        )}
      />
      <Field
        label="Definition"
        hint="What belongs to it and what does not, so that two people draw the same."
        isOptional
        error={formState.errors.definition?.message}
      >
        <TextArea rows={4} {...register('definition')} />
      </Field>
      {error && !conflict && <ErrorState error={error} isInline />}
    </form>
  );
}

function refuseTakenCodes(others: readonly LandClass[]) {
  return classFormSchema.superRefine(({ code }, context) => {
    const holder = others.find((other) => other.code === code);
    if (holder) context.addIssue({ code: 'custom', path: ['code'], message: `${holder.name} has the code ${code}.` });
  });
}
