import { Link, useOutletContext } from 'react-router-dom';
import type { Account } from '../../../../shared/contracts/account.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useSamples } from '../../features/samples/samples-query.ts';
import { paths } from '../../lib/paths.ts';
import { useBlocks } from '../../lib/project/blocks-query.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { SamplingDesk } from './sampling-desk.tsx';

/** The sampling desk, or what is wanted before it can open. */
export function SamplesPage() {
  const { abilities } = useProject();
  return abilities.readSamples ? (
    <OpenDesk />
  ) : (
    <ReadingPage header={<PageHeader title="Sampling desk" />}>
      <ForbiddenState />
    </ReadingPage>
  );
}

function OpenDesk() {
  const project = useProject();
  const account = useOutletContext<Account>();
  const scenes = useScenes(project.id);
  const classes = useClasses(project.id);
  const samples = useSamples(project.id);
  const blocks = useBlocks(project.id);
  if (scenes.data && classes.data && samples.data && blocks.data) {
    const ready = scenes.data.filter((scene) => scene.state === 'ready' && scene.bounds);
    if (ready.length > 0 && classes.data.length > 0) {
      return (
        <SamplingDesk
          viewerId={account.id}
          scenes={ready}
          classes={classes.data}
          samples={samples.data}
          blocks={blocks.data.blocks}
        />
      );
    }
    const isComing = scenes.data.some((scene) => scene.state === 'ingesting');
    return (
      <ReadingPage header={<PageHeader title="Sampling desk" />}>
        {ready.length === 0 ? <NoScene isComing={isComing} /> : <NoClass />}
      </ReadingPage>
    );
  }
  const failed = [scenes, classes, samples, blocks].find((query) => query.isError);
  return (
    <ReadingPage header={<PageHeader title="Sampling desk" />}>
      {failed ? (
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      ) : (
        <PendingState label="Opening the sampling desk" shape="block" />
      )}
    </ReadingPage>
  );
}

function NoScene({ isComing }: { isComing: boolean }) {
  const { id, abilities } = useProject();
  const action = (
    <Link to={paths.scenes(id)} className={buttonClass('primary')}>
      {isComing ? 'See how far it is' : 'Go to Scenes'}
    </Link>
  );
  return (
    <EmptyState title={isComing ? 'The scene is still coming in' : 'No scene to draw on yet'} action={action}>
      {isComing
        ? 'Samples are drawn on a scene. The desk opens by itself once one is ready.'
        : abilities.manageScenes
          ? 'Samples are drawn on a scene. Bring in a GeoTIFF first: one file with several bands, or one file a band.'
          : 'Samples are drawn on a scene. The lead or a modeller brings scenes in.'}
    </EmptyState>
  );
}

function NoClass() {
  const { id, abilities } = useProject();
  const action = (
    <Link to={paths.classes(id)} className={buttonClass('primary')}>
      Go to Classes
    </Link>
  );
  return (
    <EmptyState title="No class to draw yet" action={action}>
      {abilities.manageClasses
        ? 'Each sample belongs to a class. Define the class scheme first; its order gives the keys 1 to 0 here.'
        : 'Each sample belongs to a class. The lead defines the class scheme.'}
    </EmptyState>
  );
}
