import { describe, expect, it } from 'vitest';
import type { Ring } from '../../../server/analysis/sampling/polygon.ts';
import { checkPolygonShape, signedRingArea } from '../../../server/analysis/sampling/polygon-shape.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

const square: Ring = [[0, 0], [10, 0], [10, 10], [0, 10], [0, 0]]; // prettier-ignore
const box = (x: number, y: number, size: number): Ring => [[x, y], [x + size, y], [x + size, y + size], [x, y + size], [x, y]]; // prettier-ignore

describe('the shape of a drawn polygon', () => {
  it('is accepted when simple, either way round, with holes, and with a position clicked twice', () => {
    expect(checkPolygonShape([square])).toEqual({ ok: true });
    expect(checkPolygonShape([[...square].reverse()])).toEqual({ ok: true });
    expect(checkPolygonShape([square, box(1, 1, 3), box(5, 5, 3)])).toEqual({ ok: true });
    expect(checkPolygonShape([[[0, 0], [4, 0], [4, 0], [4, 4], [0, 0]]])).toEqual({ ok: true }); // prettier-ignore
    expect(checkPolygonShape([[[0, 0], [5, 0], [10, 0], [10, 10], [0, 0]]])).toEqual({ ok: true }); // prettier-ignore
  });

  it('refuses a ring that crosses itself and says where', () => {
    const bowTie: Ring = [[0, 0], [5, 5], [5, 0], [0, 5], [0, 0]]; // prettier-ignore
    expect(checkPolygonShape([bowTie])).toEqual({ ok: false, reason: 'self-crossing', ringIndex: 0, at: [2.5, 2.5] });
  });

  it.each<[string, Ring]>([
    ['touches itself in a position', [[0, 0], [4, 0], [2, 2], [4, 4], [0, 4], [2, 2], [0, 0]]],
    ['touches its own side', [[0, 0], [4, 0], [4, 4], [2, 0], [0, 4], [0, 0]]],
    ['runs back over itself', [[0, 0], [4, 0], [4, 4], [4, 2], [4, 6], [0, 4], [0, 0]]],
    ['ends in a spike', [[0, 0], [4, 0], [4, 4], [8, 8], [4, 4], [0, 4], [0, 0]]],
    ['runs along an earlier side', [[0, 0], [4, 0], [4, 4], [3, 4], [3, 0], [1, 0], [1, 4], [0, 4], [0, 0]]],
  ])('refuses a ring that %s', (_, ring) => {
    expect(checkPolygonShape([ring])).toMatchObject({ ok: false, reason: 'self-crossing' });
  }); // prettier-ignore

  it.each<[string, Ring, string]>([
    ['is open', [[0, 0], [4, 0], [4, 4], [0, 4]], 'not-closed'],
    ['has three positions', [[0, 0], [4, 0], [0, 0]], 'too-few-positions'],
    ['has no positions', [], 'too-few-positions'],
    ['has no area', [[0, 0], [4, 4], [2, 2], [0, 0]], 'zero-area'],
    ['is one point', [[1, 1], [1, 1], [1, 1], [1, 1]], 'zero-area'],
    ['has a number missing', [[0, 0], [4, NaN], [4, 4], [0, 0]], 'not-finite'],
  ])('refuses a ring that %s', (_, ring, reason) => {
    expect(checkPolygonShape([ring])).toMatchObject({ ok: false, reason, ringIndex: 0 });
  }); // prettier-ignore

  it('refuses holes that leave the outer ring, cross it or lie in one another', () => {
    expect(checkPolygonShape([square, box(20, 20, 2)])).toMatchObject({ reason: 'hole-outside', ringIndex: 1 });
    expect(checkPolygonShape([square, box(8, 8, 5)])).toMatchObject({ reason: 'hole-crossing', ringIndex: 1 });
    expect(checkPolygonShape([square, box(1, 1, 6), box(2, 2, 2)])).toMatchObject({
      reason: 'hole-outside',
      ringIndex: 2,
    });
  });

  it('agrees with testing every pair of sides on random rings', () => {
    const rng = createRng(31);
    const proper = (p: number[], q: number[], r: number[], s: number[]) => {
      const side = (a: number[], b: number[], c: number[]) => Math.sign((b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0])); // prettier-ignore
      return side(p, q, r) * side(p, q, s) < 0 && side(r, s, p) * side(r, s, q) < 0;
    };
    const seen = { crossing: 0, simple: 0 };
    for (let round = 0; round < 400; round++) {
      const n = 4 + rng.nextBelow(5);
      const open = Array.from({ length: n }, (): [number, number] => [rng.nextFloat() * 100, rng.nextFloat() * 100]);
      const ring = [...open, open[0]];
      let crosses = false;
      for (let i = 0; i < n; i++) for (let j = i + 1; j < n; j++) crosses ||= proper(ring[i], ring[i + 1], ring[j], ring[j + 1]); // prettier-ignore
      expect(checkPolygonShape([ring]).ok).toBe(!crosses);
      seen[crosses ? 'crossing' : 'simple']++;
    }
    expect(seen.simple).toBeGreaterThan(20);
    expect(seen.crossing).toBeGreaterThan(20);
  });

  it('checks a ring of 20,000 positions in well under two seconds', () => {
    const n = 20_000;
    const ring = Array.from({ length: n }, (_, i): [number, number] => [
      1000 * Math.cos((2 * Math.PI * i) / n),
      1000 * Math.sin((2 * Math.PI * i) / n),
    ]);
    const start = performance.now();
    expect(checkPolygonShape([[...ring, ring[0]]])).toEqual({ ok: true });
    expect(performance.now() - start).toBeLessThan(2000);
  });

  it('checks a comb of 10,000 positions quickly, and gives up on one so large that it would hold the server up', () => {
    const comb = (nTeeth: number): Ring => {
      const teeth = Array.from({ length: nTeeth }, (_, i): [number, number][] => [
        [0, i],
        [1000, i + 0.5],
      ]);
      return [...teeth.flat(), [1001, nTeeth + 1], [1001, -1], [0, 0]];
    };
    const start = performance.now();
    expect(checkPolygonShape([comb(4_990)])).toEqual({ ok: true });
    expect(checkPolygonShape([comb(100_000)])).toMatchObject({ ok: false, reason: 'too-intricate' });
    expect(performance.now() - start).toBeLessThan(5000);
  });

  it('has its signed area without loss far from the origin', () => {
    expect(signedRingArea(square)).toBe(100);
    expect(signedRingArea(square.map(([x, y]) => [x + 2 ** 40, y + 2 ** 40]))).toBe(100);
  });
});
