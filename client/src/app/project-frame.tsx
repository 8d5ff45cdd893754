import { Link, Outlet, useOutletContext, useParams } from 'react-router-dom';
import type { Account } from '../../../shared/contracts/account.ts';
import type { Project, Stage } from '../../../shared/contracts/project.ts';
import { ROLE_TEXT } from '../../../shared/constants/roles.ts';
import { AppShell } from '../components/layout/app-shell.tsx';
import { ForbiddenState, NotFoundState } from '../components/ui/access-states.tsx';
import { buttonClass } from '../components/ui/button.tsx';
import { ErrorState } from '../components/ui/error-state.tsx';
import { PendingState } from '../components/ui/pending-state.tsx';
import { useProject } from '../features/projects/get-project.ts';
import { ProblemError } from '../lib/problem-error.ts';
import { paths } from '../lib/paths.ts';
import { useSignOutAndLeave } from './shell-frame.tsx';

/** The rail with the project's stages around the project's pages. */
export function ProjectFrame() {
  const account = useOutletContext<Account>();
  const signOut = useSignOutAndLeave();
  const { projectId = '' } = useParams();
  const project = useProject(projectId);
  const roles = project.data?.roles.map((role) => ROLE_TEXT[role].name).join(', ');
  return (
    <AppShell
      project={project.data ? { ...project.data, stages: openStages(project.data) } : null}
      account={{ name: account.name, note: roles || account.email, isSiteAdmin: account.siteAdmin, onSignOut: signOut }}
      railExtra={
        project.data && (
          <Link
            to={paths.members(projectId)}
            className="block px-[18px] text-sm text-ink-soft hover:text-ink max-lg:hidden"
          >
            People and roles
          </Link>
        )
      }
    >
      {project.isPending && <PendingState label="Opening the project" className="p-10" />}
      {project.isError && (
        <div className="p-8">
          <ProjectProblem error={project.error} onRetry={() => void project.refetch()} />
        </div>
      )}
      {project.data && <Outlet context={account} />}
    </AppShell>
  );
}

/** The stages the viewer's abilities reach; the others are not shown at all. */
function openStages({ stages, abilities }: Project): Stage[] {
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

function ProjectProblem({ error, onRetry }: { error: Error; onRetry: () => void }) {
  const status = error instanceof ProblemError ? error.status : 0;
  const back = (
    <Link to={paths.projects()} className={buttonClass('strong')}>
      To your projects
    </Link>
  );
  if (status === 403) return <ForbiddenState action={back} />;
  if (status === 404) return <NotFoundState title="No such project for you" action={back} />;
  return <ErrorState error={error} onRetry={onRetry} />;
}
