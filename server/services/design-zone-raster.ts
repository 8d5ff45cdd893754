import { rasteriseMultiPolygon } from '../analysis/sampling/rasterise-polygon.ts';
import type { Zone } from '../entities/zone-layer.ts';
import { InvalidInput } from '../errors.ts';
import { toPixelPolygon } from '../raster/pixel-polygon.ts';
import { getSceneGeometry } from '../raster/tile-geometry.ts';
import type { PlacedScene } from './run-scene.ts';

/**
 * The zone of each pixel of a scene by its centre, row-major: 1 and up in the layer's order, 0 outside all of them. Where
 * zones overlap, the first one has the pixel.
 * @throws InvalidInput when no zone reaches the scene
 */
export function rasteriseZones({ grid, proj4 }: PlacedScene, zones: readonly Zone[]): Uint16Array {
  const geometry = getSceneGeometry(grid, proj4);
  const zoneOf = new Uint16Array(grid.width * grid.height);
  let nHeld = 0;
  zones.forEach(({ polygons }, place) => {
    const drawn = polygons.flatMap((polygon) => {
      const rings = toPixelPolygon(polygon, geometry);
      return rings ? [rings] : [];
    });
    if (drawn.length === 0) return;
    for (const pixel of rasteriseMultiPolygon(drawn, grid.width, grid.height)) {
      if (zoneOf[pixel] !== 0) continue;
      zoneOf[pixel] = place + 1;
      nHeld++;
    }
  });
  if (nHeld === 0) {
    throw new InvalidInput('The zones do not reach this map.', {
      found: 'no pixel of the map lies in a zone',
      wanted: 'zones over the map',
      errors: [{ path: 'strata.layerId', message: 'None of its zones lies on this map.' }],
    });
  }
  return zoneOf;
}
