import { type PathOptions, geoJSON, svg, tooltip } from 'leaflet';
import { useEffect } from 'react';
import { useMap } from 'react-leaflet';
import type { ArealGeometry } from '../../../../shared/contracts/geometry.ts';

export interface AreaOutlineProps {
  geometry: ArealGeometry | null;
  /** Stands over the outline's north for as long as it is there. */
  label?: string;
}

/** A dotted outline that takes no presses: the study area, a footprint, an earlier version. */
export function AreaOutline({ geometry, label }: AreaOutlineProps) {
  const map = useMap();
  useEffect(() => {
    if (!geometry) return undefined;
    // Of SVG: a second canvas would lie over the polygons' and take their presses.
    const renderer = svg();
    const line = (style: PathOptions) =>
      geoJSON(geometry, {
        interactive: false,
        style: { fill: false, renderer, ...style } as PathOptions,
      });
    // Dark below light: it is seen on snow as well as on water.
    const dark = line({ color: '#1e2a26', weight: 4, opacity: 0.45 }).addTo(map);
    const light = line({ color: '#fffdf8', weight: 2, dashArray: '2 6' });
    light.addTo(map);
    const bounds = light.getBounds();
    const name = label && tooltip({ permanent: true, direction: 'top', className: 'map-note' });
    if (name) name.setContent(label).setLatLng([bounds.getNorth(), bounds.getCenter().lng]).addTo(map);
    return () => {
      if (name) name.remove();
      dark.remove();
      light.remove();
      renderer.remove();
    };
  }, [geometry, label, map]);
  return null;
}
