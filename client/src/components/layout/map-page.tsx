import type { ReactNode } from 'react';

export interface MapPageProps {
  /** A PageHeader. */
  header: ReactNode;
  /** A BaseMap; fills everything between rail and slip. */
  map: ReactNode;
  /** The one strip of tools at the bottom edge. */
  strip?: ReactNode;
  /** What is selected: a Slip. null closes it. */
  slip?: ReactNode;
}

/** A map that takes everything right of the rail; nothing floats at its top left. */
export function MapPage({ header, map, strip, slip }: MapPageProps) {
  return (
    <>
      {header}
      <div className="flex min-h-0 grow max-sm:min-h-[70dvh]">
        <div className="relative isolate min-w-0 grow bg-deep">
          <div className="absolute inset-0">{map}</div>
          {strip && (
            <div className="pointer-events-none absolute inset-x-4 bottom-4 z-[1010] flex justify-start *:pointer-events-auto">
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
        <div className="flex items-center gap-0.5 overflow-x-auto border-b border-line px-2.5 py-1.5 text-sm whitespace-nowrap last:border-b-0">
          {tools}
        </div>
      )}
      {children}
    </section>
  );
}
