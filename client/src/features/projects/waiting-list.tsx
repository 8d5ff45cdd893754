import { ArrowRight } from 'lucide-react';
import { Link } from 'react-router-dom';
import type { Overview } from '../../../../shared/contracts/project.ts';

/** What this person can do next, most pressing first. */
export function WaitingList({ projectId, waiting }: { projectId: string; waiting: Overview['waiting'] }) {
  if (waiting.length === 0) {
    return (
      <p className="rounded-lg border border-line bg-card px-4 py-3 text-ink-soft">
        Nothing waits for you. What others do shows below as it happens.
      </p>
    );
  }
  return (
    <ol className="overflow-hidden rounded-lg border border-line bg-card">
      {waiting.map((item, index) => (
        <li key={`${item.path} ${item.text}`} className="border-b border-line last:border-b-0">
          <Link
            to={`/projects/${projectId}/${item.path}`}
            className="focus-inset group flex items-center gap-3 px-4 py-3 text-ink no-underline hover:bg-sunken"
          >
            <span
              aria-hidden
              className={
                index === 0
                  ? 'size-2.5 shrink-0 rounded-full bg-groundsel ring-1 ring-groundsel-deep'
                  : 'size-2.5 shrink-0 rounded-full ring-1 ring-edge ring-inset'
              }
            />
            <span className="grow font-medium">{item.text}</span>
            <ArrowRight aria-hidden className="size-4 shrink-0 text-ink-soft group-hover:text-ink" />
          </Link>
        </li>
      ))}
    </ol>
  );
}
