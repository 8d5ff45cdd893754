import { clamp } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W, PIXEL_METERS } from './island-grid.ts';

/** Where the sun stands. */
export interface Sun {
  azimuthDegrees: number;
  elevationDegrees: number;
}

/**
 * Cosine of the angle between the sun and each pixel's ground, over that of level ground: 1 on the
 * level, more on slopes that face the sun, 0 where the ground turns away from it.
 */
export function relativeIllumination(elevation: Float32Array, sun: Sun): Float32Array {
  const azimuth = (sun.azimuthDegrees * Math.PI) / 180;
  const height = (sun.elevationDegrees * Math.PI) / 180;
  const east = Math.cos(height) * Math.sin(azimuth);
  const north = Math.cos(height) * Math.cos(azimuth);
  const up = Math.sin(height);
  const out = new Float32Array(ISLAND_PIXELS).fill(1);
  for (let y = 1; y < H - 1; y++) {
    for (let x = 1; x < W - 1; x++) {
      const i = y * W + x;
      if (elevation[i] <= 0) continue;
      const dx = (elevation[i + 1] - elevation[i - 1]) / (2 * PIXEL_METERS);
      const dyNorth = (elevation[i - W] - elevation[i + W]) / (2 * PIXEL_METERS);
      const cosine = (up - east * dx - north * dyNorth) / Math.sqrt(1 + dx * dx + dyNorth * dyNorth);
      out[i] = clamp(cosine / up, 0, 1.9);
    }
  }
  return out;
}
