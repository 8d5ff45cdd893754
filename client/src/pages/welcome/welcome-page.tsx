import { Link, useNavigate, useParams } from 'react-router-dom';
import { GatePage } from '../../components/layout/gate-page.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useWelcome } from '../../features/account/get-welcome.ts';
import { WelcomeForm } from '../../features/account/welcome-form.tsx';
import { paths } from '../../lib/paths.ts';
import { ProblemError } from '../../lib/problem-error.ts';
import { GroundselPlate } from '../../components/plate/groundsel-plate.tsx';

/** Where a welcome or reset link leads. */
export function WelcomePage() {
  const { token = '' } = useParams();
  const navigate = useNavigate();
  const welcome = useWelcome(token);
  const isReset = welcome.data?.purpose === 'reset';
  const isGone = welcome.error instanceof ProblemError && [400, 404].includes(welcome.error.status);
  return (
    <GatePage
      picture={<GroundselPlate className="absolute inset-0 size-full" />}
      title={isGone ? 'This link no longer works' : isReset ? 'Choose a new password' : 'Welcome'}
      lead={
        welcome.data &&
        (isReset ? 'Every other browser is signed out by it.' : 'Choose a name and a password, and you are in.')
      }
    >
      {welcome.isPending && <PendingState label="Opening the link" />}
      {isGone && (
        <>
          <p>
            It was used already, has run out, or a newer one was sent. A welcome link holds for 14 days, a reset link
            for two hours.
          </p>
          <ul className="mt-4 list-disc space-y-1 pl-5">
            <li>
              You have a password:{' '}
              <Link to={paths.signIn()} className="link">
                sign in
              </Link>
            </li>
            <li>
              You forgot it:{' '}
              <Link to={paths.forgotPassword()} className="link">
                ask for a new link
              </Link>
            </li>
            <li>You were invited: ask whoever invited you to send the link again</li>
          </ul>
        </>
      )}
      {welcome.isError && !isGone && (
        <ErrorState error={welcome.error} onRetry={() => void welcome.refetch()} isInline />
      )}
      {welcome.data && (
        <WelcomeForm
          secret={token}
          welcome={welcome.data}
          onDone={() => void navigate(paths.projects(), { replace: true })}
        />
      )}
    </GatePage>
  );
}
