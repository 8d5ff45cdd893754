import { Check, Minus } from 'lucide-react';
import { Checkbox as Base } from 'radix-ui';
import { type ReactNode, useId } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface CheckboxProps {
  label: ReactNode;
  hint?: ReactNode;
  /** 'mixed' when some of what it stands for is on. */
  isChecked: boolean | 'mixed';
  onChange: (isChecked: boolean) => void;
  isDisabled?: boolean;
  isLabelHidden?: boolean;
  className?: string;
}

export function Checkbox({ label, hint, isChecked, onChange, isDisabled, isLabelHidden, className }: CheckboxProps) {
  const id = useId();
  return (
    <div className={classNames('flex items-start gap-2.5', className)}>
      <Base.Root
        id={id}
        checked={isChecked === 'mixed' ? 'indeterminate' : isChecked}
        onCheckedChange={(next) => onChange(next === true)}
        disabled={isDisabled ?? false}
        aria-describedby={hint ? `${id}-hint` : undefined}
        className="mt-px flex size-[18px] shrink-0 items-center justify-center rounded border-[1.5px] border-edge bg-card text-paper data-[state=checked]:border-ink data-[state=checked]:bg-ink data-[state=indeterminate]:border-ink data-[state=indeterminate]:bg-ink disabled:opacity-50"
      >
        <Base.Indicator>
          {isChecked === 'mixed' ? <Minus className="size-3.5" /> : <Check className="size-3.5" strokeWidth={3} />}
        </Base.Indicator>
      </Base.Root>
      <span className={isLabelHidden ? 'sr-only' : undefined}>
        <label htmlFor={id} className="cursor-pointer text-base">
          {label}
        </label>
        {hint && (
          <span id={`${id}-hint`} className="block text-xs text-ink-soft">
            {hint}
          </span>
        )}
      </span>
    </div>
  );
}
