import type { Scene } from '../../../../shared/contracts/scene.ts';
import { finestTileZoom, unwrapBounds } from '../../lib/map-bounds.ts';
import { type SceneView, sceneTileUrl } from '../../lib/scene-view.ts';
import { SceneTileLayer } from './scene-tile-layer.tsx';

/** A ready scene on the map, looked at through `view`. */
export function SceneLayer({ scene, view }: { scene: Scene; view: SceneView }) {
  if (!scene.bounds || !scene.height) return null;
  return (
    <SceneTileLayer
      url={sceneTileUrl(scene, view)}
      bounds={unwrapBounds(scene.bounds)}
      maxNativeZoom={finestTileZoom(unwrapBounds(scene.bounds), scene.height)}
    />
  );
}
