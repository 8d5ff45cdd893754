import { type InputHTMLAttributes, type Ref, useState } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { useFieldWiring } from './field.tsx';
import { INPUT_CLASS } from './text-input.tsx';

export interface NumberInputProps extends Omit<InputHTMLAttributes<HTMLInputElement>, 'type' | 'value' | 'onChange'> {
  /** null is an empty field. */
  value: number | null;
  /** Called with every readable number, and null when emptied; never with NaN. */
  onChange: (value: number | null) => void;
  /** Shown after the figure and read out with the label's hint: "µm", "ha". */
  unit?: string;
  ref?: Ref<HTMLInputElement>;
}

/** A figure. Text that is no number yet ("-", "0.") stays in the field until it is one. */
export function NumberInput({ value, onChange, unit, className, onBlur, ...rest }: NumberInputProps) {
  const wiring = useFieldWiring();
  // While typing, the text may be "0." or "-"; it is dropped for the value on leaving the field.
  const [draft, setDraft] = useState<string | null>(null);
  return (
    <span className="relative inline-flex w-full">
      <input
        inputMode="decimal"
        autoComplete="off"
        {...wiring}
        {...rest}
        value={draft ?? (value === null ? '' : String(value))}
        onChange={(event) => {
          const text = event.target.value.trim().replace(',', '.').replace('\u2212', '-');
          setDraft(event.target.value);
          if (text === '') onChange(null);
          else if (Number.isFinite(Number(text))) onChange(Number(text));
        }}
        onBlur={(event) => {
          setDraft(null);
          onBlur?.(event);
        }}
        className={classNames(INPUT_CLASS, unit && 'pr-11', className)}
      />
      {unit && (
        <span
          aria-hidden
          className="pointer-events-none absolute inset-y-0 right-3 flex items-center text-sm text-ink-soft"
        >
          {unit}
        </span>
      )}
    </span>
  );
}
