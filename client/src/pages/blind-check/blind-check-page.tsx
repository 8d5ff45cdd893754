import type { ReactNode } from 'react';
import { Link, useParams } from 'react-router-dom';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useDesign } from '../../features/designs/get-design.ts';
import { paths } from '../../lib/paths.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { CheckDesk } from './check-desk.tsx';

/** The blind check of one design over the whole screen: no rail, no map, no answer of anybody else. */
export function BlindCheckPage() {
  const { designId = '' } = useParams();
  const { id } = useProject();
  const design = useDesign(id, designId);
  const scenes = useScenes(id);
  const classes = useClasses(id);
  const back = (
    <Link to={paths.design(id, designId)} className={buttonClass('strong')}>
      To the design
    </Link>
  );
  const failed = [design, scenes, classes].find((one) => one.isError && !one.data);
  if (failed) {
    return (
      <Plain>
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      </Plain>
    );
  }
  if (!design.data || !scenes.data || !classes.data) {
    return (
      <Plain>
        <PendingState label="Opening the blind check" rows={6} />
      </Plain>
    );
  }
  if (design.data.state !== 'open') {
    return (
      <Plain>
        <EmptyState title="The blind check is not open" action={back}>
          {design.data.state === 'draft'
            ? 'The design is still a draft. Once it is opened, its points wait here.'
            : 'It has ended; answers are no longer taken.'}
        </EmptyState>
      </Plain>
    );
  }
  if (!design.data.abilities.interpret) {
    return (
      <Plain>
        <ForbiddenState>Reviewers interpret reference points. Your project lead gives out roles.</ForbiddenState>
      </Plain>
    );
  }
  return <CheckDesk design={design.data} scenes={scenes.data} scheme={classes.data} />;
}

function Plain({ children }: { children: ReactNode }) {
  return <div className="p-10">{children}</div>;
}
