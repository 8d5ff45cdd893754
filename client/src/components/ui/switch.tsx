import { Switch as Base } from 'radix-ui';
import { type ReactNode, useId } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface SwitchProps {
  label: ReactNode;
  hint?: ReactNode;
  isOn: boolean;
  onChange: (isOn: boolean) => void;
  isDisabled?: boolean;
  className?: string;
}

/** Something that takes effect at once (for a choice that waits for a Save, use Checkbox). */
export function Switch({ label, hint, isOn, onChange, isDisabled, className }: SwitchProps) {
  const id = useId();
  return (
    <div className={classNames('flex items-start justify-between gap-4', className)}>
      <span>
        <label htmlFor={id} className="cursor-pointer text-base">
          {label}
        </label>
        {hint && (
          <span id={`${id}-hint`} className="block text-xs text-ink-soft">
            {hint}
          </span>
        )}
      </span>
      <Base.Root
        id={id}
        checked={isOn}
        onCheckedChange={onChange}
        disabled={isDisabled ?? false}
        aria-describedby={hint ? `${id}-hint` : undefined}
        className="relative mt-px h-5 w-9 shrink-0 rounded-full border-[1.5px] border-edge bg-card data-[state=checked]:border-ink data-[state=checked]:bg-ink disabled:opacity-50"
      >
        <Base.Thumb className="block size-3 translate-x-[3px] rounded-full bg-edge transition-transform data-[state=checked]:translate-x-[18px] data-[state=checked]:bg-groundsel" />
      </Base.Root>
    </div>
  );
}
