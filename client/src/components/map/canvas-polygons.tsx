import type { Feature, FeatureCollection, MultiPolygon, Polygon } from 'geojson';
import { DomEvent, type Canvas, type GeoJSON as GeoJsonLayer, type PathOptions, canvas, geoJSON } from 'leaflet';
import { useEffect, useRef } from 'react';
import { useMap } from 'react-leaflet';

export interface PolygonProperties {
  id: string;
  /** Class colour, #rrggbb. */
  colour: string;
  /** Said at the pointer: "Saltmarsh, sample 214". */
  label?: string;
  /** Dashes the outline: a draft, or one held out. */
  isDashed?: boolean;
}

export type PolygonCollection = FeatureCollection<Polygon | MultiPolygon, PolygonProperties>;
type PolygonFeature = Feature<Polygon | MultiPolygon, PolygonProperties>;

export interface CanvasPolygonsProps {
  polygons: PolygonCollection;
  selectedId?: string | null;
  /** Marked as the selected one is: several at once. */
  highlightedIds?: readonly string[];
  /** Drawn by somebody else for now (the one being edited). */
  hiddenId?: string | null;
  /** Without it the polygons are still: presses and the pointer go to what lies below. */
  onSelect?: ((id: string) => void) | undefined;
  fillOpacity?: number;
}

const NONE: readonly string[] = [];

/** Read-only polygons on one canvas, thousands of them; the selected one is gold over ink. */
export function CanvasPolygons({
  polygons,
  selectedId = null,
  highlightedIds = NONE,
  hiddenId = null,
  onSelect,
  fillOpacity = 0.28,
}: CanvasPolygonsProps) {
  const map = useMap();
  const select = useRef(onSelect);
  const renderer = useRef<Canvas>(undefined);
  const isStill = !onSelect;
  useEffect(() => {
    select.current = onSelect;
  });

  useEffect(() => {
    const drawn = canvas({ padding: 0.3, tolerance: 3 }).addTo(map);
    // The canvas itself would otherwise still be what the pointer meets.
    const ground = drawn.getPane()?.lastElementChild;
    if (isStill && ground instanceof HTMLCanvasElement) ground.style.pointerEvents = 'none';
    renderer.current = drawn;
    const layer: GeoJsonLayer<PolygonProperties, Polygon | MultiPolygon> = geoJSON<
      PolygonProperties,
      Polygon | MultiPolygon
    >(visible(polygons, hiddenId), {
      interactive: !isStill,
      // The canvas renderer is read from each path's own options.
      style: (feature) => ({ ...restingStyle(feature?.properties, fillOpacity), renderer: drawn }) as PathOptions,
      onEachFeature: (feature, path) => {
        if (isStill) return;
        path.on('click', (event) => {
          // Or the map's own press, on the ground below, would follow.
          DomEvent.stopPropagation(event);
          select.current?.(feature.properties.id);
        });
        if (feature.properties.label)
          path.bindTooltip(feature.properties.label, { sticky: true, className: 'map-note' });
      },
    }).addTo(map);
    return () => {
      layer.remove();
      drawn.remove();
      renderer.current = undefined;
    };
  }, [polygons, hiddenId, fillOpacity, isStill, map]);

  const marked = [...highlightedIds, selectedId].filter((id) => id !== null).join(' ');
  useEffect(() => {
    const ids = new Set(marked.split(' '));
    const outlines = visible(polygons, hiddenId)
      .features.filter((feature) => ids.has(feature.properties.id))
      .map((feature) => selectionOutline(feature, renderer.current).addTo(map));
    return () => {
      for (const outline of outlines) outline.remove();
    };
    // Drawn again whenever the polygons are, to stay above them.
  }, [marked, polygons, hiddenId, fillOpacity, isStill, map]);

  return null;
}

function visible(polygons: PolygonCollection, hiddenId: string | null): PolygonCollection {
  if (hiddenId === null) return polygons;
  return { ...polygons, features: polygons.features.filter((feature) => feature.properties.id !== hiddenId) };
}

function restingStyle(properties: PolygonProperties | undefined, fillOpacity: number): PathOptions {
  const colour = properties?.colour ?? '#ffffff';
  return {
    color: colour,
    weight: 2,
    opacity: 1,
    fillColor: colour,
    fillOpacity,
    ...(properties?.isDashed && { dashArray: '5 4' }),
  };
}

/** Ink below, gold above, the class's colour stronger inside: not by colour alone, the line is also twice as wide. */
function selectionOutline(feature: PolygonFeature, renderer: Canvas | undefined): GeoJsonLayer {
  const group = geoJSON(feature, {
    interactive: false,
    style: {
      color: '#1e2a26',
      weight: 6,
      opacity: 1,
      fillColor: feature.properties.colour,
      fillOpacity: 0.3,
      renderer,
    } as PathOptions,
  });
  const gold = geoJSON(feature, {
    interactive: false,
    style: { color: '#f2b705', weight: 3, opacity: 1, fill: false, renderer } as PathOptions,
  });
  for (const path of gold.getLayers()) group.addLayer(path);
  return group;
}
