import { mkdtemp, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { App } from '../../server/app-context.ts';
import type { Project } from '../../server/entities/project.ts';
import type { Scene } from '../../server/entities/scene.ts';
import { hashFile } from '../../server/raster/hash-file.ts';
import { createScene } from '../../server/services/create-scene.ts';
import { findScene } from '../../server/services/scenes.ts';
import { makeRaster, type RasterSpec } from './make-raster.ts';

/** Waits until the ingest of a scene has ended, well or badly. */
export async function waitForScene(app: App, sceneId: string): Promise<Scene> {
  const deadline = Date.now() + 60_000;
  for (;;) {
    const scene = await findScene(app, sceneId);
    if (scene && scene.state !== 'ingesting') return scene;
    if (Date.now() > deadline)
      throw new Error(`scene ${sceneId} is still ${scene ? scene.state : 'missing'} after 60 s`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** A scene made the way people make one: small rasters, uploaded and ingested. One file each for several specs. */
export async function makeScene(
  app: App,
  project: Project,
  overrides: Partial<Scene> = {},
  ...rasters: Partial<RasterSpec>[]
): Promise<Scene> {
  const dir = await mkdtemp(join(tmpdir(), 'groundsel-scene-'));
  try {
    const files = [];
    for (const [place, spec] of (rasters.length ? rasters : [{}]).entries()) {
      const name = `part-${place + 1}.tif`;
      const path = join(dir, name);
      await makeRaster(path, spec);
      files.push({ name, path, bytes: (await stat(path)).size, sha256: await hashFile(path) });
    }
    const id = await createScene(app, project.id, overrides.uploadedById ?? null, {
      name: overrides.name ?? 'Late summer',
      acquiredOn: overrides.acquiredOn ?? null,
      files,
    });
    const scene = await waitForScene(app, id);
    if (scene.state !== 'ready') throw new Error(`the made scene was refused: ${JSON.stringify(scene.failure)}`);
    return scene;
  } finally {
    await rm(dir, { recursive: true, force: true });
  }
}
