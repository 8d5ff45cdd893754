import { CRS, geoJSON, svg, type PathOptions } from 'leaflet';
import { useEffect } from 'react';
import { MapContainer, useMap } from 'react-leaflet';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import type { BandLimits, SceneView } from '../../lib/scene-view.ts';
import { SceneLayer } from './scene-layer.tsx';

export interface ContextMapProps {
  /** Read out: "Natural colour, Late summer". */
  label: string;
  scene: Scene;
  view: SceneView;
  /** Stretch limits that stand above those of the view. */
  limits?: BandLimits | undefined;
  centre: Place;
  zoom: number;
  /** The innermost first, drawn strongest. */
  outlines: readonly Polygon[];
}

/** A still view of a place: one scene in one composite, with outlines of the pixel and what is around it. */
export function ContextMap({ label, scene, view, limits, centre, zoom, outlines }: ContextMapProps) {
  return (
    <div role="img" aria-label={label} className="size-full">
      <MapContainer
        crs={CRS.EPSG3857}
        center={[centre.lat, centre.lon]}
        zoom={zoom}
        maxZoom={20}
        zoomControl={false}
        attributionControl={false}
        keyboard={false}
        dragging={false}
        scrollWheelZoom={false}
        doubleClickZoom={false}
        boxZoom={false}
        touchZoom={false}
        zoomAnimation={false}
        fadeAnimation={false}
        className="size-full"
      >
        <SceneLayer scene={scene} view={view} limits={limits} />
        <Outlines outlines={outlines} />
        <FollowView centre={centre} zoom={zoom} />
      </MapContainer>
    </div>
  );
}

function FollowView({ centre: { lon, lat }, zoom }: { centre: Place; zoom: number }) {
  const map = useMap();
  useEffect(() => {
    // The picture is described by its frame; a still map is no stop for the keyboard.
    map.getContainer().removeAttribute('tabindex');
    if (typeof ResizeObserver === 'undefined') return undefined;
    const observer = new ResizeObserver(() => {
      map.invalidateSize({ pan: false, animate: false });
      map.setView([lat, lon], zoom, { animate: false });
    });
    observer.observe(map.getContainer());
    return () => observer.disconnect();
  }, [map, lon, lat, zoom]);
  useEffect(() => {
    map.setView([lat, lon], zoom, { animate: false });
  }, [map, lon, lat, zoom]);
  return null;
}

const STYLES: readonly PathOptions[] = [
  { color: '#f2b705', weight: 2.5 },
  { color: '#fffdf8', weight: 1.5 },
  { color: '#fffdf8', weight: 1.5, dashArray: '2 5' },
];

function Outlines({ outlines }: { outlines: readonly Polygon[] }) {
  const map = useMap();
  useEffect(() => {
    const renderer = svg();
    const layers = outlines.flatMap((geometry, place) =>
      // Dark below light: seen on snow as well as on water.
      [{ color: '#1e2a26', weight: 4, opacity: 0.5 }, STYLES[Math.min(place, STYLES.length - 1)]].map((style) =>
        geoJSON(geometry, { interactive: false, style: { fill: false, renderer, ...style } as PathOptions }).addTo(map),
      ),
    );
    return () => {
      for (const layer of layers) layer.remove();
      renderer.remove();
    };
  }, [map, outlines]);
  return null;
}
