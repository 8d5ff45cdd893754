import { latLngBounds } from 'leaflet';
import { useEffect } from 'react';
import { useMap } from 'react-leaflet';
import { type Bounds, toLatLngBounds } from './base-map.tsx';

export interface ZoomTarget {
  bounds: Bounds;
  /** `fit` fills the view with it; `show` moves only when it is out of sight and keeps the zoom. */
  kind: 'fit' | 'show';
  /** Another number goes there again. */
  turn: number;
}

const CLOSEST_ZOOM = 15;
const ROOM_PIXELS = 60;
/** Room left free at the foot for the strip of tools. */
const FOOT_PIXELS = 190;
const SETTLING_MS = 600;

/** Takes the map to a place, clear of the strip at its foot. */
export function ZoomTo({ target }: { target: ZoomTarget | null }) {
  const map = useMap();
  useEffect(() => {
    if (!target) return undefined;
    const go = () => {
      const bounds = toLatLngBounds(target.bounds);
      const size = map.getSize();
      const free = latLngBounds(
        map.containerPointToLatLng([ROOM_PIXELS / 2, size.y - FOOT_PIXELS]),
        map.containerPointToLatLng([size.x - ROOM_PIXELS / 2, ROOM_PIXELS]),
      );
      if (target.kind === 'show' && free.contains(bounds)) return;
      map.fitBounds(bounds, {
        paddingTopLeft: [ROOM_PIXELS, ROOM_PIXELS],
        paddingBottomRight: [ROOM_PIXELS, FOOT_PIXELS],
        maxZoom: target.kind === 'fit' ? CLOSEST_ZOOM : map.getZoom(),
        animate: false,
      });
    };
    const frame = requestAnimationFrame(go);
    // A slip or list that opens with the selection takes its room a little later.
    map.on('resize', go);
    const settled = setTimeout(() => map.off('resize', go), SETTLING_MS);
    return () => {
      cancelAnimationFrame(frame);
      clearTimeout(settled);
      map.off('resize', go);
    };
  }, [target, map]);
  return null;
}
