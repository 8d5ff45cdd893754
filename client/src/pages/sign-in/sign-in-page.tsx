import { Navigate, useNavigate, useSearchParams } from 'react-router-dom';
import { BrandMark } from '../../components/layout/brand-mark.tsx';
import { useSession } from '../../features/session/get-session.ts';
import { SignInForm } from '../../features/session/sign-in-form.tsx';
import { safeReturnPath } from '../../lib/paths.ts';
import { useTitle } from '../../lib/use-title.ts';
import { GroundselPlate } from '../../components/plate/groundsel-plate.tsx';

/** The way in. Afterwards the reader is back where the sign-in interrupted them. */
export function SignInPage() {
  useTitle(['Sign in']);
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const session = useSession();
  const backTo = safeReturnPath(search.get('to'));
  if (session.data?.account) return <Navigate to={backTo} replace />;
  return (
    <div className="grid min-h-dvh grid-cols-[minmax(0,1fr)_minmax(26rem,34rem)] bg-paper max-md:grid-cols-1">
      <div className="relative overflow-hidden border-r border-line bg-card max-md:hidden">
        <GroundselPlate className="absolute inset-0 size-full" />
      </div>
      <main id="page" className="flex flex-col justify-center px-16 py-10 max-sm:px-6">
        <div className="w-full max-w-sm">
          <p className="flex items-center gap-2.5 text-2xl font-semibold tracking-tight">
            <BrandMark className="size-8" />
            Groundsel
          </p>
          <h1 className="mt-10 text-3xl font-medium tracking-[-0.4px]">Sign in</h1>
          <p className="mt-1 mb-6 text-ink-soft">To your team’s scenes, samples and maps.</p>
          <SignInForm onDone={() => void navigate(backTo, { replace: true })} />
          <p className="mt-10 border-t border-line pt-4 text-sm text-ink-soft">
            No account yet? The lead of your project sends you an invitation.
          </p>
        </div>
      </main>
    </div>
  );
}
