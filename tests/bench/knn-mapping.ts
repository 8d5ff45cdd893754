/**
 * k nearest neighbours (5 of 3000 rows, 6 bands, standardised) against scikit-learn's kd_tree on the same pixels; ours with
 * each thread's share of the pixels in a worker thread, started before the clock.
 * Run: npm run bench:knn [-- --repeat=3 --pixels=200000]
 */
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { trainModel } from '../../server/analysis/classifiers/classifier.ts';
import { nearestNeighbours } from '../../server/analysis/classifiers/nearest-neighbours.ts';
import { createWorkerPool } from '../../server/jobs/worker-pool.ts';
import { drawSceneRows, makeFullScene, nSceneBands } from './full-scene.ts';
import type { PredictTask } from './predict-worker.ts';
import { describeMachine, printRatio, readOption, runReference } from './reference-run.ts';

const repeat = readOption('repeat', 3);
const nPixels = readOption('pixels', 200_000);
const k = 5;

async function main(folder: string): Promise<void> {
  const scene = await makeFullScene(1024, 1024, folder);
  const set = drawSceneRows(scene, 3000, 1);
  const { grid } = scene;
  const pixels = Float32Array.from({ length: nPixels * nSceneBands }, (_, i) => {
    const pixel = Math.floor(i / nSceneBands);
    return scene.valueAt(i % nSceneBands, pixel % grid.width, Math.floor(pixel / grid.width));
  });
  const paths = ['features', 'labels', 'pixels'].map((name) => join(folder, name));
  await Promise.all([set.features, set.labels, pixels].map((array, i) => writeFile(paths[i], array)));
  const model = trainModel(nearestNeighbours, set, { k, standardise: true }, 0).model.serialise();
  console.log(`${describeMachine()}; ${scene.source} with noise, ${nPixels} pixels; median of ${repeat}`);
  for (const threads of [1, 2]) {
    const entry = new URL('./predict-worker.ts', import.meta.url);
    const pool = createWorkerPool<PredictTask, Uint8Array>({ entry, threads });
    const chunk = Math.ceil(nPixels / threads);
    const run = (n: number) =>
      Promise.all(
        Array.from({ length: threads }, (_, t) => {
          const features = pixels.subarray(t * chunk * nSceneBands, Math.min(nPixels, t * chunk + n) * nSceneBands);
          return pool.run({ model, features });
        }),
      );
    const ours: number[] = [];
    const reference: number[] = [];
    let differing = 0;
    try {
      await run(Math.min(chunk, 20_000));
      for (let pass = 0; pass < repeat; pass++) {
        const began = performance.now();
        const classes = Buffer.concat(await run(chunk));
        ours.push((performance.now() - began) / 1000);
        const out = join(folder, 'classes');
        const args = [...paths, ...[nSceneBands, k, threads].map(String), out];
        reference.push(runReference<{ seconds: number }>('predict_neighbours.py', args).seconds);
        const theirs = await readFile(out);
        differing = classes.reduce((sum, c, i) => sum + (c === theirs[i] ? 0 : 1), 0);
      }
    } finally {
      await pool.destroy();
    }
    printRatio(`k-NN, ${threads === 1 ? '1 thread' : `${threads} threads`}`, ours, reference);
    const rate = Math.round(nPixels / Math.min(...ours));
    console.log(`  ours at best ${rate} pixels/s; ${differing} of ${nPixels} pixels differ (ties)`);
  }
}

const folder = await mkdtemp(join(tmpdir(), 'bench-knn-'));
try {
  await main(folder);
} finally {
  await rm(folder, { recursive: true });
}
