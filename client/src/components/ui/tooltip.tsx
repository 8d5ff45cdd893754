import { Tooltip as Base } from 'radix-ui';
import type { ReactNode } from 'react';
import { Kbd } from './kbd.tsx';

export interface TooltipProps {
  text: ReactNode;
  shortcut?: string | undefined;
  side?: 'top' | 'right' | 'bottom' | 'left';
  /** One focusable element. */
  children: ReactNode;
}

/** A short name or hint at a control. Never the only place where something needed is said. */
export function Tooltip({ text, shortcut, side = 'top', children }: TooltipProps) {
  return (
    <Base.Provider delayDuration={350} skipDelayDuration={200}>
      <Base.Root>
        <Base.Trigger asChild>{children}</Base.Trigger>
        <Base.Portal>
          <Base.Content
            side={side}
            sideOffset={6}
            collisionPadding={8}
            className="appear z-[1200] max-w-72 rounded-md bg-ink px-2.5 py-1.5 text-xs text-paper shadow-lift"
          >
            {text}
            {shortcut && <Kbd className="ml-2 border-paper/40! text-paper!">{shortcut}</Kbd>}
          </Base.Content>
        </Base.Portal>
      </Base.Root>
    </Base.Provider>
  );
}
