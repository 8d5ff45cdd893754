import { type CSSProperties, type ReactNode, useEffect, useRef, useState } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface MapPageProps {
  /** A PageHeader. */
  header: ReactNode;
  /** A BaseMap; fills everything between rail and slip. */
  map: ReactNode;
  /** The one strip of tools at the bottom edge. */
  strip?: ReactNode;
  /** A list beside the map, between the rail and it. */
  list?: ReactNode;
  /** What is selected: a Slip. null closes it. */
  slip?: ReactNode;
}

/** A map that takes everything right of the rail; nothing floats at its top left. */
export function MapPage({ header, map, strip, list, slip }: MapPageProps) {
  const stripRef = useRef<HTMLDivElement>(null);
  const [stripHeight, setStripHeight] = useState(0);
  const hasStrip = Boolean(strip);
  useEffect(() => {
    const element = stripRef.current;
    if (!element || typeof ResizeObserver === 'undefined') return undefined;
    const observer = new ResizeObserver(() => setStripHeight(element.offsetHeight));
    observer.observe(element);
    return () => observer.disconnect();
  }, [hasStrip]);
  useEffect(() => {
    // Notes about finished acts appear at the page's foot, outside this component.
    const { style } = document.documentElement;
    style.setProperty('--page-foot', hasStrip ? `${stripHeight + 14}px` : '0px');
    return () => void style.removeProperty('--page-foot');
  }, [hasStrip, stripHeight]);
  // The map's own controls stay clear of the strip, however high it is.
  const foot = { '--map-foot': hasStrip ? `${stripHeight + 14}px` : '0px' } as CSSProperties;
  return (
    <>
      {header}
      <div className="flex min-h-0 grow max-sm:min-h-[70dvh]">
        {list}
        <div className="relative isolate min-w-0 grow bg-deep">
          <div className="absolute inset-0" style={foot}>
            {map}
          </div>
          {strip && (
            <div
              ref={stripRef}
              className="pointer-events-none absolute inset-x-4 bottom-4 z-[1010] flex justify-start *:pointer-events-auto"
            >
              {strip}
            </div>
          )}
        </div>
        {slip}
      </div>
    </>
  );
}

export interface StripProps {
  label: string;
  /** The row of tools above. */
  tools?: ReactNode;
  /** The class keys below. */
  children?: ReactNode;
}

/** The floating strip at the map's bottom edge. */
export function Strip({ label, tools, children }: StripProps) {
  return (
    <section aria-label={label} className="w-full overflow-hidden rounded-xl bg-card shadow-lift">
      {tools && (
        <div className="flex items-center gap-0.5 overflow-x-auto border-b border-line px-2.5 py-1.5 max-lg:flex-wrap text-sm whitespace-nowrap last:border-b-0">
          {tools}
        </div>
      )}
      {children}
    </section>
  );
}

export interface ToolButtonProps {
  label: string;
  /** Key as printed: "P", "⌃Z". */
  shortcut?: string;
  /** For drawing modes: sets aria-pressed. Leave out for acts such as Undo. */
  isOn?: boolean;
  isDisabled?: boolean;
  onPress: () => void;
}

/** A tool in the strip's upper row with its key beside it. */
export function ToolButton({ label, shortcut, isOn, isDisabled = false, onPress }: ToolButtonProps) {
  return (
    <button
      type="button"
      aria-pressed={isOn}
      disabled={isDisabled}
      onClick={onPress}
      className={classNames(
        'rounded-[7px] px-2 py-1 disabled:cursor-not-allowed disabled:opacity-50',
        isOn ? 'bg-ink text-paper' : 'enabled:hover:bg-sunken',
      )}
    >
      {label}
      {shortcut && (
        <kbd className={classNames('ml-1.5 font-sans text-2xs font-medium', isOn ? 'text-paper' : 'text-ink-soft')}>
          {shortcut}
        </kbd>
      )}
    </button>
  );
}

/** Pushes what follows to the right end of the strip's tools. */
export function ToolGap() {
  return <span aria-hidden className="grow" />;
}
