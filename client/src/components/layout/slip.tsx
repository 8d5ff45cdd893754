import { X } from 'lucide-react';
import type { ReactNode } from 'react';
import { IconButton } from '../ui/icon-button.tsx';

export interface SlipProps {
  /** What is selected: "Saltmarsh · sample 214". */
  title: ReactNode;
  /** A swatch before the title. */
  mark?: ReactNode;
  /** Said under it: who, when, state, version. */
  note?: ReactNode;
  onClose?: () => void;
  /** Buttons that stay at the foot. */
  footer?: ReactNode;
  children: ReactNode;
}

/** What is selected, on the right edge of a map, its chart on top. */
export function Slip({ title, mark, note, onClose, footer, children }: SlipProps) {
  return (
    <aside
      aria-label={typeof title === 'string' ? title : 'Selected'}
      className="flex w-90 shrink-0 flex-col border-l border-line bg-card text-sm max-lg:w-80 max-sm:absolute max-sm:inset-x-0 max-sm:bottom-0 max-sm:z-[1020] max-sm:max-h-[60dvh] max-sm:w-full"
    >
      <header className="flex items-start gap-2 px-[18px] pt-4">
        <div className="min-w-0 grow">
          <h2 className="flex items-center gap-2 text-lg font-semibold">
            {mark}
            <span className="min-w-0 truncate">{title}</span>
          </h2>
          {note && <p className="mt-0.5 text-xs text-ink-soft">{note}</p>}
        </div>
        {onClose && <IconButton label="Close" shortcut="Esc" size="sm" icon={<X />} onClick={onClose} />}
      </header>
      <div className="relative min-h-0 grow space-y-3 overflow-y-auto px-[18px] py-3">{children}</div>
      {footer && <footer className="flex gap-2 border-t border-line px-[18px] py-3 *:grow">{footer}</footer>}
    </aside>
  );
}

/** Facts of what is selected: name at the left, figure at the right. */
export function Facts({ facts }: { facts: readonly { name: ReactNode; value: ReactNode }[] }) {
  return (
    <dl className="grid grid-cols-[1fr_auto] gap-x-2.5 gap-y-[3px] border-t border-line pt-2.5">
      {facts.map((fact, index) => (
        <div key={index} className="contents">
          <dt className="text-ink-soft">{fact.name}</dt>
          <dd className="text-right font-medium">{fact.value}</dd>
        </div>
      ))}
    </dl>
  );
}
