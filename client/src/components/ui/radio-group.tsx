import { RadioGroup as Base } from 'radix-ui';
import { type ReactNode, useId } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { useFieldLabelId, useFieldWiring } from './field.tsx';

export interface RadioOption<V extends string> {
  value: V;
  label: ReactNode;
  hint?: ReactNode;
  isDisabled?: boolean;
}

export interface RadioGroupProps<V extends string> {
  value: V | null;
  onChange: (value: V) => void;
  options: readonly RadioOption<V>[];
  /** Needed outside a Field. */
  'aria-label'?: string;
  /** Draws each option as a card, for choices that want explaining. */
  isCards?: boolean;
  className?: string;
}

export function RadioGroup<V extends string>({
  value,
  onChange,
  options,
  isCards = false,
  className,
  ...aria
}: RadioGroupProps<V>) {
  const groupId = useId();
  const labelId = useFieldLabelId();
  const { 'aria-describedby': describedBy, id } = useFieldWiring();
  return (
    <Base.Root
      id={id}
      value={value}
      onValueChange={(next) => onChange(next as V)}
      aria-labelledby={aria['aria-label'] ? undefined : labelId}
      aria-describedby={describedBy}
      {...aria}
      className={classNames('flex flex-col gap-2', className)}
    >
      {options.map((option) => {
        const optionId = `${groupId}-${option.value}`;
        return (
          <div
            key={option.value}
            className={classNames(
              'flex items-start gap-2.5',
              isCards &&
                'rounded-lg border border-line bg-card p-3 has-data-[state=checked]:border-ink has-data-[state=checked]:bg-groundsel-wash',
            )}
          >
            <Base.Item
              id={optionId}
              value={option.value}
              disabled={option.isDisabled ?? false}
              aria-describedby={option.hint ? `${optionId}-hint` : undefined}
              className="mt-px flex size-[18px] shrink-0 items-center justify-center rounded-full! border-[1.5px] border-edge bg-card data-[state=checked]:border-ink disabled:opacity-50"
            >
              <Base.Indicator className="size-2.5 rounded-full bg-ink" />
            </Base.Item>
            <span>
              <label htmlFor={optionId} className={classNames('cursor-pointer', isCards && 'font-medium')}>
                {option.label}
              </label>
              {option.hint && (
                <span id={`${optionId}-hint`} className="block text-xs text-ink-soft">
                  {option.hint}
                </span>
              )}
            </span>
          </div>
        );
      })}
    </Base.Root>
  );
}
