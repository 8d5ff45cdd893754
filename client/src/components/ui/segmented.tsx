import { ToggleGroup } from 'radix-ui';
import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface SegmentedOption<V extends string> {
  value: V;
  label: ReactNode;
  isDisabled?: boolean;
}

export interface SegmentedProps<V extends string> {
  value: V;
  onChange: (value: V) => void;
  options: readonly SegmentedOption<V>[];
  /** What is being chosen: "Composite". */
  label: string;
  className?: string;
}

/** A few choices side by side, one of them always on. */
export function Segmented<V extends string>({ value, onChange, options, label, className }: SegmentedProps<V>) {
  return (
    <ToggleGroup.Root
      type="single"
      value={value}
      onValueChange={(next) => next && onChange(next as V)}
      aria-label={label}
      className={classNames('inline-flex rounded-lg border border-edge bg-card text-sm', className)}
    >
      {options.map((option) => (
        <ToggleGroup.Item
          key={option.value}
          value={option.value}
          disabled={option.isDisabled ?? false}
          className="min-h-7 border-r border-line px-2.5 py-1 whitespace-nowrap first:rounded-l-[7px] last:rounded-r-[7px] last:border-r-0 enabled:data-[state=off]:hover:bg-sunken data-[state=on]:bg-ink data-[state=on]:text-paper disabled:cursor-not-allowed disabled:text-ink-soft"
        >
          {option.label}
        </ToggleGroup.Item>
      ))}
    </ToggleGroup.Root>
  );
}
