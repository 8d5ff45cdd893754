import type { App } from '../app-context.ts';
import type { Band } from '../entities/band.ts';
import type { Scene } from '../entities/scene.ts';
import { probePixel, type PixelProbe, type ProbeValue } from '../raster/probe.ts';
import { requireGrid } from './scenes.ts';

export interface SceneProbe {
  /** Null outside the scene. */
  pixel: PixelProbe | null;
  bands: readonly Band[];
  /** In the order of the bands; empty outside the scene. */
  values: readonly ProbeValue[];
}

/** Every band's value in the scene pixel that holds a position in degrees on WGS84. */
export async function probeScene(app: App, scene: Scene, lon: number, lat: number): Promise<SceneProbe> {
  const { grid, crs } = requireGrid(scene);
  const bands = await Promise.all(
    scene.bands.map(async ({ fileKey, scale, offset }) => ({
      path: await app.files.localPath(fileKey),
      scale,
      offset,
    })),
  );
  const pixel = await probePixel({ crs, grid, bands, lon, lat }, app.bands);
  return { pixel, bands: pixel ? scene.bands : [], values: pixel?.values ?? [] };
}
