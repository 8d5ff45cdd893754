import { geoJSON } from 'leaflet';
import { useEffect } from 'react';
import { useMap } from 'react-leaflet';
import type { ArealGeometry } from '../../../../shared/contracts/geometry.ts';

/** A dotted outline that takes no presses: the study area, a footprint. */
export function AreaOutline({ geometry, label }: { geometry: ArealGeometry | null; label?: string }) {
  const map = useMap();
  useEffect(() => {
    if (!geometry) return undefined;
    const ground = { interactive: false, fill: false } as const;
    // Dark below light: it is seen on snow as well as on water.
    const dark = geoJSON(geometry, { style: { ...ground, color: '#1e2a26', weight: 4, opacity: 0.45 } });
    const light = geoJSON(geometry, { style: { ...ground, color: '#fffdf8', weight: 2, dashArray: '2 6' } });
    if (label) light.bindTooltip(label, { className: 'map-note' });
    dark.addTo(map);
    light.addTo(map);
    return () => {
      dark.remove();
      light.remove();
    };
  }, [geometry, label, map]);
  return null;
}
