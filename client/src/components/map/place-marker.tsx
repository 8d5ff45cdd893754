import { divIcon, marker } from 'leaflet';
import { useEffect } from 'react';
import { useMap } from 'react-leaflet';
import type { Place } from '../../lib/project/probe-query.ts';

/** `probe` is the pixel looked at, `fault` the place where a drawing cannot stand. */
export type PlaceMark = 'probe' | 'fault';

/** A mark at a place; it takes no presses. */
export function PlaceMarker({ place, mark, label }: { place: Place; mark: PlaceMark; label?: string }) {
  const map = useMap();
  const { lon, lat } = place;
  useEffect(() => {
    const icon = divIcon({ className: `place-mark place-mark-${mark}`, iconSize: [26, 26] });
    const pin = marker([lat, lon], { icon, interactive: false, keyboard: false });
    if (label) pin.bindTooltip(label, { permanent: true, direction: 'right', offset: [12, 0], className: 'map-note' });
    pin.addTo(map);
    return () => {
      pin.remove();
    };
  }, [lon, lat, mark, label, map]);
  return null;
}
