import { type ReactNode, createContext, use, useId } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface FieldProps {
  label: ReactNode;
  /** Said under the label: what is wanted, in what unit. */
  hint?: ReactNode;
  /** What is wrong; sets aria-invalid and is read out with the control. */
  error?: ReactNode;
  isOptional?: boolean;
  /** The label is read out but not drawn. */
  isLabelHidden?: boolean;
  className?: string;
  /** One control of this folder; it takes its id and its aria wiring from the field. */
  children: ReactNode;
}

interface FieldWiring {
  id: string;
  labelId: string;
  describedBy: string | undefined;
  isInvalid: boolean;
}

const FieldContext = createContext<FieldWiring | null>(null);

/** A control with its label, hint and error, wired together for screen readers. */
export function Field({
  label,
  hint,
  error,
  isOptional = false,
  isLabelHidden = false,
  className,
  children,
}: FieldProps) {
  const id = useId();
  const wiring: FieldWiring = {
    id,
    labelId: `${id}-label`,
    describedBy: [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ') || undefined,
    isInvalid: Boolean(error),
  };
  return (
    <FieldContext value={wiring}>
      <div className={classNames('flex flex-col gap-1', className)}>
        <label id={wiring.labelId} htmlFor={id} className={isLabelHidden ? 'sr-only' : 'text-sm font-medium'}>
          {label}
          {isOptional && <span className="ml-1.5 font-normal text-ink-soft">optional</span>}
        </label>
        {hint && (
          <p id={`${id}-hint`} className="-mt-0.5 text-xs text-ink-soft">
            {hint}
          </p>
        )}
        {children}
        {error && (
          <p id={`${id}-error`} role="alert" className="text-xs font-medium text-rust">
            {error}
          </p>
        )}
      </div>
    </FieldContext>
  );
}

/** The id and aria attributes a control takes from the Field around it; empty outside of one. */
export function useFieldWiring(): {
  id?: string;
  'aria-describedby'?: string | undefined;
  'aria-invalid'?: true | undefined;
} {
  const wiring = use(FieldContext);
  if (!wiring) return {};
  return {
    id: wiring.id,
    'aria-describedby': wiring.describedBy,
    'aria-invalid': wiring.isInvalid || undefined,
  };
}

/** For controls that are no form element (slider, radio group): named by the field's label's id. */
export function useFieldLabelId(): string | undefined {
  return use(FieldContext)?.labelId;
}
