import { describe, expect, it } from 'vitest';
import type { Position } from '../../../shared/contracts/geometry.ts';
import { groundAreaHa } from '../../../client/src/lib/ground-area.ts';

const cell = (lon: number, lat: number, size = 1): Position[] => [
  [lon, lat],
  [lon + size, lat],
  [lon + size, lat + size],
  [lon, lat + size],
  [lon, lat],
];

describe('the area of an outline', () => {
  // 1° × 1° cells between parallels, closed form on WGS84 (equal to GeographicLib's rhumb areas).
  it.each([
    [0, 12_308_463_894.0],
    [45, 8_686_494_956.7],
    [60, 6_123_140_878.7],
    [75, 3_120_946_687.3],
  ])('of a degree cell from latitude %d is the closed form to 1e-7', (lat, areaM2) => {
    const areaHa = groundAreaHa({ type: 'Polygon', coordinates: [cell(10, lat)] });
    expect(Math.abs(areaHa / (areaM2 / 10_000) - 1)).toBeLessThan(1e-7);
  });

  it('is the same either way round and across the antimeridian', () => {
    const there = groundAreaHa({ type: 'Polygon', coordinates: [cell(0, 20)] });
    const across: Position[] = [
      [179.5, 20],
      [-179.5, 20],
      [-179.5, 21],
      [179.5, 21],
      [179.5, 20],
    ];
    expect(groundAreaHa({ type: 'Polygon', coordinates: [across] })).toBeCloseTo(there, 6);
    expect(groundAreaHa({ type: 'Polygon', coordinates: [cell(0, 20).reverse()] })).toBeCloseTo(there, 6);
  });

  it('takes holes off and adds parts up', () => {
    const [whole, hole] = [cell(0, 50), cell(0.25, 50.25, 0.5)];
    const area = (rings: Position[][]) => groundAreaHa({ type: 'Polygon', coordinates: rings });
    expect(area([whole, hole])).toBeCloseTo(area([whole]) - area([hole]), 6);
    expect(groundAreaHa({ type: 'MultiPolygon', coordinates: [[whole], [cell(3, 50)]] })).toBeCloseTo(
      2 * area([whole]),
      6,
    );
  });
});
