import { useParams } from 'react-router-dom';
import { SceneDesk } from './scene-desk.tsx';
import { SceneGate } from './scene-gate.tsx';

/** One scene on its map. */
export function ScenePage() {
  const { sceneId = '' } = useParams();
  return (
    <SceneGate sceneId={sceneId}>
      {(scene, ready) => <SceneDesk key={scene.id} scene={scene} scenes={ready} />}
    </SceneGate>
  );
}
