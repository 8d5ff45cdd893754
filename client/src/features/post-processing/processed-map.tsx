import type { ArealGeometry, Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { AreaOutline } from '../../components/map/area-outline.tsx';
import { BaseMap, type Bounds } from '../../components/map/base-map.tsx';
import { SceneLayer } from '../../components/map/scene-layer.tsx';
import { SceneTileLayer } from '../../components/map/scene-tile-layer.tsx';
import { ShapeEditor } from '../../components/map/shape-editor.tsx';
import { finestTileZoom, unwrapBounds } from '../../lib/map-bounds.ts';
import type { SceneView } from '../../lib/scene-view.ts';

interface ProcessedMapProps {
  run: Run;
  scene: Scene & { bounds: Bounds };
  view: SceneView;
  /** Template of the class map's or the preview's tiles. */
  tiles: string;
  opacity: number;
  /** Outlines of the edits by hand. */
  edits: readonly { id: string; polygon: ArealGeometry; label: string }[];
  isDrawing: boolean;
  onDrawn: (polygon: Polygon) => void;
  onUnmendable: (reason: string) => void;
}

/** The map before or after the steps, with the outlines of edits by hand. */
export function ProcessedMap(props: ProcessedMapProps) {
  const { run, scene, view, tiles, opacity, edits, isDrawing, onDrawn, onUnmendable } = props;
  const bounds = unwrapBounds(scene.bounds);
  return (
    <BaseMap label={`Class map of run ${run.number} with its steps`} bounds={bounds}>
      <SceneLayer scene={scene} view={view} />
      <SceneTileLayer
        url={tiles}
        bounds={bounds}
        maxNativeZoom={finestTileZoom(bounds, scene.height ?? 1)}
        opacity={opacity}
        zIndex={2}
      />
      {edits.map(({ id, polygon, label }) => (
        <AreaOutline key={id} geometry={polygon} label={label} />
      ))}
      <ShapeEditor
        tool={isDrawing ? 'polygon' : null}
        shape={null}
        colour="#85867a"
        onDrawn={onDrawn}
        onShaped={onDrawn}
        onUnmendable={onUnmendable}
      />
    </BaseMap>
  );
}
