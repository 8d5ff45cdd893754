import { Link } from 'react-router-dom';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { paths } from '../../lib/paths.ts';
import { useBlocks } from '../../lib/project/blocks-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { BlockDesk } from './block-desk.tsx';

/** The blocks of a project, or what is wanted before there can be any. */
export function BlocksPage() {
  const { abilities } = useProject();
  return abilities.readSamples ? (
    <OpenBlocks />
  ) : (
    <ReadingPage header={<PageHeader title="Blocks" />}>
      <ForbiddenState />
    </ReadingPage>
  );
}

function OpenBlocks() {
  const project = useProject();
  const scenes = useScenes(project.id);
  const blocks = useBlocks(project.id);
  if (scenes.data && blocks.data) {
    const scene = scenes.data.find(({ state, bounds }) => state === 'ready' && bounds);
    if (scene) return <BlockDesk scene={scene} list={blocks.data} />;
    return (
      <ReadingPage header={<PageHeader title="Blocks" />}>
        <EmptyState
          title="No scene to cut into blocks yet"
          action={
            <Link to={paths.scenes(project.id)} className={buttonClass('primary')}>
              Go to Scenes
            </Link>
          }
        >
          Blocks share the study area among labellers. Bring in a scene first.
        </EmptyState>
      </ReadingPage>
    );
  }
  const failed = [scenes, blocks].find((query) => query.isError);
  return (
    <ReadingPage header={<PageHeader title="Blocks" />}>
      {failed ? (
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      ) : (
        <PendingState label="Loading the blocks" shape="block" />
      )}
    </ReadingPage>
  );
}
