import { useQuery } from '@tanstack/react-query';
import { Outlet, useMatches, useOutletContext, useParams } from 'react-router-dom';
import type { Account } from '../../../shared/contracts/account.ts';
import type { Project, Stage } from '../../../shared/contracts/project.ts';
import { ROLE_TEXT } from '../../../shared/constants/roles.ts';
import { AppShell } from '../components/layout/app-shell.tsx';
import { PendingState } from '../components/ui/pending-state.tsx';
import { ProblemError } from '../lib/problem-error.ts';
import { ProjectContext } from '../lib/project/project-context.ts';
import { projectQuery } from '../lib/project/project-query.ts';
import { FULL_SCREEN } from './full-screen.ts';
import { ProjectProblem } from './project-problem.tsx';
import { ProjectRailExtra } from './project-rail-extra.tsx';
import { useSignOutAndLeave } from './shell-frame.tsx';
import { useProjectEvents } from './use-project-events.ts';

/** The rail with the project's stages around the project's pages, kept fresh by the project's events. */
export function ProjectFrame() {
  const account = useOutletContext<Account>();
  const signOut = useSignOutAndLeave();
  const { projectId = '' } = useParams();
  const query = useQuery(projectQuery(projectId));
  // Someone taken out of the project keeps the last answer in the cache: the refusal that follows comes first.
  const isRefused = query.error instanceof ProblemError && query.error.status >= 400 && query.error.status < 500;
  const project = isRefused ? undefined : query.data;
  const isTeam = project !== undefined && isOfTeam(project);
  const isLive = useProjectEvents(isTeam ? projectId : null);
  const isFullScreen = useMatches().some(({ handle }) => handle === FULL_SCREEN);
  if (project && isFullScreen) {
    return (
      <ProjectContext value={project}>
        <main id="page" tabIndex={-1}>
          <Outlet context={account} />
        </main>
      </ProjectContext>
    );
  }
  const roles = project?.roles.map((role) => ROLE_TEXT[role].name).join(', ');
  return (
    <AppShell
      project={project ? { ...project, stages: openStages(project) } : null}
      account={{ name: account.name, note: roles || account.email, isSiteAdmin: account.siteAdmin, onSignOut: signOut }}
      railExtra={isTeam && <ProjectRailExtra projectId={projectId} isLive={isLive} />}
    >
      {query.isPending && <PendingState label="Opening the project" className="p-10" />}
      {project === undefined && query.error && (
        <div className="p-8">
          <ProjectProblem error={query.error} onRetry={() => void query.refetch()} />
        </div>
      )}
      {project && (
        <ProjectContext value={project}>
          <Outlet context={account} />
        </ProjectContext>
      )}
    </AppShell>
  );
}

/** Clients are members who see only what was handed over; everyone else sees the scenes. */
function isOfTeam(project: Project): boolean {
  return project.abilities.readScenes;
}

/** The stages the viewer's abilities reach; the others are not shown at all. A client's rail has the handover alone. */
function openStages(project: Project): Stage[] {
  const { stages, abilities } = project;
  if (!isOfTeam(project)) return [{ id: 'handover', state: 'empty', count: null }];
  const reach: Record<Stage['id'], boolean> = {
    overview: true,
    scenes: abilities.readScenes,
    classes: abilities.readClasses,
    samples: abilities.readSamples,
    runs: abilities.readRuns,
    accuracy: abilities.readAccuracy,
    handover: true,
  };
  return stages.filter((stage) => reach[stage.id]);
}
