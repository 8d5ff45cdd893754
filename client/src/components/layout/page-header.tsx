import type { ReactNode } from 'react';
import { useTitle } from '../../lib/use-title.ts';
import { useShellProjectName } from './app-shell.tsx';

export interface PageHeaderProps {
  /** The page; also the tab's title. */
  title: string;
  /** Where in it: "Block C4". */
  crumb?: ReactNode;
  /** Controls of the page: composite and date switches. */
  children?: ReactNode;
  /** The one primary action. */
  action?: ReactNode;
  /** Share done (0–1) of long work the page watches; shown in the tab's title. */
  progress?: number | null;
}

/** The page's top line: what it is, where in it, its controls, and the one primary action. */
export function PageHeader({ title, crumb, children, action, progress = null }: PageHeaderProps) {
  const projectName = useShellProjectName();
  useTitle([title, projectName], progress);
  return (
    <header
      data-print="hide"
      className="flex min-h-[52px] shrink-0 flex-wrap items-center gap-x-3.5 gap-y-2 border-b border-line bg-paper px-[18px] py-2"
    >
      <h1 tabIndex={-1} className="text-xl font-semibold tracking-tight whitespace-nowrap">
        {title}
      </h1>
      {crumb && <span className="text-sm whitespace-nowrap text-ink-soft">{crumb}</span>}
      {projectName && (
        <span className="hidden max-w-56 truncate text-sm text-ink-soft max-lg:inline max-sm:hidden">
          {projectName}
        </span>
      )}
      {children}
      {action && <div className="ml-auto flex items-center gap-2">{action}</div>}
    </header>
  );
}
