import { Controller, type FieldPath } from 'react-hook-form';
import { Field } from '../../components/ui/field.tsx';
import { RadioGroup, type RadioOption } from '../../components/ui/radio-group.tsx';
import type { RunFormControl, RunFormInput } from './run-form-values.ts';

interface ChoiceFieldProps<V extends string> {
  control: RunFormControl;
  name: FieldPath<RunFormInput>;
  label: string;
  options: readonly RadioOption<V>[];
}

/** One of a few ways of the recipe. */
export function ChoiceField<V extends string>({ control, name, label, options }: ChoiceFieldProps<V>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Field label={label} error={fieldState.error?.message}>
          <RadioGroup
            value={options.find(({ value }) => value === field.value)?.value ?? null}
            onChange={field.onChange}
            options={options}
          />
        </Field>
      )}
    />
  );
}
