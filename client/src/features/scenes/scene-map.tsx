import { type RefObject, useEffect } from 'react';
import { useMap } from 'react-leaflet';
import type { Project } from '../../../../shared/contracts/project.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { AreaOutline } from '../../components/map/area-outline.tsx';
import { BaseMap, type Bounds, toLatLngBounds } from '../../components/map/base-map.tsx';
import { Crosshair } from '../../components/map/crosshair.tsx';
import { PlaceMarker } from '../../components/map/place-marker.tsx';
import { PressMap } from '../../components/map/press-map.tsx';
import { SceneTileLayer } from '../../components/map/scene-tile-layer.tsx';
import { ShapeEditor, type ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { ZoomTo, type ZoomTarget } from '../../components/map/zoom-to.tsx';
import { finestTileZoom, unwrapBounds } from '../../lib/map-bounds.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import { type BandLimits, type SceneView, sceneTileUrl } from '../../lib/scene-view.ts';
import { describePixel } from './scene-text.ts';
import type { StudyAreaEditor } from './use-study-area-editor.ts';

interface SceneMapProps {
  project: Project;
  scene: Scene;
  view: SceneView;
  limits: BandLimits;
  place: Place | null;
  onProbe: (place: Place) => void;
  isFootprintShown: boolean;
  area: StudyAreaEditor;
  shape: RefObject<ShapeEditorHandle | null>;
  zoom: ZoomTarget | null;
}

/** Gold of the accent: the study area has no class colour. */
const AREA_COLOUR = '#f2b705';

/** A scene on its map: press a pixel to read it, draw the study area. */
export function SceneMap(props: SceneMapProps) {
  const { project, scene, view, limits, place, onProbe, isFootprintShown, area, shape, zoom } = props;
  const bounds = unwrapBounds(scene.bounds ?? [-180, -85, 180, 85]);
  const pixel = describePixel(scene.bands);
  const isEditing = area.tool !== null || area.draft !== null;
  return (
    <BaseMap
      label={`Scene ${scene.name}`}
      bounds={bounds}
      maxZoom={20}
      readoutNote={pixel ? `${pixel} pixels` : undefined}
    >
      <SceneTileLayer
        key={scene.id}
        url={sceneTileUrl(scene, view, limits)}
        bounds={bounds}
        maxNativeZoom={finestTileZoom(bounds, scene.height ?? 1)}
      />
      <AreaOutline geometry={project.studyArea} />
      {isFootprintShown && <AreaOutline geometry={scene.footprint} label="Footprint" />}
      {area.draft && !area.mendable && <AreaOutline geometry={area.draft} label="New study area" />}
      {project.abilities.manageProject && (
        <ShapeEditor
          ref={shape}
          tool={area.tool}
          shape={area.mendable}
          colour={AREA_COLOUR}
          onDrawn={area.setDraft}
          onShaped={area.setDraft}
          onUnmendable={area.cancel}
        />
      )}
      {!isEditing && <PressMap onPress={onProbe} />}
      {!isEditing && place && <PlaceMarker place={place} mark="probe" />}
      <Crosshair
        isOn
        action={area.draft ? 'carry' : 'press'}
        onPress={(at) => {
          if (!isEditing) onProbe(at);
        }}
      />
      <FillView bounds={bounds} />
      <ZoomTo target={zoom} />
      <MapCursor isDrawing={!area.draft} />
    </BaseMap>
  );
}

/** How far a scene may reach past the map's edges at first, in shares of the map: whole zoom steps leave it small else. */
const REACH_PAST = 0.09;

/** The first view: the closest whole zoom at which all but the scene's margins is seen. */
function FillView({ bounds }: { bounds: Bounds }) {
  const map = useMap();
  const key = bounds.join(' ');
  useEffect(() => {
    const box = toLatLngBounds(key.split(' ').map(Number) as [number, number, number, number]);
    const { x, y } = map.getSize();
    map.fitBounds(box, { padding: [-REACH_PAST * x, -REACH_PAST * y], animate: false });
  }, [key, map]);
  return null;
}

/** A crosshair where a press reads a pixel or sets a corner. */
function MapCursor({ isDrawing }: { isDrawing: boolean }) {
  const map = useMap();
  useEffect(() => {
    map.getContainer().classList.toggle('map-drawing', isDrawing);
  }, [isDrawing, map]);
  return null;
}
