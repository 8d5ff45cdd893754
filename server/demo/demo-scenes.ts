import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { basename } from 'node:path';
import type { App } from '../app-context.ts';
import { createScene, type UploadedFile } from '../services/create-scene.ts';
import { loadSceneRow, updateScene } from '../services/scenes.ts';
import type { IslandFiles } from './make-island-files.ts';

type IslandSceneFiles = IslandFiles['scenes'][number];

async function describeUpload(path: string): Promise<UploadedFile> {
  const bytes = await readFile(path);
  return { name: basename(path), path, bytes: bytes.length, sha256: createHash('sha256').update(bytes).digest('hex') };
}

async function uploadScene(app: App, projectId: string, byId: string, scene: IslandSceneFiles): Promise<string> {
  const files: UploadedFile[] = [];
  for (const { path } of scene.bands) files.push(await describeUpload(path));
  return createScene(app, projectId, byId, { name: scene.name, acquiredOn: scene.acquiredOn, files });
}

/** Uploads both scenes, one file a band, as a person would; ids of spring and late summer. */
export async function uploadDemoScenes(
  app: App,
  projectId: string,
  byId: string,
  scenes: IslandFiles['scenes'],
): Promise<[spring: string, lateSummer: string]> {
  const [spring, lateSummer] = scenes;
  if (!spring || !lateSummer) throw new Error(`The island has ${scenes.length} scenes, wanted two.`);
  return [await uploadScene(app, projectId, byId, spring), await uploadScene(app, projectId, byId, lateSummer)];
}

/** Fills the band tables from what the generator knows of its sensor. */
export async function setUpDemoBands(
  app: App,
  byId: string,
  ids: readonly string[],
  scenes: IslandFiles['scenes'],
): Promise<void> {
  for (const [place, id] of ids.entries()) {
    const { scene } = await loadSceneRow(app, id);
    const made = scenes[place]?.bands ?? [];
    const bands = scene.bands.map((band, at) => {
      const known = made[at];
      if (!known) throw new Error(`The demo scene has ${scene.bands.length} bands, the island ${made.length}.`);
      return {
        id: band.id,
        name: known.name,
        role: known.role,
        centreWavelengthUm: known.wavelengthUm,
        gsdMeters: known.gsdMeters,
        scale: known.scale,
        offset: known.offset,
        quantity: known.role === 'thermal' ? ('kelvin' as const) : ('reflectance' as const),
      };
    });
    await updateScene(app, scene, byId, { version: scene.version, bands });
  }
}
