import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, test } from 'vitest';
import type { HumanSample, Island, IslandBand, IslandScene } from '../../server/demo/island/generate-island.ts';
import { drawHumanSamples, generateIsland } from '../../server/demo/island/generate-island.ts';
import { pixelsInside, ringsOverlap } from '../../server/demo/island/sample-geometry.ts';

// Expected ranges: common practice for mid-latitude optical scenes, no single source.

let island: Island;
let samples: HumanSample[];

beforeAll(() => {
  island = generateIsland();
  samples = drawHumanSamples(island);
}, 120_000);

function digestOf(made: Island): string {
  const hash = createHash('sha256').update(made.trueClass);
  for (const scene of made.scenes) {
    for (const band of scene.bands) hash.update(new Uint8Array(band.dn.buffer, band.dn.byteOffset, band.dn.byteLength));
  }
  return hash.digest('hex');
}

function bandOf(scene: IslandScene, role: IslandBand['role']): IslandBand {
  return scene.bands.find((band) => band.role === role)!;
}

/** Mean reflectance of a class's pixels that hold data. */
function meanOf(band: IslandBand, classCode: number): number {
  let sum = 0;
  let n = 0;
  for (let i = 0; i < band.dn.length; i++) {
    if (island.trueClass[i] !== classCode || band.dn[i] === band.nodata) continue;
    sum += band.dn[i] * band.scale + band.offset;
    n++;
  }
  return sum / n;
}

function countClasses(): number[] {
  const counts = new Array<number>(11).fill(0);
  for (const code of island.trueClass) counts[code]++;
  return counts;
}

/** A sample's open ring in fractional pixels. */
function inPixels(sample: HumanSample): [number, number][] {
  return sample.ring
    .slice(0, -1)
    .map(([x, y]) => [(x - island.originX) / island.pixelMeters, (island.originY - y) / island.pixelMeters]);
}

describe('the island', () => {
  test('lies on its grid in UTM zone 28N with the thermal band on its own 90 m grid', () => {
    expect(island).toMatchObject({ width: 1200, height: 1000, pixelMeters: 30, epsg: 32628 });
    expect(island.trueClass).toHaveLength(1_200_000);
    for (const scene of island.scenes) {
      expect(scene.bands.map((b) => b.role)).toEqual(['blue', 'green', 'red', 'nir', 'swir1', 'swir2', 'thermal']);
      for (const band of scene.bands) {
        const [width, height] = band.role === 'thermal' ? [400, 334] : [1200, 1000];
        expect([band.width, band.height, band.dn.length]).toEqual([width, height, width * height]);
      }
    }
    expect(island.scenes[0].acquiredOn < island.scenes[1].acquiredOn).toBe(true);
  });

  test('comes out the same, byte for byte, when made again', () => {
    const again = generateIsland();
    expect(digestOf(again)).toBe(digestOf(island));
    expect(drawHumanSamples(again)).toEqual(samples);
  }, 120_000);

  test('holds every class on at least 0.3 % of its land and on no code beyond ten', () => {
    const counts = countClasses();
    const nLand = counts.slice(2).reduce((a, b) => a + b, 0);
    expect(counts[0]).toBe(0);
    for (let code = 1; code <= 10; code++) expect(counts[code]).toBeGreaterThan(0.003 * nLand);
    expect(nLand / island.trueClass.length).toBeGreaterThan(0.45);
    expect(nLand / island.trueClass.length).toBeLessThan(0.65);
  });

  test('is ringed by sea on all four sides', () => {
    const { width, height, trueClass } = island;
    for (let x = 0; x < width; x++) expect(trueClass[x] + trueClass[(height - 1) * width + x]).toBe(2);
    for (let y = 0; y < height; y++) expect(trueClass[y * width] + trueClass[y * width + width - 1]).toBe(2);
  });
});

describe('its scenes', () => {
  test('the spring scene ends in a slanted wedge of nodata, the late-summer scene in none', () => {
    const [spring, lateSummer] = island.scenes;
    for (const band of lateSummer.bands) expect(band.dn.includes(band.nodata)).toBe(false);
    for (const band of spring.bands) {
      const emptyInRow = (y: number): number => {
        const row = band.dn.subarray(y * band.width, (y + 1) * band.width);
        const n = row.filter((v) => v === band.nodata).length;
        expect(row.subarray(band.width - n).every((v) => v === band.nodata)).toBe(true);
        return n;
      };
      const [top, middle] = [emptyInRow(0), emptyInRow(Math.floor(band.height / 5))];
      expect(top).toBeGreaterThan(middle);
      expect(middle).toBeGreaterThan(0);
      expect(emptyInRow(band.height - 1)).toBe(0);
    }
  });

  test('plants reflect more near infrared than red and water almost none', () => {
    for (const scene of island.scenes) {
      const [red, nir] = [bandOf(scene, 'red'), bandOf(scene, 'nir')];
      for (const plants of [3, 4, 5, 6, 7, 8]) expect(meanOf(nir, plants)).toBeGreaterThan(1.4 * meanOf(red, plants));
      expect(meanOf(nir, 1)).toBeLessThan(0.04);
      expect(meanOf(nir, 1)).toBeLessThan(meanOf(red, 1));
    }
  });

  test('reflectances and temperatures stay within what a sensor meets', () => {
    for (const scene of island.scenes) {
      for (const band of scene.bands) {
        const [low, high] = band.role === 'thermal' ? [270, 320] : [-0.02, 0.75];
        let lowest = Infinity;
        let highest = -Infinity;
        for (const dn of band.dn) {
          if (dn === band.nodata) continue;
          lowest = Math.min(lowest, dn * band.scale + band.offset);
          highest = Math.max(highest, dn * band.scale + band.offset);
        }
        expect(lowest, `${scene.name} ${band.name}`).toBeGreaterThan(low);
        expect(highest, `${scene.name} ${band.name}`).toBeLessThan(high);
      }
    }
  });

  test('the dates differ: woods come into leaf, the tide leaves the flats, the sea warms', () => {
    const [spring, lateSummer] = island.scenes;
    expect(meanOf(bandOf(lateSummer, 'nir'), 4)).toBeGreaterThan(meanOf(bandOf(spring, 'nir'), 4) + 0.05);
    expect(meanOf(bandOf(lateSummer, 'nir'), 2)).toBeGreaterThan(meanOf(bandOf(spring, 'nir'), 2) + 0.02);
    const seaKelvin = (scene: IslandScene): number => {
      const band = bandOf(scene, 'thermal');
      return band.dn[band.width * (band.height - 10)] * band.scale + band.offset;
    };
    expect(seaKelvin(lateSummer)).toBeGreaterThan(seaKelvin(spring) + 2);
  });
});

describe('the samples people drew', () => {
  test('number about 250, at least 15 for each class, by both labellers', () => {
    expect(samples.length).toBeGreaterThanOrEqual(230);
    expect(samples.length).toBeLessThanOrEqual(270);
    for (let code = 1; code <= 10; code++) {
      expect(samples.filter((s) => s.classCode === code).length).toBeGreaterThanOrEqual(15);
    }
    for (const who of ['a', 'b'] as const) {
      expect(samples.filter((s) => s.labeller === who).length).toBeGreaterThan(80);
    }
  });

  test('are closed, simple, counter-clockwise rings inside the grid', () => {
    for (const { ring } of samples) {
      expect(ring[0]).toEqual(ring[ring.length - 1]);
      let twiceArea = 0;
      for (let k = 1; k < ring.length; k++) twiceArea += ring[k - 1][0] * ring[k][1] - ring[k][0] * ring[k - 1][1];
      expect(twiceArea).toBeGreaterThan(0);
      for (const [x, y] of ring) {
        expect(x > island.originX && x < island.originX + 36_000).toBe(true);
        expect(y < island.originY && y > island.originY - 30_000).toBe(true);
      }
      const sides = ring.slice(1).map((to, k) => [ring[k], to] as const);
      for (let a = 0; a < sides.length; a++) {
        for (let b = a + 2; b < sides.length; b++) {
          if (a === 0 && b === sides.length - 1) continue;
          expect(ringsOverlap([...sides[a]], [...sides[b]])).toBe(false);
        }
      }
    }
  });

  test('do not overlap one another', () => {
    const rings = samples.map(inPixels);
    const owner = new Map<number, number>();
    rings.forEach((ring, k) => {
      for (let other = 0; other < k; other++) expect(ringsOverlap(ring, rings[other])).toBe(false);
      for (const pixel of pixelsInside(ring, island.width, island.height)) {
        expect(owner.has(pixel)).toBe(false);
        owner.set(pixel, k);
      }
    });
  });

  test('cover 12 to 122 pixels, mostly but not all of the class they name', () => {
    let nPixels = 0;
    let nTrue = 0;
    let nMistaken = 0;
    let nMixed = 0;
    for (const sample of samples) {
      const pixels = pixelsInside(inPixels(sample), island.width, island.height);
      expect(pixels.length).toBeGreaterThanOrEqual(11);
      expect(pixels.length).toBeLessThanOrEqual(123);
      const right = pixels.filter((p) => island.trueClass[p] === sample.classCode).length;
      nPixels += pixels.length;
      nTrue += right;
      if (right < 0.5 * pixels.length) nMistaken++;
      else if (right < pixels.length) nMixed++;
    }
    expect(nTrue / nPixels).toBeGreaterThanOrEqual(0.88);
    expect(nTrue / nPixels).toBeLessThan(0.99);
    expect(nMistaken / samples.length).toBeGreaterThan(0.015);
    expect(nMistaken / samples.length).toBeLessThan(0.05);
    expect(nMixed).toBeGreaterThan(20);
  });

  test('are spread over every part of the island', () => {
    const quarters = new Set(
      samples.map((s) => {
        const [x, y] = inPixels(s)[0];
        return `${Math.floor(x / 300)}-${Math.floor(y / 334)}`;
      }),
    );
    expect(quarters.size).toBeGreaterThanOrEqual(11);
  });
});
