import type { Scene } from '../../../../shared/contracts/scene.ts';
import { finestTileZoom, unwrapBounds } from '../../lib/map-bounds.ts';
import { type BandLimits, type SceneView, sceneTileUrl } from '../../lib/scene-view.ts';
import { SceneTileLayer } from './scene-tile-layer.tsx';

export interface SceneLayerProps {
  scene: Scene;
  view: SceneView;
  /** Stretch limits that stand above those of the view. */
  limits?: BandLimits | undefined;
}

/** A ready scene on the map, looked at through `view`. */
export function SceneLayer({ scene, view, limits }: SceneLayerProps) {
  if (!scene.bounds || !scene.height) return null;
  return (
    <SceneTileLayer
      url={sceneTileUrl(scene, view, limits)}
      bounds={unwrapBounds(scene.bounds)}
      maxNativeZoom={finestTileZoom(unwrapBounds(scene.bounds), scene.height)}
    />
  );
}
