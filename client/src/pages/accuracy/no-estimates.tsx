import { Link } from 'react-router-dom';
import type { Design } from '../../../../shared/contracts/reference.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import { buttonClass } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

export interface NoEstimatesProps {
  run: Run;
  designs: readonly Design[];
  mayPlan: boolean;
}

/** No closed design yet: says what one is good for, or what the open one waits for. */
export function NoEstimates({ run, designs, mayPlan }: NoEstimatesProps) {
  const { id } = useProject();
  const [latest] = designs;
  if (latest) {
    return (
      <Callout
        action={
          <Link to={paths.design(id, latest.id)} className={buttonClass('strong', 'sm')}>
            To the design
          </Link>
        }
      >
        Estimates stand here once a reference design is closed; nobody sees them before, so that nobody stops when the
        figures please.
      </Callout>
    );
  }
  return (
    <EmptyState
      title="No reference points yet"
      action={
        mayPlan && (
          <Link to={paths.newDesign(id, run.id)} className={buttonClass('primary')}>
            Plan reference points
          </Link>
        )
      }
    >
      Points drawn at random from the map and interpreted without seeing it give the accuracy and the areas to quote.
      {!mayPlan && ' Leads and reviewers plan them.'} The figures below come from samples that were chosen by hand: they
      describe those samples, not the map.
    </EmptyState>
  );
}
