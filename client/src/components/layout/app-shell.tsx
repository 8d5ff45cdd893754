import { type ReactNode, createContext, use } from 'react';
import { Link } from 'react-router-dom';
import type { Stage } from '../../../../shared/contracts/project.ts';
import { paths } from '../../lib/paths.ts';
import { AccountMenu, type AccountMenuProps } from './account-menu.tsx';
import { BrandMark } from './brand-mark.tsx';
import { StageStem } from './stage-stem.tsx';

export interface AppShellProps {
  /** The open project; without it the rail carries only the brand, the project list and the account. */
  project?: { id: string; name: string; stages: readonly Stage[] } | null;
  account: AccountMenuProps;
  /** More in the rail below the stages: "Members". */
  railExtra?: ReactNode;
  children: ReactNode;
}

const ShellProjectName = createContext<string | null>(null);

/** The open project's name, for titles and crumbs; null outside a project. */
export function useShellProjectName(): string | null {
  return use(ShellProjectName);
}

/** The frame of every signed-in page: rail at the left (bar at the top on a phone), the page beside it. */
export function AppShell({ project = null, account, railExtra, children }: AppShellProps) {
  return (
    <ShellProjectName value={project?.name ?? null}>
      <a
        href="#page"
        className="sr-only z-[1300] rounded-lg bg-ink px-4 py-2 text-paper focus:not-sr-only focus:fixed focus:top-2 focus:left-2"
      >
        Skip to the page
      </a>
      <div className="grid h-dvh grid-cols-[184px_minmax(0,1fr)] max-lg:grid-cols-[60px_minmax(0,1fr)] max-sm:h-auto max-sm:min-h-dvh max-sm:grid-cols-1 max-sm:grid-rows-[auto_1fr]">
        <header
          data-print="hide"
          className="flex min-h-0 flex-col overflow-y-auto border-r border-line bg-paper pt-4 pb-2.5 max-sm:sticky max-sm:top-0 max-sm:z-[1050] max-sm:flex-row max-sm:flex-wrap max-sm:items-center max-sm:border-r-0 max-sm:border-b max-sm:pt-1.5 max-sm:pb-1"
        >
          <Link
            to={paths.projects()}
            aria-label="Groundsel, all projects"
            className="flex items-center gap-2 px-[17px] text-[17px] font-semibold tracking-tight text-ink no-underline max-lg:justify-center max-lg:px-0 max-sm:px-3"
          >
            <BrandMark className="size-6 shrink-0" />
            <span className="max-lg:hidden">Groundsel</span>
          </Link>
          {project && (
            <p className="px-[18px] pt-1 pb-4 text-xs leading-snug text-ink-soft max-lg:hidden max-sm:block max-sm:min-w-0 max-sm:grow max-sm:truncate max-sm:p-0 max-sm:text-sm max-sm:font-medium">
              {project.name}
            </p>
          )}
          {project ? (
            <div className="max-lg:pt-4 max-sm:order-last max-sm:w-full max-sm:pt-0">
              <StageStem projectId={project.id} stages={project.stages} />
            </div>
          ) : (
            <p className="px-[18px] pt-3 max-lg:hidden">
              <Link to={paths.projects()} className="link">
                All projects
              </Link>
            </p>
          )}
          {railExtra && <div className="mt-3 max-sm:hidden">{railExtra}</div>}
          <div className="mt-auto border-t border-line px-2 pt-2 max-lg:flex max-lg:justify-center max-lg:px-0 max-sm:mt-0 max-sm:ml-auto max-sm:border-0 max-sm:p-0 max-sm:pr-2">
            <AccountMenu {...account} />
          </div>
        </header>
        <main id="page" tabIndex={-1} className="flex min-h-0 min-w-0 flex-col">
          {children}
        </main>
      </div>
    </ShellProjectName>
  );
}
