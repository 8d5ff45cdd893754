import { X } from 'lucide-react';
import { Dialog as Base } from 'radix-ui';
import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { Button } from './button.tsx';

export interface DialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  title: ReactNode;
  /** Said under the title and read out with it. */
  description?: ReactNode;
  /** Buttons, the one that acts last. */
  footer?: ReactNode;
  size?: 'sm' | 'md' | 'lg';
  children?: ReactNode;
}

const WIDTH = { sm: 'max-w-md', md: 'max-w-xl', lg: 'max-w-4xl' };

/** A task that must be finished or left before going on. Escape and the cross leave it. */
export function Dialog({ isOpen, onOpenChange, title, description, footer, size = 'md', children }: DialogProps) {
  return (
    <Base.Root open={isOpen} onOpenChange={onOpenChange}>
      <Base.Portal>
        <Base.Overlay className="fixed inset-0 z-[1100] bg-[rgb(20_28_25/0.45)]" />
        <Base.Content
          {...(description ? {} : { 'aria-describedby': undefined })}
          className={classNames(
            'appear fixed inset-x-0 top-[8vh] z-[1110] mx-auto flex max-h-[84vh] w-[calc(100vw-2rem)] flex-col rounded-xl border border-line bg-card shadow-lift',
            WIDTH[size],
          )}
        >
          <header className="flex items-start gap-4 px-5 pt-4 pr-14 pb-3">
            <div className="min-w-0 grow">
              <Base.Title className="text-xl font-semibold tracking-tight">{title}</Base.Title>
              {description && (
                <Base.Description className="mt-1 text-base text-ink-soft">{description}</Base.Description>
              )}
            </div>
          </header>
          {children && <div className="min-h-0 grow overflow-y-auto px-5 pt-1 pb-4">{children}</div>}
          {footer && (
            <footer className="flex flex-wrap justify-end gap-2 border-t border-line px-5 py-3.5">{footer}</footer>
          )}
          {/* Last in the order, so that the first field and not the cross has the focus when the dialog opens. */}
          <Base.Close asChild>
            <Button kind="ghost" size="sm" aria-label="Close" className="absolute top-3.5 right-3.5 w-7 px-0!">
              <X aria-hidden />
            </Button>
          </Base.Close>
        </Base.Content>
      </Base.Portal>
    </Base.Root>
  );
}
