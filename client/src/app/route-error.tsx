import { isRouteErrorResponse, useNavigate, useRouteError } from 'react-router-dom';
import { ErrorState } from '../components/ui/error-state.tsx';
import { ProblemError } from '../lib/problem-error.ts';

/** What a page that broke shows instead of itself; the frame around it stays. */
export function RouteError() {
  const error = useRouteError();
  const navigate = useNavigate();
  return (
    <div className="p-8">
      <ErrorState error={toProblem(error)} retryLabel="Reload the page" onRetry={() => void navigate(0)} />
    </div>
  );
}

function toProblem(error: unknown): unknown {
  if (isRouteErrorResponse(error)) {
    return new ProblemError({
      status: error.status,
      code: `http-${error.status}`,
      title: error.statusText || 'This page could not open',
    });
  }
  // A page's code is fetched when first opened; after an update of the server the old file is gone.
  if (error instanceof TypeError && /dynamically imported module/i.test(error.message)) {
    return new ProblemError({
      status: 0,
      code: 'page-renewed',
      title: 'Groundsel was updated while this tab was open',
      advice: 'Reload the page. Nothing you saved is lost.',
    });
  }
  return error;
}
