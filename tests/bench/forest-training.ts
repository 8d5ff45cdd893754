/**
 * Training of the random forest against scikit-learn's, the same data, trees, features a split and threads; ours through
 * the server's own worker threads, which are started before the clock.
 * Run: npm run bench:training [-- --repeat=3]
 */
import { randomUUID } from 'node:crypto';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { TrainingSet } from '../../server/analysis/classifiers/classifier.ts';
import { createRng } from '../../server/analysis/sampling/rng.ts';
import { runComputeTask } from '../../server/jobs/compute/run-compute-task.ts';
import { forEachLimited } from '../../server/jobs/for-each-limited.ts';
import { openWorkerPools } from '../../server/jobs/open-worker-pools.ts';
import type { WorkerPools } from '../../server/jobs/worker-pools.ts';
import { planTrainingTasks } from '../../server/services/run-shares.ts';
import type { ClassifierRecipe } from '../../shared/contracts/run.ts';
import { loadSatellite } from '../fixtures/satellite.ts';
import { describeMachine, printRatio, readOption, runReference } from './reference-run.ts';

/** By the clock, and of the processors: the second is what a busy machine disturbs least. */
interface Timing {
  seconds: number;
  cpuSeconds: number;
}

const repeat = readOption('repeat', 3);
const never = new AbortController().signal;

/** Overlapping clouds of real numbers, one a class. */
function makeClouds(nRows: number, nFeatures: number, nClasses: number): TrainingSet {
  const rng = createRng(5);
  const features = new Float32Array(nRows * nFeatures);
  const labels = Uint8Array.from({ length: nRows }, () => rng.nextBelow(nClasses));
  for (let i = 0; i < features.length; i++) {
    const f = i % nFeatures;
    const centre = ((labels[Math.floor(i / nFeatures)] * (f + 3) * 37) % 10) * 0.4;
    features[i] = centre + (rng.nextFloat() + rng.nextFloat() + rng.nextFloat() - 1.5) * 2;
  }
  return { features, labels, nRows, nFeatures, nClasses };
}

async function trainOurs(pools: WorkerPools, set: TrainingSet, trees: number, seed: number): Promise<Timing> {
  const classifier: ClassifierRecipe = {
    ...{ kind: 'random-forest', trees, maxDepth: 64, minLeaf: 1, featuresPerTree: null, classWeights: 'none' },
  };
  const setId = randomUUID();
  const cpu = process.cpuUsage();
  const began = performance.now();
  const { threads } = pools.compute;
  const tasks = planTrainingTasks(classifier, set, trees, [...Array(trees).keys()], threads);
  await forEachLimited(tasks, threads, never, async (parts) => {
    await runComputeTask(pools.compute, 'train-parts', { set, setId, classifier, seed, parts }, never);
  });
  const seconds = (performance.now() - began) / 1000;
  const { user, system } = process.cpuUsage(cpu);
  return { seconds, cpuSeconds: (user + system) / 1e6 };
}

/** As a run holds it: in shared memory, so that threads do not copy it. */
function share(set: TrainingSet): TrainingSet {
  const features = new Float32Array(new SharedArrayBuffer(set.features.byteLength));
  features.set(set.features);
  const labels = new Uint8Array(new SharedArrayBuffer(set.labels.byteLength));
  labels.set(set.labels);
  return { ...set, features, labels };
}

async function compare(name: string, given: TrainingSet, trees: number, folder: string): Promise<void> {
  const set = share(given);
  const paths = [join(folder, 'features'), join(folder, 'labels')] as const;
  await writeFile(paths[0], given.features);
  await writeFile(paths[1], given.labels);
  const maxFeatures = Math.floor(Math.sqrt(set.nFeatures));
  for (const threads of [1, 2]) {
    const pools = openWorkerPools({ workerThreads: threads, tileCacheMb: 1 });
    const ours: Timing[] = [];
    const reference: Timing[] = [];
    try {
      // Threads start with their first task and compile what they run.
      await trainOurs(pools, set, 150 * threads, 99);
      for (let seed = 0; seed < repeat; seed++) {
        ours.push(await trainOurs(pools, set, trees, seed));
        const args = [...paths, ...[set.nFeatures, trees, maxFeatures, threads, seed].map(String)];
        reference.push(runReference<Timing>('fit_forest.py', args));
      }
    } finally {
      await pools.close();
    }
    const what = `${name}, ${trees} trees, ${threads === 1 ? '1 thread' : `${threads} threads`}`;
    const pick = (timings: Timing[], key: keyof Timing) => timings.map((timing) => timing[key]);
    printRatio(what, pick(ours, 'seconds'), pick(reference, 'seconds'));
    printRatio(`  in processor time`, pick(ours, 'cpuSeconds'), pick(reference, 'cpuSeconds'));
  }
}

const folder = await mkdtemp(join(tmpdir(), 'bench-training-'));
try {
  console.log(`${describeMachine()}; median of ${repeat}`);
  await compare('Statlog Satellite, 4435 × 36', loadSatellite().train, 100, folder);
  await compare('clouds, 20 000 × 10', makeClouds(20_000, 10, 8), readOption('trees', 500), folder);
} finally {
  await rm(folder, { recursive: true });
}
