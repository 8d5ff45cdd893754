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
import { SwipePane } from '../../components/map/swipe-pane.tsx';
import { formatGsd } from './band-choice.ts';
import type { ShownLayer, SwipeChoice } from './map-choice.ts';

interface ClassMapProps {
  run: Run;
  scene: Scene & { bounds: Bounds };
  view: SceneView;
  /** 0 shows the scene alone, 1 the class map alone. */
  opacity: number;
  layer: ShownLayer;
  /** Codes of classes that are not shown. */
  hiddenCodes: readonly number[];
  /** What shows right of the divider. */
  swipe: SwipeChoice;
  /** Share of the width left of the divider. */
  share: number;
  studyArea: ArealGeometry | null;
  place: Place | null;
  onPress: (place: Place) => void;
  onReady: (map: LeafletMap) => void;
}

/** The class map over its scene; a press asks for the pixel there. */
export function ClassMap({ run, scene, view, opacity, studyArea, place, onPress, onReady, ...shown }: ClassMapProps) {
  const { layer, hiddenCodes, swipe, share } = shown;
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
        url={tileUrl(run.id, layer, hiddenCodes, run.classMapSha256)}
        bounds={bounds}
        maxNativeZoom={finestTileZoom(bounds, scene.height ?? 1)}
        opacity={opacity}
        zIndex={2}
      />
      {swipe !== 'none' && (
        <SwipePane share={share}>
          <SceneLayer scene={scene} view={view} />
          {swipe !== 'scene' && (
            <SceneTileLayer
              url={tileUrl(swipe, 'classes', [])}
              bounds={bounds}
              maxNativeZoom={finestTileZoom(bounds, scene.height ?? 1)}
              opacity={opacity}
              zIndex={2}
            />
          )}
        </SwipePane>
      )}
      <AreaOutline geometry={studyArea} label="Study area" />
      <PressMap onPress={(pressed) => onPress(pressed)} />
      {place && <PlaceMarker place={{ lon: unwrapLongitude(place.lon, scene.bounds), lat: place.lat }} mark="probe" />}
    </BaseMap>
  );
}

function tileUrl(runId: string, layer: ShownLayer, hiddenCodes: readonly number[], version?: string | null): string {
  if (layer !== 'classes') return `${API_BASE}/runs/${runId}/layers/${layer}/tiles/{z}/{x}/{y}.webp`;
  // Steps applied later change the map: the address names the one that is meant.
  const query = [version ? `v=${version}` : '', hiddenCodes.length > 0 ? `hide=${hiddenCodes.join(',')}` : ''];
  return `${API_BASE}/runs/${runId}/tiles/{z}/{x}/{y}.webp?${query.filter(Boolean).join('&')}`;
}
