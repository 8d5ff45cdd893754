import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { ProjectSummary } from '../../../../shared/contracts/project.ts';
import { formatDate } from '../../lib/format-date.ts';
import { paths } from '../../lib/paths.ts';
import { projectQuery } from '../../lib/project/project-query.ts';
import { roleNames } from '../../lib/role-names.ts';
import { StageBuds } from './stage-buds.tsx';

/** A project in the list, with how far it has grown; pressing anywhere opens it. */
export function ProjectCard({ project }: { project: ProjectSummary }) {
  // The same answer opens the project at once when the card is pressed.
  const whole = useQuery(projectQuery(project.id));
  return (
    <article className="relative flex min-h-52 flex-col rounded-xl border border-line bg-card px-6 pt-5 pb-4 hover:border-edge">
      <h2 className="text-xl font-semibold tracking-tight">
        <Link
          to={paths.project(project.id)}
          className="text-ink no-underline after:absolute after:inset-0 after:rounded-xl after:content-['']"
        >
          {project.name}
        </Link>
      </h2>
      <p className="text-sm text-ink-soft">{project.client ? `For ${project.client}` : 'No client named yet'}</p>
      {project.description && <p className="mt-2 line-clamp-2 max-w-prose text-sm">{project.description}</p>}
      <div className="mt-auto pt-5">
        <StageBuds stages={whole.data?.stages ?? []} isPending={whole.isPending} />
      </div>
      <p className="mt-4 flex justify-between gap-4 border-t border-line pt-3 text-xs text-ink-soft">
        <span>
          Your role: <span className="font-medium text-ink">{roleNames(project.roles)}</span>
        </span>
        <span>
          Begun <time dateTime={project.createdAt}>{formatDate(project.createdAt)}</time>
        </span>
      </p>
    </article>
  );
}
