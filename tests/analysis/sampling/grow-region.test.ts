import { describe, expect, it } from 'vitest';
import { growRegion } from '../../../server/analysis/sampling/grow-region.ts';
import { checkPolygonShape } from '../../../server/analysis/sampling/polygon-shape.ts';
import { rasterisePolygon } from '../../../server/analysis/sampling/rasterise-polygon.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { traceRegion } from '../../../server/analysis/sampling/trace-region.ts';

function windowOf(rows: string[], unusable = '.') {
  const [height, width] = [rows.length, rows[0]!.length];
  const cells = rows.join('');
  return {
    ...{ width, height, nFeatures: 1 },
    values: Float32Array.from(cells, (cell) => (cell === unusable ? 0 : Number(cell))),
    isUsable: Uint8Array.from(cells, (cell) => Number(cell !== unusable)),
  };
}

const draw = (region: Uint8Array, width: number) =>
  Array.from({ length: region.length / width }, (_, row) =>
    [...region.subarray(row * width, (row + 1) * width)].map((held) => (held ? '#' : '-')).join(''),
  );

describe('growing from a pixel', () => {
  it('takes the connected pixels within the distance, and none that only touch at a corner', () => {
    const window = windowOf(['11990', '19910', '99000']);
    const { region, nPixels, reachesEdge } = growRegion(window, { column: 0, row: 0 }, [1], 0.5);
    expect(draw(region, 5)).toEqual(['##---', '#----', '-----']);
    expect(nPixels).toBe(3);
    expect(reachesEdge).toBe(true);
  });

  it('grows with the distance, which is in units of the scales', () => {
    const window = windowOf(['12345']);
    const size = (distance: number, scale = 1) => growRegion(window, { column: 2, row: 0 }, [scale], distance).nPixels;
    expect([size(0), size(1), size(2)]).toEqual([1, 3, 5]);
    expect(size(1, 2)).toBe(5);
  });

  it('fills small holes, but none with a pixel that has no data, and no large ones', () => {
    const filled = growRegion(windowOf(['11111', '19911', '11111']), { column: 0, row: 0 }, [1], 0);
    expect(filled.nPixels).toBe(15);
    const open = growRegion(windowOf(['11111', '19.11', '11111']), { column: 0, row: 0 }, [1], 0);
    expect(open.nPixels).toBe(13);
    const large = growRegion(windowOf(['11111', '19911', '11111']), { column: 0, row: 0 }, [1], 0, 2);
    expect(large.nPixels).toBe(13);
  });

  it('is empty on a pixel without data', () => {
    expect(growRegion(windowOf(['.1']), { column: 0, row: 0 }, [1], 9).nPixels).toBe(0);
  });
});

describe('the outline of a region', () => {
  it('is a square about one pixel, just within its edges', () => {
    const [ring] = traceRegion(Uint8Array.of(1), 1, 1)!;
    expect(ring).toHaveLength(5);
    for (const [x, y] of ring!) for (const value of [x, y]) expect([0.02, 0.98]).toContain(value);
  });

  it('holds just the region’s pixels and is no outline that touches itself, for random regions', () => {
    const rng = createRng(9);
    for (let trial = 0; trial < 200; trial++) {
      const [width, height] = [3 + rng.nextBelow(14), 3 + rng.nextBelow(14)];
      const window = {
        ...{ width, height, nFeatures: 1 },
        values: Float32Array.from({ length: width * height }, () => rng.nextBelow(5)),
        isUsable: new Uint8Array(width * height).fill(1),
      };
      const seed = { column: rng.nextBelow(width), row: rng.nextBelow(height) };
      const { region } = growRegion(window, seed, [1], 1 + rng.nextBelow(2), 3);
      const polygon = traceRegion(region, width, height)!;
      const held = new Uint8Array(width * height);
      for (const pixel of rasterisePolygon(polygon, width, height)) held[pixel] = 1;
      expect(draw(held, width)).toEqual(draw(region, width));
      // The check takes rows that grow upwards; turning the picture over changes nothing about touching.
      expect(checkPolygonShape(polygon)).toEqual({ ok: true });
    }
  });

  it('is nothing for nothing', () => {
    expect(traceRegion(new Uint8Array(4), 2, 2)).toBeNull();
  });
});
