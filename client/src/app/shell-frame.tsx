import { Outlet, useNavigate, useOutletContext } from 'react-router-dom';
import type { Account } from '../../../shared/contracts/account.ts';
import { AppShell } from '../components/layout/app-shell.tsx';
import { sayProblem } from '../components/ui/toaster.tsx';
import { useSignOut } from '../features/session/sign-out.ts';
import { paths } from '../lib/paths.ts';

/** The rail around pages that belong to no project. */
export function ShellFrame() {
  const account = useOutletContext<Account>();
  const signOut = useSignOutAndLeave();
  return (
    <AppShell account={{ name: account.name, note: account.email, isSiteAdmin: account.siteAdmin, onSignOut: signOut }}>
      <Outlet context={account} />
    </AppShell>
  );
}

/** Signs out and shows the sign-in page. */
export function useSignOutAndLeave(): () => void {
  const navigate = useNavigate();
  const { mutate } = useSignOut();
  return () =>
    mutate(undefined, { onSuccess: () => void navigate(paths.signIn(), { replace: true }), onError: sayProblem });
}
