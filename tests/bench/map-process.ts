/**
 * Maps a scene as a run does (reading, classifying, strips, class map with overviews, counts), in a process of its own so
 * that its memory can be watched; the server's other modules are loaded beside it. Started by forest-mapping.ts.
 */
import { readFile } from 'node:fs/promises';
import type { App } from '../../server/app-context.ts';
import type { Run } from '../../server/entities/run.ts';
import { openWorkerPools } from '../../server/jobs/open-worker-pools.ts';
import { runFiles } from '../../server/services/run-files.ts';
import { mapRun } from '../../server/services/run-mapping.ts';
import type { RunWork } from '../../server/services/run-work.ts';
import { LocalFileStore } from '../../server/storage/local-file-store.ts';
import type { ClassifierRecipe } from '../../shared/contracts/run.ts';
import type { MapOrder } from './forest-mapping.ts';

const order = JSON.parse(await readFile(String(process.argv[2]), 'utf8')) as MapOrder;
await import('../../server/start-server.ts');
const workers = openWorkerPools({ workerThreads: order.threads, tileCacheMb: 256 });
const files = new LocalFileStore(order.dataDir);
const classifier: ClassifierRecipe = {
  ...{ kind: 'random-forest', trees: order.trees, maxDepth: 64, minLeaf: 1, featuresPerTree: null, classWeights: 'none' },
}; // prettier-ignore
/** Seconds from the start to the first word of each step. */
const steps: Record<string, number> = {};
let began = 0;
const run = {
  id: `bench-${order.threads}`,
  recipe: { classifier, minShare: 0 },
  classes: Array.from({ length: order.nClasses }, (_, c) => ({ id: String(c), code: c + 1, name: `Class ${c + 1}`, colour: '#336699' })),
  scene: { name: 'bench' },
  inputSha256: '',
} as Run; // prettier-ignore
const work = {
  // Mapping asks for these two only.
  app: { files, workers } as Partial<App> as App,
  run,
  signal: new AbortController().signal,
  report: (step) => void (steps[step] ??= (performance.now() - began) / 1000),
  placed: { grid: order.grid, proj4: '+proj=utm +zone=28 +datum=WGS84 +units=m +no_defs', wkt: 'EPSG:32628' },
  scene: { grid: order.grid, bandPaths: order.bandPaths, studyArea: null },
  bands: [],
  training: [],
  heldOut: [],
} as RunWork;
await files.write(runFiles(run.id).model, await readFile(order.modelPath));
began = performance.now();
const map = await mapRun(work, order.nRows);
console.log(JSON.stringify({ seconds: (performance.now() - began) / 1000, steps, sha256: map.sha256 }));
await workers.close();
