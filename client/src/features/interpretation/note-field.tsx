import type { Ref } from 'react';
import { Field } from '../../components/ui/field.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { TextArea } from '../../components/ui/text-input.tsx';

export interface NoteFieldProps {
  ref: Ref<HTMLTextAreaElement>;
  label: string;
  value: string;
  placeholder?: string;
  isDisabled?: boolean;
  onChange: (value: string) => void;
}

/** A note the N key goes to; Esc, or Enter with Ctrl, gives the keys back to the page. */
export function NoteField({ ref, label, value, placeholder, isDisabled = false, onChange }: NoteFieldProps) {
  return (
    <Field
      label={
        <span className="inline-flex items-center gap-1.5">
          {label} <Kbd>N</Kbd>
        </span>
      }
      isOptional
    >
      <TextArea
        ref={ref}
        rows={1}
        className="max-h-40 [field-sizing:content]"
        maxLength={2_000}
        value={value}
        placeholder={placeholder}
        disabled={isDisabled}
        onChange={(event) => onChange(event.target.value)}
        onKeyDown={(event) => {
          if (event.key === 'Escape' || (event.key === 'Enter' && (event.ctrlKey || event.metaKey))) {
            event.preventDefault();
            event.currentTarget.blur();
          }
        }}
      />
    </Field>
  );
}
