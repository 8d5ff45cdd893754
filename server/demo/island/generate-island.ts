import { ISLAND_EPSG, ISLAND_HEIGHT, ISLAND_WIDTH, ORIGIN_X, ORIGIN_Y, PIXEL_METERS } from './island-grid.ts';
import type { Island } from './island-types.ts';
import { makeLandscape } from './landscape.ts';
import { takeScene } from './sensor.ts';
import { MOMENTS, renderSurface } from './surface.ts';
import { makeTexture } from './texture.ts';

export type { Island, IslandBand, IslandScene } from './island-types.ts';
export type { HumanSample } from './human-samples.ts';
export { drawHumanSamples } from './human-samples.ts';

/**
 * Makes the invented Isle of Vennory: 1200 × 1000 pixels of 30 m in UTM zone 28N, two scenes and
 * the true class of every pixel. Always the same island: every random number comes from fixed seeds.
 */
export function generateIsland(): Island {
  const land = makeLandscape();
  const texture = makeTexture();
  const spring = renderSurface(land, texture, MOMENTS.spring);
  const lateSummer = renderSurface(land, texture, MOMENTS.lateSummer);
  return {
    width: ISLAND_WIDTH,
    height: ISLAND_HEIGHT,
    originX: ORIGIN_X,
    originY: ORIGIN_Y,
    pixelMeters: PIXEL_METERS,
    epsg: ISLAND_EPSG,
    trueClass: land.trueClass,
    scenes: [
      takeScene('spring', 'Spring', '2025-05-09', spring),
      takeScene('lateSummer', 'Late summer', '2025-09-02', lateSummer),
    ],
  };
}
