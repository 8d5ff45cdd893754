import { Tabs as Base } from 'radix-ui';
import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface TabItem<V extends string> {
  value: V;
  label: ReactNode;
  count?: number;
  content: ReactNode;
}

export interface TabsProps<V extends string> {
  value: V;
  onChange: (value: V) => void;
  items: readonly TabItem<V>[];
  /** What the tabs divide: "Scene". */
  label: string;
  className?: string;
}

/** Leaves of one thing. The chosen leaf alone is mounted. */
export function Tabs<V extends string>({ value, onChange, items, label, className }: TabsProps<V>) {
  return (
    <Base.Root
      value={value}
      onValueChange={(next) => onChange(next as V)}
      className={classNames('flex min-h-0 flex-col', className)}
    >
      <Base.List aria-label={label} className="flex gap-5 border-b border-line">
        {items.map((item) => (
          <Base.Trigger
            key={item.value}
            value={item.value}
            className="-mb-px border-b-[3px] border-transparent px-0.5 pt-1.5 pb-2 text-base font-medium text-ink-soft hover:text-ink data-[state=active]:border-groundsel-deep data-[state=active]:text-ink"
          >
            {item.label}
            {item.count !== undefined && <span className="ml-1.5 text-xs font-normal text-ink-soft">{item.count}</span>}
          </Base.Trigger>
        ))}
      </Base.List>
      {items.map((item) => (
        <Base.Content key={item.value} value={item.value} className="min-h-0 grow pt-4">
          {item.content}
        </Base.Content>
      ))}
    </Base.Root>
  );
}
