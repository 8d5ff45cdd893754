import type { MultiPolygon, Polygon, Ring } from './polygon.ts';

/**
 * How two positions are joined: `lon-lat` is a straight line in longitude and latitude, as GeoJSON has it (RFC 7946,
 * section 3.1.1); `geodesic` is the shortest line on the ellipsoid. For sides of a kilometre the areas agree to
 * better than 1e-4.
 */
export type EdgeKind = 'lon-lat' | 'geodesic';

/** WGS 84: equatorial radius in metres and flattening. Source: NIMA TR8350.2. */
const A = 6378137;
const F = 1 / 298.257223563;
const E2 = F * (2 - F);
const E = Math.sqrt(E2);
const DEGREE = Math.PI / 180;
const Q_POLE = authalicQ(1);
const HALF_ELLIPSOID_M2 = Math.PI * A * A * Q_POLE;
const { nodes, weights } = gaussLegendre(8);

/**
 * Area of a polygon of longitudes and latitudes (degrees, WGS 84) on the ellipsoid, in m²; holes are taken off.
 *
 * Rings are closed and may run either way, cross the antimeridian, or go round a pole (then the cap on the side of the
 * nearer pole is meant). Relative accuracy is better than 1e-9 for both kinds of edge (1e-6 for a single pixel, where
 * doubles of degrees run out of digits).
 * Source: Snyder 1987, USGS PP 1395, eq. 3-12 (authalic q); Karney 2013, Journal of Geodesy 87:43–55, for geodesic
 * edges: area under the edge as a spherical excess and a smooth remainder, here integrated by Gauss–Legendre
 * quadrature.
 * @throws RangeError when a position is out of range or a geodesic edge joins nearly opposite points.
 */
export function ellipsoidalPolygonAreaM2(polygon: Polygon, edges: EdgeKind = 'lon-lat'): number {
  return polygon.reduce((area, ring, r) => area + (r === 0 ? 1 : -1) * ringAreaM2(ring, edges), 0);
}

/** Sum of the areas of polygons that do not overlap, in m². @throws RangeError as `ellipsoidalPolygonAreaM2` does. */
export function ellipsoidalMultiPolygonAreaM2(polygons: MultiPolygon, edges: EdgeKind = 'lon-lat'): number {
  return polygons.reduce((area, polygon) => area + ellipsoidalPolygonAreaM2(polygon, edges), 0);
}

/**
 * True area in m² of a pixel of a projected grid, from its four corners in longitude and latitude (degrees, in ring
 * order). A 10 m pixel of a UTM grid is not 100 m²: the two differ by the square of the scale factor.
 */
export function truePixelAreaM2(corners: readonly (readonly [number, number])[]): number {
  return ringAreaM2([...corners, corners[0]], 'geodesic');
}

function ringAreaM2(ring: Ring, edges: EdgeKind): number {
  let area = 0;
  let turn = 0;
  for (let i = 0; i + 1 < ring.length; i++) {
    const [lon0, lat0] = ring[i];
    const [lon1, lat1] = ring[i + 1];
    if (!(Math.abs(lat0) <= 90 && Number.isFinite(lon0))) {
      throw new RangeError(`Position ${i} is ${lon0}, ${lat0}: not a longitude and latitude in degrees.`);
    }
    const dLon = wrapDegrees(lon1 - lon0);
    turn += dLon;
    area += edges === 'geodesic' ? underGeodesic(lat0, lat1, dLon) : underStraightLine(lat0, lat1, dLon);
  }
  const goesRoundPole = Math.abs(turn) > 180;
  return goesRoundPole ? HALF_ELLIPSOID_M2 - Math.abs(area) : Math.abs(area);
}

/** Signed area between the equator and an edge straight in longitude and latitude: ∫ a²q(φ)/2 dλ. */
function underStraightLine(lat0: number, lat1: number, dLon: number): number {
  const mean = integrate(0, 1, Math.abs(lat1 - lat0) * DEGREE, (t) =>
    authalicQ(Math.sin((lat0 + t * (lat1 - lat0)) * DEGREE)),
  );
  return (A * A * mean * dLon * DEGREE) / 2;
}

/** Signed area between the equator and a geodesic. */
function underGeodesic(lat0: number, lat1: number, dLon: number): number {
  const b0 = Math.atan((1 - F) * Math.tan(lat0 * DEGREE));
  const b1 = Math.atan((1 - F) * Math.tan(lat1 * DEGREE));
  const [sin0, cos0, sin1, cos1] = [Math.sin(b0), Math.cos(b0), Math.sin(b1), Math.cos(b1)];

  // Longitude difference ω on the auxiliary sphere: ω − L is small and depends on ω only weakly, so it is iterated.
  const lon = dLon * DEGREE;
  let omega = lon;
  for (let round = 0; ; round++) {
    const [sinW, cosW] = [Math.sin(omega), Math.cos(omega)];
    const east = cos1 * sinW;
    const north = cos0 * sin1 - sin0 * cos1 * cosW;
    const arc = Math.atan2(Math.hypot(east, north), sin0 * sin1 + cos0 * cos1 * cosW);
    const azimuth = Math.atan2(east, north);
    const sinA0 = Math.sin(azimuth) * cos0;
    const cosA0Squared = 1 - sinA0 * sinA0;
    const start = Math.atan2(sin0, cos0 * Math.cos(azimuth));
    const sinBeta = (sigma: number): number => Math.sqrt(cosA0Squared) * Math.sin(sigma);

    const shift =
      sinA0 * integrate(start, start + arc, arc, (s) => E2 / (1 + Math.sqrt(1 - E2 * (1 - sinBeta(s) ** 2))));
    const better = lon + shift;
    const change = Math.abs(better - omega);
    omega = better;
    // Each round shrinks the error some three hundredfold, except between nearly opposite points.
    if (round === 50) throw new RangeError(`No unique geodesic over ${dLon}° from latitude ${lat0} to ${lat1}.`);
    // Relative to ω: for a pixel ω itself is only some 1e-6, and the areas under its sides nearly cancel.
    if (change > 1e-15 * Math.abs(omega)) continue;
    const [t0, t1] = [Math.tan(b0 / 2), Math.tan(b1 / 2)];
    const excess = 2 * Math.atan((Math.tan(omega / 2) * (t0 + t1)) / (1 + t0 * t1));
    const rest = sinA0 * integrate(start, start + arc, arc, (s) => beyondSphere(sinBeta(s)));
    return A * A * ((Q_POLE / 2) * excess + rest);
  }
}

/** What the ellipsoid adds to the spherical excess at reduced latitude β; smooth up to the pole. */
function beyondSphere(sinBeta: number): number {
  // At the pole itself this is 0/0; the function is flat there, so it is taken a little way off.
  const cosSquared = Math.max(1 - sinBeta * sinBeta, 1e-7);
  const sine = Math.sign(sinBeta) * Math.sqrt(1 - cosSquared);
  const sinLat = sine / Math.sqrt(1 - E2 * cosSquared);
  return ((authalicQ(sinLat) / 2) * Math.sqrt(1 - E2 * cosSquared) - (Q_POLE / 2) * sine) / cosSquared;
}

/** Snyder's q: the zone between equator and latitude φ has the area π a² q(φ). */
function authalicQ(sinLat: number): number {
  return (1 - E2) * (sinLat / (1 - E2 * sinLat * sinLat) + Math.atanh(E * sinLat) / E);
}

/** Integral from `from` to `to`, cut so that no piece spans more than two degrees of `span` (radians). */
function integrate(from: number, to: number, span: number, f: (x: number) => number): number {
  const nPieces = Math.max(1, Math.ceil(span / (2 * DEGREE)));
  const half = (to - from) / nPieces / 2;
  let sum = 0;
  for (let piece = 0; piece < nPieces; piece++) {
    const middle = from + (2 * piece + 1) * half;
    for (let i = 0; i < nodes.length; i++) sum += weights[i] * f(middle + half * nodes[i]);
  }
  return sum * half;
}

function wrapDegrees(difference: number): number {
  const wrapped = difference % 360;
  return wrapped > 180 ? wrapped - 360 : wrapped < -180 ? wrapped + 360 : wrapped;
}

/** Nodes and weights on −1..1, by Newton's method on the Legendre polynomial (Abramowitz & Stegun 1964, 25.4.29). */
function gaussLegendre(n: number): { nodes: Float64Array; weights: Float64Array } {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    for (let round = 0; round < 8; round++) {
      let [previous, current] = [1, x];
      for (let k = 2; k <= n; k++) {
        [previous, current] = [current, ((2 * k - 1) * x * current - (k - 1) * previous) / k];
      }
      const slope = (n * (x * current - previous)) / (x * x - 1);
      x -= current / slope;
      nodes[i] = x;
      weights[i] = 2 / ((1 - x * x) * slope * slope);
    }
  }
  return { nodes, weights };
}
