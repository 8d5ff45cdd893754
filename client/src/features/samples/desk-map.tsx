import { type ReactNode, type RefObject, useEffect, useMemo } from 'react';
import { useMap } from 'react-leaflet';
import type { DrawingRefusal } from '../../../../shared/contracts/sample.ts';
import { AreaOutline } from '../../components/map/area-outline.tsx';
import { BaseMap } from '../../components/map/base-map.tsx';
import { CanvasPolygons } from '../../components/map/canvas-polygons.tsx';
import { Crosshair, isOnControl } from '../../components/map/crosshair.tsx';
import { PlaceMarker } from '../../components/map/place-marker.tsx';
import { PressMap } from '../../components/map/press-map.tsx';
import { SceneLayer } from '../../components/map/scene-layer.tsx';
import { ShapeEditor, type ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { ZoomTo } from '../../components/map/zoom-to.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatMeters } from '../../lib/format.ts';
import { useKeys } from '../../lib/keys.ts';
import { finestTileZoom, unwrapBounds, unwrapLongitude } from '../../lib/map-bounds.ts';
import type { SceneView } from '../../lib/scene-view.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import { drawToolOf } from './desk-tool.ts';
import { samplePolygons } from './sample-polygons.ts';
import type { Desk } from './use-desk.ts';

export interface DeskMapProps {
  desk: Desk;
  view: SceneView;
  editor: RefObject<ShapeEditorHandle | null>;
  /** Why the open drawing is refused; its place is marked. */
  refusal: DrawingRefusal | null;
  /** Blocks, and what others are changing. */
  children?: ReactNode;
}

/** The desk's map: scene, study area, samples, and the drawing in hand. */
export function DeskMap({ desk, view, editor, refusal, children }: DeskMapProps) {
  const { scene, draft, tool, shown, byId, project, selected } = desk;
  const polygons = useMemo(() => samplePolygons(shown, byId), [shown, byId]);
  const drawTool = desk.canDraw ? drawToolOf(tool) : null;
  const isGrowing = tool === 'grow' && desk.canDraw && draft === null;
  const isStill = draft !== null || drawTool !== null || tool === 'inspect' || isGrowing;
  const colour = byId.get(desk.classId)?.colour ?? '#85867a';
  const gsdMeters = scene.bands.find((band) => band.role === 'red')?.gsdMeters ?? scene.bands[0]?.gsdMeters;
  const firstBounds = unwrapBounds(project.studyAreaBounds ?? scene.bounds ?? [-180, -85, 180, 85]);
  const onMap = ({ lon, lat }: Place): Place => ({ lon: unwrapLongitude(lon, firstBounds), lat });
  return (
    <BaseMap
      label={`${scene.name} with ${shown.length} samples`}
      bounds={firstBounds}
      maxZoom={scene.bounds && scene.height ? finestTileZoom(unwrapBounds(scene.bounds), scene.height) + 2 : 18}
      readoutNote={gsdMeters ? `${formatMeters(gsdMeters)} pixels` : undefined}
    >
      <SceneLayer key={scene.id} scene={scene} view={view} />
      <AreaOutline geometry={project.studyArea} />
      {children}
      <CanvasPolygons
        polygons={polygons}
        selectedId={selected?.id ?? null}
        highlightedIds={desk.highlightedIds}
        hiddenId={draft?.id ?? null}
        onSelect={isStill ? undefined : desk.select}
      />
      {desk.version && <AreaOutline geometry={desk.version.geometry} label={`Version ${desk.version.versionNumber}`} />}
      {desk.canDraw && (
        <ShapeEditor
          ref={editor}
          tool={drawTool}
          shape={draft?.geometry ?? null}
          colour={colour}
          onDrawn={desk.drawn}
          onShaped={desk.shaped}
          onCorners={desk.setCorners}
          onUnmendable={(reason) =>
            sayDone(`This outline cannot be changed by hand here (${reason.toLowerCase()}); its class and note can.`)
          }
        />
      )}
      {!draft && !drawTool && (
        <PressMap
          onPress={(place, event) => {
            if (isGrowing && !event.altKey) desk.growFrom(place);
            else if (tool === 'inspect' || event.altKey) desk.setProbe(place);
            else desk.select(null);
          }}
        />
      )}
      <Crosshair
        isOn={isStill}
        action={draft ? 'carry' : 'press'}
        onPress={(place) => {
          if (isGrowing) desk.growFrom(place);
          else if (tool === 'inspect' && !draft) desk.setProbe(place);
        }}
      />
      {!isStill && <PanByKeys />}
      {desk.probe && <PlaceMarker place={onMap(desk.probe)} mark="probe" />}
      {draft && refusal?.at && (
        <PlaceMarker place={onMap({ lon: refusal.at[0], lat: refusal.at[1] })} mark="fault" label="Here" />
      )}
      <ZoomTo target={desk.zoom} />
      <DrawingCursor isOn={(drawTool !== null || isGrowing) && !draft} />
    </BaseMap>
  );
}

const PAN_PIXELS = 90;

/** Arrow keys move the map wherever on the page the focus is, as long as nothing there wants them; so do + and −. */
function PanByKeys() {
  const map = useMap();
  const pan = (dx: number, dy: number) => (event: KeyboardEvent) => {
    if (isOnControl(event)) return false;
    map.panBy([dx, dy], { animate: false });
    return true;
  };
  useKeys({
    ArrowLeft: pan(-PAN_PIXELS, 0),
    ArrowRight: pan(PAN_PIXELS, 0),
    ArrowUp: pan(0, -PAN_PIXELS),
    ArrowDown: pan(0, PAN_PIXELS),
    '+': () => map.zoomIn(),
    '-': () => map.zoomOut(),
  });
  return null;
}

function DrawingCursor({ isOn }: { isOn: boolean }) {
  const map = useMap();
  useEffect(() => {
    map.getContainer().classList.toggle('map-drawing', isOn);
  }, [isOn, map]);
  return null;
}
