import type { LatLng } from 'leaflet';
import { type ReactNode, useState } from 'react';
import { useMap, useMapEvents } from 'react-leaflet';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { formatNumber } from '../../lib/format.ts';

/** CSS pixels are 0.28 mm by the OGC's rendering pixel (WMTS, OGC 07-057r7, section 6.1). */
const PIXEL_METERS = 0.000_28;
const EQUATOR_METERS = 40_075_016.686;

/** Where the pointer is (or the middle of the map, for the keyboard), and the scale there. */
export function CoordinateReadout({ note }: { note?: ReactNode }) {
  const map = useMap();
  const [pointer, setPointer] = useState<LatLng | null>(null);
  const [view, setView] = useState(() => ({ center: map.getCenter(), zoom: map.getZoom() }));
  useMapEvents({
    mousemove: (event) => setPointer(event.latlng),
    mouseout: () => setPointer(null),
    moveend: () => setView({ center: map.getCenter(), zoom: map.getZoom() }),
  });
  const place = pointer ?? view.center;
  return (
    <div className="map-note pointer-events-none absolute top-3.5 right-3 z-[1000]">
      <span className="font-medium text-ink">{formatCoordinates(place.lat, place.lng)}</span>
      {note && <> · {note}</>} · 1 : {formatNumber(scaleDenominator(place.lat, view.zoom))}
    </div>
  );
}

/** The map scale's denominator in web Mercator at a latitude and zoom, to two leading digits. */
export function scaleDenominator(latitudeDeg: number, zoom: number): number {
  const metersPerPixel = (EQUATOR_METERS * Math.cos((latitudeDeg * Math.PI) / 180)) / (256 * 2 ** zoom);
  const exact = metersPerPixel / PIXEL_METERS;
  const step = 10 ** Math.max(0, Math.floor(Math.log10(exact)) - 1);
  return Math.round(exact / step) * step;
}
