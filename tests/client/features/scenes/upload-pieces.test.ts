import { describe, expect, it } from 'vitest';
import { checkCount, checkFile, joinFiles } from '../../../../client/src/features/scenes/check-files.ts';
import { addPacePoint, bytesPerSecond, secondsLeft } from '../../../../client/src/features/scenes/upload-pace.ts';
import { layThumbnail } from '../../../../client/src/features/scenes/thumbnail-tiles.ts';

const limits = { fileBytes: 1_000, files: 2 };

describe('chosen files', () => {
  it('are refused when empty or above the limit, and doubted by their ending', () => {
    expect(checkFile({ name: 'a.tif', size: 0 }, limits)?.kind).toBe('refusal');
    expect(checkFile({ name: 'a.tif', size: 1_001 }, limits)?.kind).toBe('refusal');
    expect(checkFile({ name: 'a.tif', size: 1_001 }, null)).toBeNull();
    expect(checkFile({ name: 'a.zip', size: 10 }, limits)?.kind).toBe('doubt');
    for (const name of ['a.TIF', 'a.tiff', 'a.jp2']) expect(checkFile({ name, size: 1_000 }, limits)).toBeNull();
  });

  it('are each there once, and counted against the limit', () => {
    const [a, b] = [
      { name: 'a.tif', size: 1 },
      { name: 'a.tif', size: 2 },
    ];
    expect(joinFiles([a], [{ ...a }, b])).toEqual([a, b]);
    expect(checkCount(2, limits)).toBeNull();
    expect(checkCount(3, limits)).toContain('at most 2');
  });
});

describe('the pace of an upload', () => {
  it('is measured over the last eight seconds', () => {
    let points = addPacePoint([], { atMs: 0, sentBytes: 0 });
    expect(bytesPerSecond(points)).toBeNull();
    for (let second = 1; second <= 30; second++) {
      // A thousand bytes a second, then ten times as fast.
      const sentBytes = second <= 20 ? second * 1_000 : 20_000 + (second - 20) * 10_000;
      points = addPacePoint(points, { atMs: second * 1_000, sentBytes });
    }
    expect(points.length).toBeLessThanOrEqual(10);
    expect(bytesPerSecond(points)).toBe(10_000);
    expect(secondsLeft(points, 220_000)).toBe(10);
  });

  it('is not told before half a second or while nothing moves', () => {
    expect(secondsLeft([{ atMs: 0, sentBytes: 0 }], 10)).toBeNull();
    const still = [
      { atMs: 0, sentBytes: 5 },
      { atMs: 900, sentBytes: 5 },
    ];
    expect(secondsLeft(still, 10)).toBeNull();
  });
});

describe('a thumbnail', () => {
  it('shows the whole scene in the middle of the box with few tiles', () => {
    const layout = layThumbnail([-16.75, 59.27, -16.11, 59.54], 212, 176);
    expect(layout.width).toBeLessThanOrEqual(212.01);
    expect(layout.height).toBeLessThanOrEqual(176.01);
    expect(Math.max(layout.width / 212, layout.height / 176)).toBeCloseTo(1, 6);
    expect(layout.left * 2 + layout.width).toBeCloseTo(212, 6);
    expect(layout.tiles.length).toBeLessThanOrEqual(9);
    // The tiles cover the scene without a gap.
    const right = Math.max(...layout.tiles.map(({ left, size }) => left + size));
    const left = Math.min(...layout.tiles.map((tile) => tile.left));
    expect(left).toBeLessThanOrEqual(layout.left + 1e-6);
    expect(right).toBeGreaterThanOrEqual(layout.left + layout.width - 1e-6);
  });

  it('asks for tiles that exist where a scene lies across the antimeridian', () => {
    const { tiles } = layThumbnail([179.5, -1, 180.5, 1], 200, 200);
    expect(tiles.every(({ x, z }) => x >= 0 && x < 2 ** z)).toBe(true);
    expect(new Set(tiles.map(({ x }) => x)).size).toBeGreaterThan(1);
  });
});
