import type { Feature, FeatureCollection, MultiPolygon, Polygon } from 'geojson';
import { type GeoJSON as GeoJsonLayer, type Path, type PathOptions, canvas, geoJSON } from 'leaflet';
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
  /** Drawn by somebody else for now (the one being edited). */
  hiddenId?: string | null;
  onSelect?: (id: string) => void;
  fillOpacity?: number;
}

/** Read-only polygons on one canvas, thousands of them; the selected one is gold over ink. */
export function CanvasPolygons({
  polygons,
  selectedId = null,
  hiddenId = null,
  onSelect,
  fillOpacity = 0.28,
}: CanvasPolygonsProps) {
  const map = useMap();
  const select = useRef(onSelect);
  useEffect(() => {
    select.current = onSelect;
  });

  useEffect(() => {
    const renderer = canvas({ padding: 0.3, tolerance: 3 });
    const shown = polygons.features.filter((feature) => feature.properties.id !== hiddenId);
    const layer: GeoJsonLayer<PolygonProperties, Polygon | MultiPolygon> = geoJSON<
      PolygonProperties,
      Polygon | MultiPolygon
    >({ ...polygons, features: shown } as PolygonCollection, {
      // The canvas renderer is read from each path's own options.
      style: (feature) => ({ ...restingStyle(feature?.properties, fillOpacity), renderer }) as PathOptions,
      onEachFeature: (feature, path) => {
        path.on('click', (event) => {
          event.originalEvent.stopPropagation();
          select.current?.(feature.properties.id);
        });
        if (feature.properties.label)
          path.bindTooltip(feature.properties.label, { sticky: true, className: 'map-note' });
      },
    }).addTo(map);
    const chosen = shown.filter((feature) => feature.properties.id === selectedId);
    const outline = chosen.map((feature) => selectionOutline(feature, renderer).addTo(map));
    return () => {
      for (const part of outline) part.remove();
      layer.remove();
      renderer.remove();
    };
  }, [polygons, hiddenId, selectedId, fillOpacity, map]);

  return null;
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
function selectionOutline(feature: PolygonFeature, renderer: Path['options']['renderer']): GeoJsonLayer {
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
