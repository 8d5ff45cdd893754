import { describe, expect, it } from 'vitest';
import { measurePixelAreas } from '../../server/services/run-areas.ts';
import { ellipsoidalPolygonAreaM2 } from '../../server/analysis/sampling/ellipsoidal-area.ts';

const grid = { width: 10, height: 20, originX: 500_000, originY: 6_700_000, pixelWidth: 30, pixelHeight: 30 };

describe('the area of a pixel', () => {
  it('is the grid’s own in UTM', () => {
    const { rowAreaM2, method } = measurePixelAreas({
      grid,
      proj4: '+proj=utm +zone=28 +datum=WGS84 +units=m',
      wkt: '',
    });
    expect([...new Set(rowAreaM2)]).toEqual([900]);
    // On the central meridian the scale factor is 0.9996, so the grid is 0.08 % too small.
    expect(method).toMatch(/900 m²; .* within 0\.08 %/);
  });

  it('is in square metres where the grid counts in feet', () => {
    const projection = '+proj=utm +zone=28 +datum=WGS84 +units=us-ft';
    const feet = {
      ...grid,
      originX: 500_000 * 3.28083333333,
      originY: 6_700_000 * 3.28083333333,
      pixelWidth: 100,
      pixelHeight: 100,
    };
    // A US survey foot is 1200/3937 m.
    expect(measurePixelAreas({ grid: feet, proj4: projection, wkt: '' }).rowAreaM2[0]).toBeCloseTo(
      (120_000 / 3937) ** 2,
      6,
    );
  });

  it('is the true one, row by row, on a grid of degrees', () => {
    const degrees = { width: 4, height: 3, originX: -10, originY: 61, pixelWidth: 0.5, pixelHeight: 0.5 };
    const { rowAreaM2 } = measurePixelAreas({ grid: degrees, proj4: '+proj=longlat +datum=WGS84 +no_defs', wkt: '' });
    const cell = (north: number) =>
      ellipsoidalPolygonAreaM2([
        [
          [-9, north],
          [-9, north - 0.5],
          [-8.5, north - 0.5],
          [-8.5, north],
          [-9, north],
        ],
      ]);
    for (const [row, area] of rowAreaM2.entries()) expect(area / cell(61 - row / 2)).toBeCloseTo(1, 9);
    expect(rowAreaM2[0]).toBeLessThan(rowAreaM2[2]!);
  });

  it('is the true one where the projection distorts areas, as Web Mercator does', () => {
    // At 60° the scale is 1 / cos 60° = 2 on the sphere, so a pixel of 100 m is some 50 m wide; the ellipsoid differs by under 1 %.
    const mercator = { width: 10, height: 10, originX: 0, originY: 8_399_737.89, pixelWidth: 100, pixelHeight: 100 };
    const projection =
      '+proj=merc +a=6378137 +b=6378137 +lat_ts=0 +lon_0=0 +x_0=0 +y_0=0 +k=1 +units=m +nadgrids=@null +no_defs';
    const { rowAreaM2, method } = measurePixelAreas({ grid: mercator, proj4: projection, wkt: '' });
    expect(rowAreaM2[0]! / 2500).toBeGreaterThan(0.98);
    expect(rowAreaM2[0]! / 2500).toBeLessThan(1.02);
    expect(method).toMatch(/distorts areas/);
  });
});
