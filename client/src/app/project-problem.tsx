import { Link } from 'react-router-dom';
import { ForbiddenState, NotFoundState } from '../components/ui/access-states.tsx';
import { buttonClass } from '../components/ui/button.tsx';
import { ErrorState } from '../components/ui/error-state.tsx';
import { ProblemError } from '../lib/problem-error.ts';
import { paths } from '../lib/paths.ts';

/** Why a project does not open, and the way back. */
export function ProjectProblem({ error, onRetry }: { error: Error; onRetry: () => void }) {
  const status = error instanceof ProblemError ? error.status : 0;
  const back = (
    <Link to={paths.projects()} className={buttonClass('strong')}>
      To your projects
    </Link>
  );
  if (status === 403) return <ForbiddenState action={back} />;
  if (status === 404 || status === 400) {
    return (
      <NotFoundState title="No such project for you" action={back}>
        It may have been deleted, or you are not one of its people. Its lead can add you by your e-mail address.
      </NotFoundState>
    );
  }
  return <ErrorState error={error} onRetry={onRetry} />;
}
