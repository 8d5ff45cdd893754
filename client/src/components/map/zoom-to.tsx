import type { Map as LeafletMap } from 'leaflet';
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

/** How far a stretch from `low` to `high` must move to lie between `first` and `last`; null when it is longer than that. */
function shiftInto(low: number, high: number, first: number, last: number): number | null {
  if (high - low > last - first) return null;
  return low < first ? low - first : high > last ? high - last : 0;
}

/** Moves the map only as far as the place needs to come into sight; false when it is too large for the view. */
function bringIntoSight(map: LeafletMap, [west, south, east, north]: Bounds): boolean {
  const size = map.getSize();
  const topLeft = map.latLngToContainerPoint([north, west]);
  const bottomRight = map.latLngToContainerPoint([south, east]);
  const dx = shiftInto(topLeft.x, bottomRight.x, ROOM_PIXELS / 2, size.x - ROOM_PIXELS / 2);
  const dy = shiftInto(topLeft.y, bottomRight.y, ROOM_PIXELS, size.y - FOOT_PIXELS);
  if (dx === null || dy === null) return false;
  if (dx !== 0 || dy !== 0) map.panBy([dx, dy], { animate: false });
  return true;
}

/** Takes the map to a place, clear of the strip at its foot. */
export function ZoomTo({ target }: { target: ZoomTarget | null }) {
  const map = useMap();
  useEffect(() => {
    if (!target) return undefined;
    const go = () => {
      const bounds = toLatLngBounds(target.bounds);
      if (target.kind === 'show' && bringIntoSight(map, target.bounds)) return;
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
