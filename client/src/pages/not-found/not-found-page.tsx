import { Link } from 'react-router-dom';
import { NotFoundState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { Sprig } from '../../components/ui/sprig.tsx';
import { paths } from '../../lib/paths.ts';
import { useTitle } from '../../lib/use-title.ts';

/** An address that leads nowhere. */
export function NotFoundPage() {
  useTitle(['Nothing here']);
  return (
    <div className="flex min-h-[70dvh] flex-col items-center justify-center gap-6 px-4">
      <Sprig className="h-28" />
      <NotFoundState
        action={
          <Link to={paths.projects()} className={buttonClass('strong')}>
            To your projects
          </Link>
        }
      />
    </div>
  );
}
