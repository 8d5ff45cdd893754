import type { Map as LeafletMap } from 'leaflet';
import type { ArealGeometry } from '../../../../shared/contracts/geometry.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { AreaOutline } from '../../components/map/area-outline.tsx';
import { BaseMap, type Bounds } from '../../components/map/base-map.tsx';
import { PlaceMarker } from '../../components/map/place-marker.tsx';
import { PressMap } from '../../components/map/press-map.tsx';
import { SceneLayer } from '../../components/map/scene-layer.tsx';
import { SceneTileLayer } from '../../components/map/scene-tile-layer.tsx';
import { API_BASE } from '../../lib/fetch-json.ts';
import { finestTileZoom, unwrapBounds, unwrapLongitude } from '../../lib/map-bounds.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import type { SceneView } from '../../lib/scene-view.ts';
import { formatGsd } from './band-choice.ts';

interface ClassMapProps {
  run: Run;
  scene: Scene & { bounds: Bounds };
  view: SceneView;
  /** 0 shows the scene alone, 1 the class map alone. */
  opacity: number;
  studyArea: ArealGeometry | null;
  place: Place | null;
  onPress: (place: Place) => void;
  onReady: (map: LeafletMap) => void;
}

/** The class map over its scene; a press asks for the pixel there. */
export function ClassMap({ run, scene, view, opacity, studyArea, place, onPress, onReady }: ClassMapProps) {
  const bounds = unwrapBounds(scene.bounds);
  const pixelMeters = scene.bands.find((band) => run.recipe.bandIds.includes(band.id))?.gsdMeters ?? null;
  return (
    <BaseMap
      label={`Class map of run ${run.number} over ${scene.name}`}
      bounds={bounds}
      readoutNote={pixelMeters === null ? undefined : `${formatGsd(pixelMeters)} pixels`}
      onReady={onReady}
    >
      <SceneLayer scene={scene} view={view} />
      <SceneTileLayer
        url={`${API_BASE}/runs/${run.id}/tiles/{z}/{x}/{y}.webp`}
        bounds={bounds}
        maxNativeZoom={finestTileZoom(bounds, scene.height ?? 1)}
        opacity={opacity}
        zIndex={2}
      />
      <AreaOutline geometry={studyArea} label="Study area" />
      <PressMap onPress={(pressed) => onPress(pressed)} />
      {place && <PlaceMarker place={{ lon: unwrapLongitude(place.lon, scene.bounds), lat: place.lat }} mark="probe" />}
    </BaseMap>
  );
}
