import { useEffect } from 'react';
import { Navigate, Outlet, useLocation, useNavigate } from 'react-router-dom';
import { useQueryClient } from '@tanstack/react-query';
import { ErrorState } from '../components/ui/error-state.tsx';
import { PendingState } from '../components/ui/pending-state.tsx';
import { sessionQuery, useSession } from '../features/session/get-session.ts';
import { SIGNED_OUT_EVENT } from '../lib/fetch-json.ts';
import { paths } from '../lib/paths.ts';

/** Lets signed-in people through; others go to the sign-in page and come back here. */
export function SignedInFrame() {
  const session = useSession();
  const location = useLocation();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const here = location.pathname + location.search;

  useEffect(() => {
    const leave = () => {
      queryClient.setQueryData(sessionQuery().queryKey, { account: null });
      void navigate(paths.signIn(here), { replace: true });
    };
    window.addEventListener(SIGNED_OUT_EVENT, leave);
    return () => window.removeEventListener(SIGNED_OUT_EVENT, leave);
  }, [here, navigate, queryClient]);

  if (session.isPending) return <PendingState label="Opening Groundsel" className="p-10" />;
  if (session.isError) {
    return (
      <div className="p-8">
        <ErrorState error={session.error} onRetry={() => void session.refetch()} />
      </div>
    );
  }
  if (!session.data.account) return <Navigate to={paths.signIn(here)} replace />;
  return <Outlet context={session.data.account} />;
}
