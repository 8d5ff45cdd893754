import { createHash } from 'node:crypto';
import type { ArealGeometry } from '../../shared/contracts/geometry.ts';
import type { App } from '../app-context.ts';
import type { Scene } from '../entities/scene.ts';
import { runComputeTask } from '../jobs/compute/run-compute-task.ts';
import type { SampleDigest } from '../jobs/compute/tasks.ts';
import { drawInPixels, openSceneInput, placeScene } from './run-scene.ts';
import type { SampleListRow } from './samples-list.ts';
import { computeContentKey } from './scenes.ts';

/** Pixels of each sample kept for scatter and histograms. */
export const PIXELS_KEPT = 48;
/** Samples a thread summarises at a time, so that others get their turn. */
const BATCH = 250;
/** About 2 KB each for seven bands. */
const MAX_DIGESTS = 40_000;

export type DigestedSample = SampleListRow & SampleDigest;

/** Digests by sample, version and scene; the oldest are given up first. Reading pixels again is only slower. */
const known = new Map<string, SampleDigest>();

/** Reads what the samples hold of a scene, those only that were not read before. Samples without a usable pixel have nPixels 0. */
export async function digestSamples(
  app: App,
  scene: Scene,
  studyArea: ArealGeometry | null,
  samples: readonly SampleListRow[],
): Promise<DigestedSample[]> {
  const placed = placeScene(scene);
  if (!placed) throw new Error(`The scene “${scene.name}” is not ready.`);
  const ground = createHash('sha256')
    .update(`${computeContentKey(scene.bands)} ${scene.id} ${JSON.stringify(studyArea)}`)
    .digest('hex');
  const keyOf = ({ id, version }: SampleListRow) => `${ground} ${id} ${version}`;
  const missing = samples.filter((sample) => !known.has(keyOf(sample)));
  if (missing.length > 0) {
    const input = await openSceneInput(app, placed, scene.bands, studyArea);
    for (let from = 0; from < missing.length; from += BATCH) {
      const batch = missing.slice(from, from + BATCH);
      const polygons = batch.map(({ geometry }) => drawInPixels(placed, geometry));
      const digests = await runComputeTask(
        app.workers.compute,
        'summarise-samples',
        { scene: input, polygons, pixelsKept: PIXELS_KEPT },
        new AbortController().signal,
      );
      batch.forEach((sample, i) => {
        const digest = digests[i];
        if (digest) known.set(keyOf(sample), digest);
      });
    }
  }
  const digested = samples.flatMap((sample) => {
    const digest = known.get(keyOf(sample));
    return digest ? [{ ...sample, ...digest }] : [];
  });
  for (const key of known.keys()) {
    if (known.size <= MAX_DIGESTS) break;
    known.delete(key);
  }
  return digested;
}
