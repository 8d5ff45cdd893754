import { useMapEvents } from 'react-leaflet';
import type { Place } from '../../lib/project/probe-query.ts';

export interface PressMapProps {
  /** A press on the map's ground (not on a polygon), with the keys held. */
  onPress: (place: Place, event: MouseEvent) => void;
}

/** Tells where the map is pressed: for inspecting a pixel. */
export function PressMap({ onPress }: PressMapProps) {
  useMapEvents({
    click: (event) => onPress({ lon: event.latlng.wrap().lng, lat: event.latlng.lat }, event.originalEvent),
  });
  return null;
}
