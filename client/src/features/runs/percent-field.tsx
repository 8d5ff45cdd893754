import type { ReactNode } from 'react';
import { Controller, type FieldPath } from 'react-hook-form';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import type { RunFormControl, RunFormInput } from './run-form-values.ts';

interface PercentFieldProps {
  control: RunFormControl;
  name: FieldPath<RunFormInput>;
  label: string;
  hint?: ReactNode;
}

/** A share 0..1 of the recipe, written as per cent. */
export function PercentField({ control, name, label, hint }: PercentFieldProps) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Field label={label} hint={hint} error={fieldState.error?.message}>
          <NumberInput
            ref={field.ref}
            unit="%"
            value={typeof field.value === 'number' ? Math.round(field.value * 1000) / 10 : null}
            onChange={(percent) => field.onChange(percent === null ? null : Math.round(percent * 10) / 1000)}
            onBlur={field.onBlur}
          />
        </Field>
      )}
    />
  );
}
