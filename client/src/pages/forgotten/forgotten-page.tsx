import { Link } from 'react-router-dom';
import { GatePage } from '../../components/layout/gate-page.tsx';
import { ForgottenForm } from '../../features/account/forgotten-form.tsx';
import { paths } from '../../lib/paths.ts';
import { GroundselPlate } from '../../components/plate/groundsel-plate.tsx';

/** For someone who cannot sign in any more. */
export function ForgottenPage() {
  return (
    <GatePage
      picture={<GroundselPlate className="absolute inset-0 size-full" />}
      title="Forgotten password"
      lead="A link to choose a new one is sent to your address."
    >
      <ForgottenForm />
      <p className="mt-6 text-sm">
        <Link to={paths.signIn()} className="link">
          Back to sign in
        </Link>
      </p>
    </GatePage>
  );
}
