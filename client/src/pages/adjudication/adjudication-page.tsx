import type { ReactNode } from 'react';
import { Link, useParams } from 'react-router-dom';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useDesign } from '../../features/designs/get-design.ts';
import { useDisagreements } from '../../features/interpretation/disagreement-queries.ts';
import { paths } from '../../lib/paths.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { DecisionDesk } from './decision-desk.tsx';

/** Where answers differ, the reviewer decides; over the whole screen, like the blind check. */
export function AdjudicationPage() {
  const { designId = '' } = useParams();
  const { id } = useProject();
  const design = useDesign(id, designId);
  const disagreements = useDisagreements(id, designId);
  const scenes = useScenes(id);
  const classes = useClasses(id);
  const back = (
    <Link to={paths.design(id, designId)} className={buttonClass('strong')}>
      To the design
    </Link>
  );
  if (design.data && !design.data.abilities.adjudicate && design.data.state === 'adjudicating') {
    return (
      <Plain>
        <ForbiddenState>Reviewers decide between answers. Your project lead gives out roles.</ForbiddenState>
      </Plain>
    );
  }
  const failed = [design, disagreements, scenes, classes].find((one) => one.isError && !one.data);
  if (failed) {
    return (
      <Plain>
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
        <div className="mt-4">{back}</div>
      </Plain>
    );
  }
  if (!design.data || !disagreements.data || !scenes.data || !classes.data) {
    return (
      <Plain>
        <PendingState label="Comparing the answers" rows={6} />
      </Plain>
    );
  }
  if (disagreements.data.disagreements.length === 0) {
    return (
      <Plain>
        <EmptyState title="Nothing to decide" action={back}>
          Everybody said the same of every point.
        </EmptyState>
      </Plain>
    );
  }
  return <DecisionDesk design={design.data} list={disagreements.data} scenes={scenes.data} scheme={classes.data} />;
}

function Plain({ children }: { children: ReactNode }) {
  return <div className="p-10">{children}</div>;
}
