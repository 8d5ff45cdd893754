import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState, NotFoundState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { UnreadyScene } from './unready-scene.tsx';

interface SceneGateProps {
  sceneId: string;
  /** The page of a scene that is ready; `ready` are all such scenes of the project. */
  children: (scene: Scene, ready: readonly Scene[]) => ReactNode;
}

/** Opens a page of one scene once the scene is there and ready; else says how it stands. */
export function SceneGate({ sceneId, children }: SceneGateProps) {
  const project = useProject();
  const scenes = useScenes(project.id);
  const scene = scenes.data?.find(({ id }) => id === sceneId);
  if (scene?.state === 'ready') {
    return children(
      scene,
      (scenes.data ?? []).filter(({ state }) => state === 'ready'),
    );
  }
  if (scene) return <UnreadyScene scene={scene} />;
  return (
    <ReadingPage header={<PageHeader title="Scene" />}>
      {!project.abilities.readScenes ? (
        <ForbiddenState />
      ) : scenes.isPending ? (
        <PendingState label="Opening the scene" shape="block" />
      ) : scenes.isError ? (
        <ErrorState error={scenes.error} onRetry={() => void scenes.refetch()} />
      ) : (
        <NotFoundState
          title="No such scene"
          action={
            <Link to={paths.scenes(project.id)} className={buttonClass('strong')}>
              To the scenes
            </Link>
          }
        >
          It may have been deleted.
        </NotFoundState>
      )}
    </ReadingPage>
  );
}
