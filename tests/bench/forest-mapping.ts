/**
 * Maps a full-size scene with a random forest, end to end (reading, classifying, writing), against a plain scikit-learn
 * script on the same band files, rows, trees and threads; and watches the memory of our processes.
 * Run: npm run bench:mapping [-- --width=7600 --height=7800 --threads=2 --trees=100 --repeat=1]
 */
import { spawn } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { trainModel } from '../../server/analysis/classifiers/classifier.ts';
import { defaultRandomForestParams, randomForest } from '../../server/analysis/classifiers/random-forest.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';
import { drawSceneRows, makeFullScene, nSceneBands, nSceneClasses } from './full-scene.ts';
import { measureProcessTree } from './process-memory.ts';
import { describeMachine, printRatio, readOption, runReference } from './reference-run.ts';

/** What map-process.ts is told. */
export interface MapOrder {
  dataDir: string;
  grid: RasterGrid;
  bandPaths: string[];
  modelPath: string;
  threads: number;
  trees: number;
  nClasses: number;
  nRows: number;
}

/** What map-process.ts says. */
interface MapOutcome {
  seconds: number;
  /** Seconds from the start at which each step began. */
  steps: Record<string, number>;
}

const N_ROWS = 10_000;
const WINDOW_ROWS = 256;

/** Seconds and peak memory of mapping in a process of its own. */
async function mapOurs(order: MapOrder): Promise<MapOutcome & { peakBytes: number }> {
  const orderPath = join(order.dataDir, 'order.json');
  await writeFile(orderPath, JSON.stringify(order));
  const script = fileURLToPath(new URL('./map-process.ts', import.meta.url));
  const child = spawn(process.execPath, ['--import', 'tsx', script, orderPath], {
    stdio: ['ignore', 'pipe', 'inherit'],
    env: { ...process.env, TSX_TSCONFIG_PATH: fileURLToPath(new URL('../../server/tsconfig.json', import.meta.url)) },
  });
  let peakBytes = 0;
  const watch = setInterval(() => (peakBytes = Math.max(peakBytes, measureProcessTree(child.pid ?? -1))), 250);
  let out = '';
  child.stdout.on('data', (chunk: Buffer) => (out += chunk.toString()));
  const code = await new Promise<number | null>((resolve) => child.once('close', resolve));
  clearInterval(watch);
  if (code !== 0) throw new Error(`map-process.ts ended with ${code}`);
  return { ...(JSON.parse(out) as MapOutcome), peakBytes };
}

async function main(folder: string): Promise<void> {
  const [width, height] = [readOption('width', 7600), readOption('height', 7800)];
  const [threads, trees] = [readOption('threads', 2), readOption('trees', 100)];
  const repeat = readOption('repeat', 1);
  const scene = await makeFullScene(width, height, folder);
  const set = drawSceneRows(scene, N_ROWS, 1);
  const paths = [join(folder, 'features'), join(folder, 'labels')];
  await writeFile(paths[0], set.features);
  await writeFile(paths[1], set.labels);
  const { model } = trainModel(randomForest, set, { ...defaultRandomForestParams, trees }, 1);
  const modelPath = join(folder, 'model.bin');
  await writeFile(modelPath, model.serialise());
  console.log(
    `${describeMachine()}; ${scene.source} mirrored, with noise: ${width} × ${height}, ${nSceneBands} bands of uint16`,
  );
  const { grid, bandPaths } = scene;
  const order = { dataDir: folder, grid, bandPaths, modelPath, threads, trees, nClasses: nSceneClasses, nRows: N_ROWS };
  const ours: number[] = [];
  const reference: number[] = [];
  let peakBytes = 0;
  for (let pass = 0; pass < repeat; pass++) {
    const mapped = await mapOurs(order);
    ours.push(mapped.seconds);
    const steps = Object.entries(mapped.steps).map(([step, at]) => `${step} from ${at.toFixed(1)} s`);
    console.log(`  ours: ${steps.join(', ')}, done after ${mapped.seconds.toFixed(1)} s`);
    peakBytes = Math.max(peakBytes, mapped.peakBytes);
    await rm(join(folder, 'files'), { recursive: true });
    const maxFeatures = Math.floor(Math.sqrt(nSceneBands));
    const numbers = [trees, maxFeatures, threads, WINDOW_ROWS].map(String);
    const args = [...paths, ...numbers, join(folder, 'theirs.tif'), ...bandPaths];
    reference.push(runReference<{ seconds: number }>('map_forest.py', args).seconds);
  }
  printRatio(`mapping, ${trees} trees, ${threads === 1 ? '1 thread' : `${threads} threads`}`, ours, reference);
  console.log(`  our processes together at most ${(peakBytes / 1e6).toFixed(0)} MB`);
}

const folder = await mkdtemp(join(tmpdir(), 'bench-mapping-'));
try {
  await main(folder);
} finally {
  await rm(folder, { recursive: true });
}
