import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readTraining } from '../../server/jobs/compute/read-training.ts';
import type { RunPolygon, SceneInput } from '../../server/jobs/compute/tasks.ts';
import type { BandFile } from '../../server/raster/band-file.ts';
import { BandStore } from '../../server/raster/band-store.ts';
import { ingestBands } from '../../server/raster/ingest-bands.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { makeRaster } from '../factories/make-raster.ts';

const WIDTH = 80;
const HEIGHT = 60;
/** Every pixel has a value of its own, which tells where a training row came from; the first row has no data. */
const value = (_band: number, column: number, row: number) => (row === 0 ? 0 : row * WIDTH + column);

const store = new BandStore();
let dir: string;
let bands: BandFile[];
let scene: SceneInput;

beforeAll(async () => {
  dir = await mkdtemp(join(tmpdir(), 'groundsel-training-'));
  const source = join(dir, 'source.tif');
  await makeRaster(source, { width: WIDTH, height: HEIGHT, bandNames: ['A'], value });
  await ingestBands(source, await inspectSource(source), join(dir, 'bands'));
  const bandPaths = [join(dir, 'bands/band-01.tif')];
  bands = [await store.open(bandPaths[0]!)];
  scene = { grid: bands[0]!.grid, bandPaths, studyArea: null };
});

afterAll(async () => {
  await store.close();
  await rm(dir, { recursive: true, force: true });
});

function box(classIndex: number, x0: number, y0: number, x1: number, y1: number): RunPolygon {
  const ring = [
    [x0, y0],
    [x0, y1],
    [x1, y1],
    [x1, y0],
    [x0, y0],
  ] as const;
  return { id: `${classIndex}:${x0},${y0}`, classIndex, polygon: [ring] };
}

function read(training: RunPolygon[], heldOut: RunPolygon[], change: { cap?: number; seed?: number } = {}) {
  const { cap = 10_000, seed = 1 } = change;
  const progress = new Int32Array(new SharedArrayBuffer(4));
  return readTraining({ scene, training, heldOut, nClasses: 2, maxPixelsPerClass: cap, seed, progress }, bands);
}

/** Pixels the rows came from. */
const pixelsOf = ({ set }: Awaited<ReturnType<typeof read>>) => new Set(set.features);

describe('the training set of a run', () => {
  it('holds no pixel of a held-out polygon, even where a training polygon covers it', async () => {
    const data = await read(
      [box(0, 2, 10, 12, 20), box(1, 40, 10, 50, 20)],
      [box(0, 8, 10, 20, 20), box(1, 60, 10, 70, 20)],
    );
    const pixels = pixelsOf(data);
    for (let row = 10; row < 20; row++) {
      for (let column = 8; column < 20; column++) expect(pixels.has(row * WIDTH + column)).toBe(false);
    }
    expect(data.set.nRows).toBe(60 + 100);
    expect(data.nHeldOutToo).toBe(40);
  });

  it('holds no pixel without data, none of two classes, and each other pixel once with its class', async () => {
    const data = await read([box(0, 0, 0, 10, 4), box(0, 5, 2, 15, 4), box(1, 12, 2, 20, 4)], []);
    expect(data.nWithoutData).toBe(10);
    // Columns 12 to 14 of rows 2 and 3 belong to both classes.
    expect(data.nConflicting).toBe(6);
    expect(data.perClass).toEqual([
      { available: 30 + 10 - 6, drawn: 34 },
      { available: 10, drawn: 10 },
    ]);
    expect(pixelsOf(data).size).toBe(data.set.nRows);
    data.set.features.forEach((pixel, i) => expect(data.set.labels[i]).toBe(pixel % WIDTH >= 15 ? 1 : 0));
  });

  it('draws the same pixels for a seed, whatever the order of the polygons, and others for another', async () => {
    const training = [box(0, 0, 10, 30, 30), box(0, 0, 32, 30, 50), box(1, 40, 10, 70, 50)];
    const first = await read(training, [], { cap: 50 });
    expect(first.perClass.map(({ drawn }) => drawn)).toEqual([50, 50]);
    expect((await read([...training].reverse(), [], { cap: 50 })).set).toEqual(first.set);
    expect((await read(training, [], { cap: 50, seed: 2 })).set.features).not.toEqual(first.set.features);
  });

  it('stays within the study area', async () => {
    scene = { ...scene, studyArea: [box(0, 0, 0, 20, 60).polygon] };
    try {
      const data = await read([box(0, 10, 10, 30, 20), box(1, 0, 30, 5, 35)], []);
      for (const pixel of pixelsOf(data)) expect(pixel % WIDTH).toBeLessThan(20);
      expect(data.nWithoutData).toBe(100);
    } finally {
      scene = { ...scene, studyArea: null };
    }
  });
});
