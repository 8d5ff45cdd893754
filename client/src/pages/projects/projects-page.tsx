import { useState } from 'react';
import { Plus } from 'lucide-react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Skeleton } from '../../components/ui/pending-state.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { CreateProjectDialog } from '../../features/projects/create-project-dialog.tsx';
import { FirstProject } from '../../features/projects/first-project.tsx';
import { useProjects } from '../../features/projects/list-projects.ts';
import { ProjectCard } from '../../features/projects/project-card.tsx';
import { paths } from '../../lib/paths.ts';

/** From this many on, a filter helps more than it stands in the way. */
const FILTER_FROM = 7;

/** Every project the viewer is a member of, and the way to a new one. `?new` opens the form. */
export function ProjectsPage() {
  const projects = useProjects();
  const navigate = useNavigate();
  const [search, setSearch] = useSearchParams();
  const [filter, setFilter] = useState('');
  const openForm = (isOpen: boolean) => setSearch(isOpen ? { new: '' } : {}, { replace: true });
  const wanted = filter.trim().toLowerCase();
  const shown = projects.data?.filter(({ name, client }) => `${name} ${client}`.toLowerCase().includes(wanted)) ?? [];
  const newButton = (
    <Button kind="primary" icon={<Plus />} onClick={() => openForm(true)}>
      New project
    </Button>
  );
  return (
    <ReadingPage header={<PageHeader title="Projects" action={projects.data?.length === 0 ? undefined : newButton} />}>
      {projects.isPending && <PendingCards />}
      {projects.isError && <ErrorState error={projects.error} onRetry={() => void projects.refetch()} />}
      {projects.data?.length === 0 && <FirstProject action={newButton} />}
      {projects.data && projects.data.length >= FILTER_FROM && (
        <TextInput
          type="search"
          aria-label="Filter by name or client"
          placeholder="Filter by name or client"
          value={filter}
          onChange={(event) => setFilter(event.target.value)}
          className="mb-5 max-w-72"
        />
      )}
      {shown.length > 0 && (
        <ul className="grid gap-6 lg:grid-cols-2">
          {shown.map((project) => (
            <li key={project.id} className="*:h-full">
              <ProjectCard project={project} />
            </li>
          ))}
        </ul>
      )}
      {projects.data && projects.data.length > 0 && shown.length === 0 && (
        <p role="status" className="text-ink-soft">
          No project has “{filter}” in its name or client.
        </p>
      )}
      <CreateProjectDialog
        isOpen={search.has('new')}
        onOpenChange={openForm}
        onCreated={(projectId) => void navigate(paths.overview(projectId))}
      />
    </ReadingPage>
  );
}

function PendingCards() {
  return (
    <div role="status" className="grid gap-6 lg:grid-cols-2">
      <span className="sr-only">Loading projects…</span>
      {[0, 1, 2].map((card) => (
        <Skeleton key={card} className="h-52 w-full rounded-xl" />
      ))}
    </div>
  );
}
