import type { InputHTMLAttributes, Ref, TextareaHTMLAttributes } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { useFieldWiring } from './field.tsx';

export const INPUT_CLASS =
  'w-full min-h-9 rounded-lg border border-edge bg-card px-3 py-1.5 text-base text-ink placeholder:text-ink-soft ' +
  '[&[readonly]]:bg-sunken disabled:opacity-55 aria-invalid:border-rust aria-invalid:border-2';

export type TextInputProps = InputHTMLAttributes<HTMLInputElement> & { ref?: Ref<HTMLInputElement> };

/** A line of text. Spread react-hook-form's `register(...)` onto it. */
export function TextInput({ className, type = 'text', ...rest }: TextInputProps) {
  return <input type={type} {...useFieldWiring()} {...rest} className={classNames(INPUT_CLASS, className)} />;
}

export type TextAreaProps = TextareaHTMLAttributes<HTMLTextAreaElement> & { ref?: Ref<HTMLTextAreaElement> };

/** Several lines of text. */
export function TextArea({ className, rows = 4, ...rest }: TextAreaProps) {
  return (
    <textarea rows={rows} {...useFieldWiring()} {...rest} className={classNames(INPUT_CLASS, 'resize-y', className)} />
  );
}
