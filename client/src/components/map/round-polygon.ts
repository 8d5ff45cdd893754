import type { Position as GeoPosition } from 'geojson';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';

/** About a centimetre on the ground: far below any pixel, and within what drawing accepts. */
const DECIMALS = 7;

/** An outline as it is kept: closed rings of [longitude, latitude] rounded to seven decimals, longitudes within ±180. */
export function roundPolygon(rings: readonly (readonly GeoPosition[])[]): Polygon {
  return {
    type: 'Polygon',
    coordinates: rings.map((ring) => ring.map(([lon = 0, lat = 0]): [number, number] => [round(lon), round(lat)])),
  };
}

function round(degrees: number): number {
  return Number(degrees.toFixed(DECIMALS));
}
