import { Check, ChevronDown } from 'lucide-react';
import { Select as Base } from 'radix-ui';
import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { useFieldWiring } from './field.tsx';
import { INPUT_CLASS } from './text-input.tsx';

export interface SelectOption<V extends string> {
  /** Never the empty string: use null as the Select's value for "nothing chosen". */
  value: V;
  label: string;
  /** Drawn before the label: a swatch, an icon. */
  mark?: ReactNode;
  isDisabled?: boolean;
}

export interface SelectProps<V extends string> {
  value: V | null;
  onChange: (value: V) => void;
  options: readonly SelectOption<V>[];
  placeholder?: string;
  isDisabled?: boolean;
  /** Needed outside a Field. */
  'aria-label'?: string;
  size?: 'md' | 'sm';
  className?: string;
}

/** One of a list. Inside a Field it takes the field's label. */
export function Select<V extends string>({
  value,
  onChange,
  options,
  placeholder = 'Choose…',
  isDisabled,
  size = 'md',
  className,
  ...aria
}: SelectProps<V>) {
  const wiring = useFieldWiring();
  return (
    <Base.Root value={value ?? ''} onValueChange={(next) => onChange(next as V)} disabled={isDisabled ?? false}>
      <Base.Trigger
        {...wiring}
        {...aria}
        className={classNames(
          INPUT_CLASS,
          'flex items-center justify-between gap-2 text-left data-placeholder:text-ink-soft',
          size === 'sm' && 'min-h-7 rounded-md px-2 py-0.5 text-sm',
          className,
        )}
      >
        <span className="flex min-w-0 items-center gap-2 truncate">
          <Base.Value placeholder={placeholder} />
        </span>
        <Base.Icon>
          <ChevronDown aria-hidden className="size-4 text-ink-soft" />
        </Base.Icon>
      </Base.Trigger>
      <Base.Portal>
        <Base.Content
          position="popper"
          sideOffset={4}
          collisionPadding={8}
          className="appear z-[1200] max-h-(--radix-select-content-available-height) min-w-(--radix-select-trigger-width) overflow-hidden rounded-lg border border-line bg-card shadow-lift"
        >
          <Base.Viewport className="p-1">
            {options.map((option) => (
              <Base.Item
                key={option.value}
                value={option.value}
                disabled={option.isDisabled ?? false}
                className="flex min-h-8 cursor-pointer items-center gap-2 rounded-md py-1 pr-8 pl-2.5 text-base outline-none data-disabled:cursor-not-allowed data-disabled:opacity-50 data-highlighted:bg-groundsel-wash data-highlighted:outline-2 data-highlighted:-outline-offset-2 data-highlighted:outline-ink relative"
              >
                <Base.ItemText>
                  <span className="inline-flex items-center gap-2">
                    {option.mark}
                    {option.label}
                  </span>
                </Base.ItemText>
                <Base.ItemIndicator className="absolute right-2.5">
                  <Check aria-hidden className="size-4" />
                </Base.ItemIndicator>
              </Base.Item>
            ))}
          </Base.Viewport>
        </Base.Content>
      </Base.Portal>
    </Base.Root>
  );
}
