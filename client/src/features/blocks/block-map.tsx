import { type RefObject, useMemo } from 'react';
import type { Block } from '../../../../shared/contracts/block.ts';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { AreaOutline } from '../../components/map/area-outline.tsx';
import { BaseMap } from '../../components/map/base-map.tsx';
import { CanvasPolygons, type PolygonCollection } from '../../components/map/canvas-polygons.tsx';
import { Crosshair } from '../../components/map/crosshair.tsx';
import type { DrawTool } from '../../components/map/drawing-modes.ts';
import { SceneLayer } from '../../components/map/scene-layer.tsx';
import { ShapeEditor, type ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { finestTileZoom, unwrapBounds } from '../../lib/map-bounds.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useSceneView } from '../../lib/use-scene-view.ts';
import { BLOCK_STATE_COLOUR, BLOCK_STATE_TEXT } from './block-state.tsx';

export interface BlockMapProps {
  scene: Scene;
  blocks: readonly Block[];
  selected: Block | null;
  ticked: ReadonlySet<string>;
  tool: DrawTool | null;
  editor: RefObject<ShapeEditorHandle | null>;
  /** Two samples that differ, side by side. */
  pair: readonly { geometry: Polygon; label: string }[];
  onSelect: (blockId: string) => void;
  onDrawn: (shape: Polygon) => void;
}

/** The blocks over the scene, filled by state. */
export function BlockMap(props: BlockMapProps) {
  const { scene, blocks, selected, ticked, tool, editor, pair, onSelect, onDrawn } = props;
  const project = useProject();
  const [view] = useSceneView(project.id);
  const polygons = useMemo<PolygonCollection>(
    () => ({
      type: 'FeatureCollection',
      features: blocks.map(({ id, name, state, geometry, assignments }) => ({
        type: 'Feature',
        id,
        geometry,
        properties: {
          id,
          colour: BLOCK_STATE_COLOUR[state],
          label: `Block ${name}, ${BLOCK_STATE_TEXT[state].toLowerCase()}, ${assignments.map(({ person }) => person.name).join(' and ') || 'nobody'}`,
        },
      })),
    }),
    [blocks],
  );
  const highlighted = useMemo(() => [...ticked], [ticked]);
  const bounds = unwrapBounds(project.studyAreaBounds ?? scene.bounds ?? [-180, -85, 180, 85]);
  return (
    <BaseMap
      label={`${blocks.length} blocks`}
      bounds={bounds}
      maxZoom={scene.bounds && scene.height ? finestTileZoom(unwrapBounds(scene.bounds), scene.height) + 2 : 18}
    >
      <SceneLayer key={scene.id} scene={scene} view={view} />
      <AreaOutline geometry={project.studyArea} />
      <CanvasPolygons
        polygons={polygons}
        selectedId={selected?.id ?? null}
        highlightedIds={highlighted}
        fillOpacity={0.22}
        onSelect={tool ? undefined : onSelect}
      />
      {pair.map(({ geometry, label }) => (
        <AreaOutline key={label} geometry={geometry} label={label} />
      ))}
      <ShapeEditor
        ref={editor}
        tool={tool}
        shape={null}
        colour="#f2b705"
        onDrawn={onDrawn}
        onShaped={() => undefined}
        onUnmendable={() => undefined}
      />
      <Crosshair isOn={tool !== null} action="press" onPress={() => undefined} />
    </BaseMap>
  );
}
