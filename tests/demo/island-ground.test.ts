import { beforeAll, describe, expect, test } from 'vitest';
import { distanceTo } from '../../server/demo/island/distance-transform.ts';
import { accumulateFlow, routeDrainage } from '../../server/demo/island/drainage.ts';
import { fractalNoise } from '../../server/demo/island/fractal-noise.ts';
import { ISLAND_HEIGHT as H, ISLAND_WIDTH as W } from '../../server/demo/island/island-grid.ts';
import type { Landscape } from '../../server/demo/island/landscape.ts';
import { makeLandscape } from '../../server/demo/island/landscape.ts';
import { findLeastCostPath } from '../../server/demo/island/least-cost-path.ts';
import { labelPatches } from '../../server/demo/island/patches.ts';
import { hashUnit, seededRng } from '../../server/demo/island/seeded-rng.ts';

describe('the ground', () => {
  let land: Landscape;

  beforeAll(() => {
    land = makeLandscape();
  }, 120_000);

  /** Water pixels that hang together, diagonals included, with the sea at the grid's corner. */
  function waterJoinedToSea(): Uint8Array {
    const joined = new Uint8Array(W * H);
    const stack = [0];
    joined[0] = 1;
    for (let at = stack.pop(); at !== undefined; at = stack.pop()) {
      for (let dy = -1; dy <= 1; dy++) {
        for (let dx = -1; dx <= 1; dx++) {
          const x = (at % W) + dx;
          const y = Math.floor(at / W) + dy;
          const j = y * W + x;
          if (x < 0 || y < 0 || x >= W || y >= H || joined[j] || land.trueClass[j] !== 1) continue;
          joined[j] = 1;
          stack.push(j);
        }
      }
    }
    return joined;
  }

  test('every river pixel hangs together with the sea', () => {
    const joined = waterJoinedToSea();
    let nRiver = 0;
    let nLoose = 0;
    for (let i = 0; i < W * H; i++) {
      if (!land.rivers.isWater[i] || land.rivers.isLoch[i]) continue;
      nRiver++;
      if (!joined[i]) nLoose++;
    }
    expect(nRiver).toBeGreaterThan(3000);
    expect(nLoose).toBe(0);
  });

  test('the main river rises high and never runs uphill to the estuary', () => {
    const { mainStem, mainStemMeters, mouth } = land.rivers;
    expect(mainStemMeters[0]).toBeGreaterThan(250);
    for (let k = 1; k < mainStem.length; k++) {
      expect(mainStemMeters[k]).toBeLessThanOrEqual(mainStemMeters[k - 1] + 1e-6);
      const dx = Math.abs((mainStem[k] % W) - (mainStem[k - 1] % W));
      const dy = Math.abs(Math.floor(mainStem[k] / W) - Math.floor(mainStem[k - 1] / W));
      expect(Math.max(dx, dy)).toBe(1);
    }
    expect(land.coast.estuary[mouth]).toBeGreaterThan(0.3);
  });

  test('bare rock stands on high or steep ground, arable on low and gentle', () => {
    const mean = (code: number, values: Float32Array): number => {
      let sum = 0;
      let n = 0;
      for (let i = 0; i < values.length; i++) {
        if (land.trueClass[i] !== code || !land.coast.isLand[i]) continue;
        sum += values[i];
        n++;
      }
      return sum / n;
    };
    expect(mean(9, land.relief.elevation)).toBeGreaterThan(200);
    expect(mean(9, land.relief.slope)).toBeGreaterThan(3 * mean(8, land.relief.slope));
    expect(mean(8, land.relief.elevation)).toBeLessThan(mean(6, land.relief.elevation) - 100);
  });
});

describe('the parts it is made with', () => {
  test('distances agree with measuring to every marked pixel', () => {
    const rng = seededRng(5);
    const [w, h] = [23, 17];
    const mask = Uint8Array.from({ length: w * h }, () => (rng.next() < 0.04 ? 1 : 0));
    mask[40] = 1;
    const distance = distanceTo(mask, w, h);
    for (let i = 0; i < w * h; i++) {
      let nearest = Infinity;
      for (let j = 0; j < w * h; j++) {
        if (mask[j]) nearest = Math.min(nearest, Math.hypot((i % w) - (j % w), Math.floor(i / w) - Math.floor(j / w)));
      }
      expect(distance[i]).toBeCloseTo(nearest, 4);
    }
  });

  test('water from every cell of a pitted surface reaches the sea without running uphill', () => {
    const rng = seededRng(6);
    const [w, h] = [40, 30];
    const isLand = Uint8Array.from({ length: w * h }, (_, i) => {
      const x = i % w;
      const y = Math.floor(i / w);
      return x > 0 && y > 0 && x < w - 1 && y < h - 1 ? 1 : 0;
    });
    const elevation = Float32Array.from({ length: w * h }, (_, i) => (isLand[i] ? rng.range(1, 60) : 0));
    const drainage = routeDrainage(elevation, isLand, w, h, 0.001);
    expect(drainage.order).toHaveLength(38 * 28);
    for (const cell of drainage.order) {
      expect(drainage.filled[cell]).toBeGreaterThanOrEqual(elevation[cell]);
      let at = cell;
      for (let step = 0; isLand[at]; step++) {
        expect(step).toBeLessThan(w * h);
        // The flood tells heights apart to a thousandth here.
        expect(drainage.filled[drainage.receiver[at]]).toBeLessThanOrEqual(drainage.filled[at] + 0.001);
        at = drainage.receiver[at];
      }
    }
    const flow = accumulateFlow(drainage);
    let atSea = 0;
    for (let i = 0; i < w * h; i++) if (!isLand[i]) atSea += flow[i];
    expect(atSea).toBe(38 * 28);
  });

  test('the cheapest path goes round a wall through its gap, and says when there is none', () => {
    const cost = new Float32Array(25).fill(1);
    for (const wall of [2, 7, 12, 17]) cost[wall] = Infinity;
    expect(findLeastCostPath(cost, 5, 5, 0, (cell) => cell === 4)).toContain(22);
    cost[22] = Infinity;
    expect(findLeastCostPath(cost, 5, 5, 0, (cell) => cell === 4)).toBeNull();
  });

  test('fractal noise has mean 0, deviation 1, and depends on its seed alone', () => {
    const recipe = { seed: 9, wavelengthPx: 30, roughness: 0.6 };
    const noise = fractalNoise(120, 90, recipe);
    const mean = noise.reduce((a, b) => a + b, 0) / noise.length;
    const variance = noise.reduce((a, b) => a + (b - mean) ** 2, 0) / noise.length;
    expect(mean).toBeCloseTo(0, 3);
    expect(variance).toBeCloseTo(1, 2);
    expect(fractalNoise(120, 90, recipe)).toEqual(noise);
    expect(fractalNoise(120, 90, { ...recipe, seed: 10 })).not.toEqual(noise);
  });

  test('random numbers are uniform, normal ones have unit variance, hashes fill the unit interval', () => {
    const rng = seededRng(11);
    const n = 40_000;
    const bins = new Array<number>(10).fill(0);
    let squares = 0;
    const hashed = new Array<number>(10).fill(0);
    for (let k = 0; k < n; k++) {
      bins[Math.floor(rng.next() * 10)]++;
      squares += rng.normal() ** 2;
      hashed[Math.floor(hashUnit(k, 3) * 10)]++;
    }
    for (const count of [...bins, ...hashed]) expect(Math.abs(count - n / 10)).toBeLessThan(300);
    expect(squares / n).toBeCloseTo(1, 1);
  });

  test('patches join along sides but not across corners', () => {
    const { id, nPixels } = labelPatches(Uint8Array.from([1, 0, 0, 1]), 2, 2);
    expect(new Set(id).size).toBe(4);
    expect(nPixels).toEqual([1, 1, 1, 1]);
  });
});
