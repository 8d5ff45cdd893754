import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { Polygon, Position } from '../../../server/analysis/sampling/polygon.ts';
import { rasteriseMultiPolygon, rasterisePolygon } from '../../../server/analysis/sampling/rasterise-polygon.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

/** The published grids have their origin at the lower left, 5 pixels high; pixel coordinates run downwards. */
function flip(ring: number[][]): Position[] {
  return [...ring, ring[0]].map(([x, y]) => [x, 5 - y]);
}

function draw(pixels: Uint32Array, width: number, height: number): string {
  const cells = new Uint8Array(width * height);
  for (const pixel of pixels) cells[pixel]++;
  return Array.from({ length: height }, (_, row) => cells.subarray(row * width, (row + 1) * width).join('')).join('/');
}

describe('pixels of a polygon (gdal_rasterize 3.6.2, default rule: pixel centre inside)', () => {
  it.each<[string, Polygon, string]>([
    ['triangle', [flip([[0.2, 0.2], [5.8, 0.2], [0.2, 4.8]])], '100000/110000/111000/111100/111110'],
    ['square', [flip([[1, 1], [4, 1], [4, 4], [1, 4]])], '000000/011100/011100/011100/000000'],
    [
      'frame with a hole',
      [flip([[0.2, 0.2], [5.8, 0.2], [5.8, 4.8], [0.2, 4.8]]), flip([[2.2, 1.2], [3.8, 1.2], [3.8, 3.8], [2.2, 3.8]])],
      '111111/110011/110011/110011/111111',
    ],
    ['polygon smaller than a pixel', [flip([[2.6, 2.6], [2.9, 2.6], [2.9, 2.9], [2.6, 2.9]])], '000000/000000/000000/000000/000000'],
  ])('%s', (_, polygon, wanted) => expect(draw(rasterisePolygon(polygon, 6, 5), 6, 5)).toBe(wanted)); // prettier-ignore

  it('multipolygon', () => {
    const parts = [[flip([[0, 3], [2, 3], [2, 5], [0, 5]])], [flip([[4, 0], [6, 0], [6, 2], [4, 2]])]]; // prettier-ignore
    expect(draw(rasteriseMultiPolygon(parts, 6, 5), 6, 5)).toBe('110000/110000/000000/000011/000011');
  });

  it('counts overlapping parts of a multipolygon once', () => {
    const part = (x: number): Polygon => [flip([[x, 1], [x + 3, 1], [x + 3, 4], [x, 4]])]; // prettier-ignore
    expect(draw(rasteriseMultiPolygon([part(0), part(2)], 6, 5), 6, 5)).toBe('000000/111110/111110/111110/000000');
  });

  it('gives each centre on a shared edge to exactly one polygon', () => {
    const left = rasterisePolygon([flip([[0, 0], [2.5, 0], [2.5, 5], [0, 5]])], 6, 5); // prettier-ignore
    const right = rasterisePolygon([flip([[2.5, 0], [6, 0], [6, 5], [2.5, 5]])], 6, 5); // prettier-ignore
    expect(draw(Uint32Array.of(...left, ...right), 6, 5)).toBe('111111/111111/111111/111111/111111');
  });

  it('cuts off what lies outside the grid and accepts an empty result', () => {
    expect(rasterisePolygon([flip([[-10, -10], [20, -10], [20, 20], [-10, 20]])], 6, 5)).toHaveLength(30); // prettier-ignore
    expect(rasterisePolygon([flip([[10, 10], [20, 10], [20, 20]])], 6, 5)).toHaveLength(0); // prettier-ignore
  });

  it('refuses coordinates that are not numbers and grids that are not whole', () => {
    expect(() => rasterisePolygon([[[0, 0], [NaN, 1], [1, 1]]], 6, 5)).toThrow(/NaN/); // prettier-ignore
    expect(() => rasterisePolygon([], 6.5, 5)).toThrow(RangeError);
    expect(() => rasterisePolygon([], 100_000, 100_000)).toThrow(/too many/);
  });
});

describe('a partition of the grid', () => {
  it('owns every pixel exactly once, whatever its vertices (200 random meshes, many on pixel centres)', () => {
    const rng = createRng(20);
    for (let round = 0; round < 200; round++) {
      const [width, height] = [12, 9];
      const n = 4;
      // A wobbly n × n mesh of triangles over the grid. Half-pixel steps put many vertices and edges through centres.
      const onHalves = round % 2 === 0;
      const wobble = () => (onHalves ? rng.nextBelow(3) / 2 - 0.5 : (rng.nextFloat() - 0.5) * 0.9);
      const vertex = Array.from({ length: (n + 1) * (n + 1) }, (_, i): Position => {
        const [c, r] = [i % (n + 1), Math.floor(i / (n + 1))];
        const x = c === 0 ? 0 : c === n ? width : (c * width) / n + wobble();
        const y = r === 0 ? 0 : r === n ? height : Math.round((r * height) / n) + wobble();
        return [x, y];
      });
      const owners = new Uint8Array(width * height);
      for (let r = 0; r < n; r++) {
        for (let c = 0; c < n; c++) {
          const at = r * (n + 1) + c;
          const [a, b, d, e] = [vertex[at], vertex[at + 1], vertex[at + n + 1], vertex[at + n + 2]];
          const triangles = rng.nextBelow(2) ? [[a, b, d], [b, d, e]] : [[a, e, d], [e, a, b]]; // prettier-ignore
          for (const triangle of triangles) {
            for (const pixel of rasterisePolygon([[...triangle, triangle[0]]], width, height)) owners[pixel]++;
          }
        }
      }
      expect(owners.every((count) => count === 1)).toBe(true);
    }
  });
});

it('marks the same pixels as gdal_rasterize for random polygons with holes', () => {
  const folder = mkdtempSync(join(tmpdir(), 'rasterise-'));
  try {
    const rng = createRng(77);
    const [width, height] = [80, 60];
    for (let round = 0; round < 6; round++) {
      const star = (cx: number, cy: number, radius: number): [number, number][] => {
        const ring = Array.from({ length: 17 }, (_, i): [number, number] => {
          const r = radius * (0.5 + rng.nextFloat() / 2);
          const angle = (2 * Math.PI * i) / 17;
          return [cx + r * Math.cos(angle), cy + r * Math.sin(angle)];
        });
        return [...ring, ring[0]];
      };
      const polygon = [star(40.013, 30.017, 35), star(40.013, 30.017, 12)];
      const upwards = polygon.map((ring) => ring.map(([x, y]) => [x, height - y]));
      const [source, target] = [join(folder, `${round}.geojson`), join(folder, `${round}.img`)];
      writeFileSync(source, JSON.stringify({ type: 'Polygon', coordinates: upwards }));
      execFileSync('gdal_rasterize', ['-q', '-burn', '1', '-of', 'ENVI', '-ot', 'Byte', '-te', '0', '0', `${width}`, `${height}`, '-ts', `${width}`, `${height}`, source, target]); // prettier-ignore
      const cells = new Uint8Array(width * height);
      for (const pixel of rasterisePolygon(polygon, width, height)) cells[pixel] = 1;
      expect(Buffer.compare(Buffer.from(cells), readFileSync(target))).toBe(0);
      expect(cells.reduce((a, b) => a + b, 0)).toBeGreaterThan(500);
    }
  } finally {
    rmSync(folder, { recursive: true });
  }
});
