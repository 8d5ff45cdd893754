import { type FitBoundsOptions, type Map as LeafletMap, type LatLngBoundsExpression, CRS } from 'leaflet';
import { type ReactNode, useEffect, useRef } from 'react';
import { MapContainer, ScaleControl, ZoomControl, useMap } from 'react-leaflet';
import { CoordinateReadout } from './coordinate-readout.tsx';

/** [west, south, east, north] in degrees. */
export type Bounds = readonly [number, number, number, number];

export interface BaseMapProps {
  /** What the map shows, read out: "Scene of 4 Sept 2025 with samples". */
  label: string;
  /** First view; a change moves the map there. */
  bounds: Bounds;
  /** Added after the coordinates at the top right: "30 m pixels". */
  readoutNote?: ReactNode;
  maxZoom?: number;
  /** The Leaflet map, once it stands. */
  onReady?: (map: LeafletMap) => void;
  children?: ReactNode;
}

/** What floats over the map: the readout at the top, the strip at the foot. */
const FREE_ROOM = { paddingTopLeft: [12, 12], paddingBottomRight: [12, 150] } satisfies FitBoundsOptions;

/** A map without a base map: deep ground, zoom at the bottom right, scale in metres, coordinates at the top right. */
export function BaseMap({ label, bounds, readoutNote, maxZoom = 18, onReady, children }: BaseMapProps) {
  return (
    <MapContainer
      crs={CRS.EPSG3857}
      bounds={toLatLngBounds(bounds)}
      boundsOptions={FREE_ROOM}
      maxZoom={maxZoom}
      minZoom={3}
      zoomControl={false}
      attributionControl={false}
      keyboard
      // Leaflet's zoom steps would blur pixels between levels; a still map is also what reduced motion asks for.
      zoomAnimation={false}
      fadeAnimation={false}
      markerZoomAnimation={false}
      inertia={!prefersLessMotion()}
      className="size-full"
    >
      <MapName label={label} />
      <FollowBounds bounds={bounds} />
      <FollowSize />
      {onReady && <TellReady onReady={onReady} />}
      <ZoomControl position="bottomright" zoomInTitle="Closer (+)" zoomOutTitle="Farther (−)" />
      <ScaleControl position="bottomright" metric imperial={false} maxWidth={140} />
      <CoordinateReadout note={readoutNote} />
      {children}
    </MapContainer>
  );
}

/** Leaflet's bounds of [west, south, east, north]. */
export function toLatLngBounds([west, south, east, north]: Bounds): LatLngBoundsExpression {
  return [
    [south, west],
    [north, east],
  ];
}

function prefersLessMotion(): boolean {
  return window.matchMedia('(prefers-reduced-motion: reduce)').matches;
}

function MapName({ label }: { label: string }) {
  const map = useMap();
  useEffect(() => {
    const container = map.getContainer();
    container.setAttribute('role', 'application');
    container.setAttribute('aria-roledescription', 'map');
    container.setAttribute('aria-label', `${label}. Arrow keys move, plus and minus zoom.`);
    // Leaflet focuses itself on a press, which browsers take for the keyboard: the ring is for keys alone.
    const hideRing = () => container.setAttribute('data-pressed', '');
    const showRing = () => container.removeAttribute('data-pressed');
    container.addEventListener('pointerdown', hideRing, { capture: true });
    container.addEventListener('keydown', showRing);
    container.addEventListener('blur', showRing);
    return () => {
      container.removeEventListener('pointerdown', hideRing, { capture: true });
      container.removeEventListener('keydown', showRing);
      container.removeEventListener('blur', showRing);
    };
  }, [label, map]);
  return null;
}

function FollowBounds({ bounds }: { bounds: Bounds }) {
  const map = useMap();
  const key = bounds.join(' ');
  useEffect(() => {
    const [west, south, east, north] = key.split(' ').map(Number) as [number, number, number, number];
    map.fitBounds(toLatLngBounds([west, south, east, north]), FREE_ROOM);
  }, [key, map]);
  return null;
}

/** Keeps the map's idea of its size when a slip opens or the window changes; the view's corner stays put. */
function FollowSize() {
  const map = useMap();
  useEffect(() => {
    if (typeof ResizeObserver === 'undefined') return undefined;
    const observer = new ResizeObserver(() => map.invalidateSize({ pan: false, animate: false }));
    observer.observe(map.getContainer());
    return () => observer.disconnect();
  }, [map]);
  return null;
}

function TellReady({ onReady }: { onReady: (map: LeafletMap) => void }) {
  const map = useMap();
  // A parent's new function is no new map: only the first map is told.
  const tell = useRef(onReady);
  useEffect(() => {
    map.whenReady(() => tell.current(map));
  }, [map]);
  return null;
}
