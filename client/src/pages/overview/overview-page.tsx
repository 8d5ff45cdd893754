import { MoreHorizontal, Pencil, Trash2, UsersRound } from 'lucide-react';
import { useState } from 'react';
import { Navigate, useNavigate } from 'react-router-dom';
import type { Overview } from '../../../../shared/contracts/project.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Menu, MenuItem, MenuLine } from '../../components/ui/menu.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { DeleteProjectDialog } from '../../features/projects/delete-project-dialog.tsx';
import { useOverview } from '../../features/projects/get-overview.ts';
import { ProjectDetailsDialog } from '../../features/projects/project-details-dialog.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { OverviewBody } from './overview-body.tsx';

/** Where the commission stands. */
export function OverviewPage() {
  const project = useProject();
  // A client's page is the handover; the overview counts drafts.
  if (!project.abilities.readScenes) return <Navigate to={paths.handover(project.id)} replace />;
  return <TeamOverview />;
}

function TeamOverview() {
  const project = useProject();
  const overview = useOverview(project.id);
  const [isEditing, setIsEditing] = useState(false);
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Overview"
          crumb={<span className="max-sm:hidden">{project.client && `For ${project.client}`}</span>}
          action={
            <>
              {project.abilities.manageProject && (
                <Button icon={<Pencil />} onClick={() => setIsEditing(true)}>
                  Edit details
                </Button>
              )}
              <ProjectMenu figures={overview.data?.figures} />
            </>
          }
        />
      }
    >
      {overview.isPending && (
        <>
          <PendingState label="Loading where the project stands" shape="text" rows={3} />
          <PendingState label="Loading figures" shape="table" rows={8} className="mt-10" />
        </>
      )}
      {overview.isError && !overview.data && (
        <ErrorState error={overview.error} onRetry={() => void overview.refetch()} />
      )}
      {overview.data && (
        <OverviewBody project={project} overview={overview.data} onEditDetails={() => setIsEditing(true)} />
      )}
      <ProjectDetailsDialog project={project} isOpen={isEditing} onOpenChange={setIsEditing} />
    </ReadingPage>
  );
}

function ProjectMenu({ figures }: { figures: Overview['figures'] | undefined }) {
  const project = useProject();
  const navigate = useNavigate();
  const [isDeleting, setIsDeleting] = useState(false);
  return (
    <>
      <Menu trigger={<IconButton label="More about this project" kind="secondary" icon={<MoreHorizontal />} />}>
        <MenuItem icon={<UsersRound />} to={paths.members(project.id)}>
          People and roles
        </MenuItem>
        {project.abilities.manageProject && figures && (
          <>
            <MenuLine />
            <MenuItem icon={<Trash2 />} isDanger onSelect={() => setIsDeleting(true)}>
              Delete project…
            </MenuItem>
          </>
        )}
      </Menu>
      {figures && (
        <DeleteProjectDialog
          project={project}
          figures={figures}
          isOpen={isDeleting}
          onOpenChange={setIsDeleting}
          onDeleted={() => void navigate(paths.projects(), { replace: true })}
        />
      )}
    </>
  );
}
