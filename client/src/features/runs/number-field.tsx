import type { ReactNode } from 'react';
import { Controller, type FieldPath } from 'react-hook-form';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import type { RunFormControl, RunFormInput } from './run-form-values.ts';

interface NumberFieldProps {
  control: RunFormControl;
  name: FieldPath<RunFormInput>;
  label: string;
  hint?: ReactNode;
  placeholder?: string;
  className?: string;
}

/** A whole number of the recipe. */
export function NumberField({ control, name, label, hint, placeholder, className }: NumberFieldProps) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Field label={label} hint={hint} error={fieldState.error?.message} {...(className && { className })}>
          <NumberInput
            ref={field.ref}
            value={typeof field.value === 'number' ? field.value : null}
            onChange={field.onChange}
            onBlur={field.onBlur}
            placeholder={placeholder}
          />
        </Field>
      )}
    />
  );
}
