import type { ReactNode } from 'react';
import { useTitle } from '../../lib/use-title.ts';
import { BrandMark } from './brand-mark.tsx';

export interface GatePageProps {
  title: string;
  /** Said under the title. */
  lead?: ReactNode;
  /** Fills the left half on wide screens. */
  picture: ReactNode;
  children: ReactNode;
}

/** A page for people who are not signed in: a picture, and one thing to do beside it. */
export function GatePage({ title, lead, picture, children }: GatePageProps) {
  useTitle([title]);
  return (
    <div className="grid min-h-dvh grid-cols-[minmax(0,1fr)_minmax(26rem,34rem)] bg-paper max-md:grid-cols-1">
      <div className="relative overflow-hidden border-r border-line bg-card max-md:hidden">{picture}</div>
      <main id="page" className="flex flex-col justify-center px-16 py-10 max-sm:px-6">
        <div className="w-full max-w-sm">
          <p className="flex items-center gap-2.5 text-2xl font-semibold tracking-tight">
            <BrandMark className="size-8" />
            Groundsel
          </p>
          <h1 className="mt-10 text-3xl font-medium tracking-[-0.4px]">{title}</h1>
          {lead && <p className="mt-1 text-ink-soft">{lead}</p>}
          <div className="mt-6">{children}</div>
        </div>
      </main>
    </div>
  );
}
