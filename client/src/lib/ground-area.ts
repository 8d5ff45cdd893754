import type { ArealGeometry, Position } from '../../../shared/contracts/geometry.ts';

/** WGS 84: equatorial radius in metres and squared eccentricity (NIMA TR8350.2). */
const A = 6_378_137;
const E2 = (1 / 298.257223563) * (2 - 1 / 298.257223563);
const E = Math.sqrt(E2);
const DEG = Math.PI / 180;

/**
 * Area on the ellipsoid in hectares of polygons of longitudes and latitudes, holes taken off, edges straight in
 * longitude and latitude (RFC 7946). For figures on the screen: within 1e-6 for sides up to a degree.
 *
 * Source: Snyder 1987, USGS PP 1395, eq. 3-12 (authalic q); each edge by Simpson's rule.
 */
export function groundAreaHa(geometry: ArealGeometry): number {
  const polygons = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates;
  let areaM2 = 0;
  for (const rings of polygons) {
    rings.forEach((ring, index) => {
      areaM2 += (index === 0 ? 1 : -1) * ringAreaM2(ring);
    });
  }
  return areaM2 / 10_000;
}

function ringAreaM2(ring: readonly Position[]): number {
  let sum = 0;
  for (let i = 1; i < ring.length; i++) {
    const [lon0, lat0] = ring[i - 1] ?? [0, 0];
    const [lon1, lat1] = ring[i] ?? [0, 0];
    const turnDeg = ((((lon1 - lon0 + 180) % 360) + 360) % 360) - 180;
    const mean = (authalicQ(lat0) + 4 * authalicQ((lat0 + lat1) / 2) + authalicQ(lat1)) / 6;
    sum += turnDeg * DEG * mean;
  }
  return Math.abs((A * A * sum) / 2);
}

/** Snyder's q: the zone between the equator and a latitude has the area π a² q. */
function authalicQ(latitudeDeg: number): number {
  const sine = Math.sin(latitudeDeg * DEG);
  return (1 - E2) * (sine / (1 - E2 * sine * sine) + Math.atanh(E * sine) / E);
}
