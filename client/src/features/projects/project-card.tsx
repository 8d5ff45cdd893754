import { Link } from 'react-router-dom';
import type { ProjectSummary } from '../../../../shared/contracts/project.ts';
import { formatSince } from '../../lib/format-date.ts';
import { roleNames } from '../../lib/role-names.ts';

/** A project in the list: pressing anywhere opens it. */
export function ProjectCard({ project }: { project: ProjectSummary }) {
  return (
    <article className="relative flex min-h-40 flex-col rounded-xl border border-line bg-card px-5 pt-4 pb-3.5 shadow-card hover:border-edge">
      <h2 className="text-xl font-semibold tracking-tight">
        <Link
          to={`/projects/${project.id}`}
          className="text-ink no-underline after:absolute after:inset-0 after:rounded-xl after:content-['']"
        >
          {project.name}
        </Link>
      </h2>
      <p className="text-sm text-ink-soft">{project.client ? `For ${project.client}` : 'No client named yet'}</p>
      {project.description && <p className="mt-2 line-clamp-2 text-sm">{project.description}</p>}
      <p className="mt-auto flex justify-between gap-4 border-t border-line pt-2.5 text-xs text-ink-soft">
        <span>
          Your role: <span className="font-medium text-ink">{roleNames(project.roles)}</span>
        </span>
        <span>
          Changed <time dateTime={project.updatedAt}>{formatSince(project.updatedAt)}</time>
        </span>
      </p>
    </article>
  );
}
