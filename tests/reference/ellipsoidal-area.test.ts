import proj4 from 'proj4';
import { describe, expect, it } from 'vitest';
import { ellipsoidalPolygonAreaM2, truePixelAreaM2 } from '../../server/analysis/sampling/ellipsoidal-area.ts';
import { checkValues } from '../fixtures/check-values.ts';

type LatLon = [number, number];

function toRing(latLon: LatLon[]): [number, number][] {
  return [...latLon, latLon[0]].map(([lat, lon]) => [lon, lat]);
}

function relativeError(got: number, wanted: number): number {
  return Math.abs(got - wanted) / wanted;
}

describe('area on the WGS 84 ellipsoid', () => {
  it.each(checkValues.geo.cells)('gives the closed form for a 1° cell from latitude $lat', ({ lat, exactM2 }) => {
    const cell = toRing([[lat, 7], [lat, 8], [lat + 1, 8], [lat + 1, 7]]); // prettier-ignore
    // The printed values have one decimal.
    expect(Math.abs(ellipsoidalPolygonAreaM2([cell]) - exactM2)).toBeLessThan(0.06);
  });

  it.each(checkValues.geo.geodesicPolygons)('equals GeographicLib for geodesic sides: $latlon', ({ latlon, area }) => {
    expect(relativeError(ellipsoidalPolygonAreaM2([toRing(latlon)], 'geodesic'), area)).toBeLessThan(1e-10);
  });

  // GeographicLib, test Planimeter0 and the Planimeter manual page; the printed digits set the tolerance.
  it.each<[LatLon[], number, number]>([
    [[[0, -1], [-1, 0], [0, 1], [1, 0]], 24619419146, 1e-10], // prettier-ignore
    [[[90, 0], [0, 0], [0, 90]], 63758202715511, 1e-12], // prettier-ignore
    [[[89, 0.1], [89, 90.1], [89, -179.9]], 12476152838.5, 1e-10], // prettier-ignore
    [[[60, 0], [60, 1], [61, 1], [61, 0]], 6122943163.1, 1e-10], // prettier-ignore
  ])('equals GeographicLib for %j', (latlon, area, tolerance) => {
    expect(relativeError(ellipsoidalPolygonAreaM2([toRing(latlon)], 'geodesic'), area)).toBeLessThan(tolerance);
  });

  it('gives the area of the MGRS square 18SWK (Planimeter manual page: 10007388597.2 m²)', () => {
    const corners = [[500000, 4400000], [600000, 4400000], [600000, 4500000], [500000, 4500000]]; // prettier-ignore
    const ring = corners.map((xy) => proj4('+proj=utm +zone=18 +datum=WGS84', 'WGS84', xy as LatLon));
    expect(relativeError(truePixelAreaM2(ring as LatLon[]), 10007388597.2)).toBeLessThan(1e-9);
  });

  it.each([
    [500000, 100.08005],
    [600000, 100.05543],
    [700000, 99.98163],
    [800000, 99.85878],
  ])('gives the true area of a 10 m UTM pixel at easting %d', (easting, areaM2) => {
    const corners = [[0, 0], [10, 0], [10, 10], [0, 10]].map(([dx, dy]) =>
      proj4('+proj=utm +zone=32 +datum=WGS84', 'WGS84', [easting + dx - 5, 5000000 + dy - 5]),
    ); // prettier-ignore
    expect(truePixelAreaM2(corners as LatLon[])).toBeCloseTo(areaM2, 4);
  });

  it('takes holes off, does not mind the direction, and crosses the antimeridian', () => {
    const outer = toRing([[10, 179], [10, -179], [12, -179], [12, 179]]); // prettier-ignore
    const hole = toRing([[10.5, 179.5], [10.5, -179.5], [11, -179.5], [11, 179.5]]); // prettier-ignore
    const area = ellipsoidalPolygonAreaM2([outer, hole]);
    const shifted = [outer, hole].map((ring) => ring.map(([lon, lat]) => [(lon + 360) % 360 - 170, lat] as LatLon)); // prettier-ignore
    expect(relativeError(ellipsoidalPolygonAreaM2(shifted), area)).toBeLessThan(1e-12);
    expect(relativeError(ellipsoidalPolygonAreaM2([[...outer].reverse(), hole]), area)).toBeLessThan(1e-14);
    expect(area).toBeCloseTo(ellipsoidalPolygonAreaM2([outer]) - ellipsoidalPolygonAreaM2([hole]), 3);
  });

  it('hardly depends on the kind of edge for a polygon the size of a sample', () => {
    const ring = toRing([[54.1, -3.2], [54.1, -3.19], [54.106, -3.188], [54.107, -3.201]]); // prettier-ignore
    const straight = ellipsoidalPolygonAreaM2([ring]);
    expect(relativeError(ellipsoidalPolygonAreaM2([ring], 'geodesic'), straight)).toBeLessThan(1e-4);
  });

  it('refuses geodesics between nearly opposite points', () => {
    expect(() => ellipsoidalPolygonAreaM2([toRing([[0, 0], [0.1, 179.9], [40, 90]])], 'geodesic')).toThrow(/unique/); // prettier-ignore
  });

  it('refuses latitudes beyond the pole', () => {
    expect(() => ellipsoidalPolygonAreaM2([toRing([[91, 0], [0, 0], [0, 1]])])).toThrow(/latitude/); // prettier-ignore
  });
});
