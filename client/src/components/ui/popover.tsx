import { Popover as Base } from 'radix-ui';
import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface PopoverProps {
  /** One button. */
  trigger: ReactNode;
  /** Names the popover for screen readers. */
  label: string;
  isOpen?: boolean;
  onOpenChange?: (isOpen: boolean) => void;
  side?: 'top' | 'right' | 'bottom' | 'left';
  align?: 'start' | 'center' | 'end';
  className?: string;
  children: ReactNode;
}

/** More about one thing, beside it, without leaving the page. */
export function Popover({
  trigger,
  label,
  isOpen,
  onOpenChange,
  side = 'bottom',
  align = 'start',
  className,
  children,
}: PopoverProps) {
  return (
    <Base.Root open={isOpen} onOpenChange={onOpenChange}>
      <Base.Trigger asChild>{trigger}</Base.Trigger>
      <Base.Portal>
        <Base.Content
          aria-label={label}
          side={side}
          align={align}
          sideOffset={6}
          collisionPadding={12}
          className={classNames(
            'appear z-[1200] w-80 max-w-[calc(100vw-1.5rem)] rounded-lg border border-line bg-card p-4 text-sm shadow-lift',
            className,
          )}
        >
          {children}
        </Base.Content>
      </Base.Portal>
    </Base.Root>
  );
}
