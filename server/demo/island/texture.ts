import { fractalNoise } from './fractal-noise.ts';
import { ISLAND_HEIGHT as H, ISLAND_WIDTH as W } from './island-grid.ts';

/** Patchiness of the ground at several sizes; each field has mean 0 and standard deviation 1. */
export interface Texture {
  /** Patches of one to a few pixels. */
  fine: Float32Array;
  /** Patches of about half a kilometre. */
  middle: Float32Array;
  /** Patches of several kilometres. */
  broad: Float32Array;
  /** A field whose zero lines wind like creeks. */
  creeks: Float32Array;
  /** Long streaks over the sea surface. */
  streaks: Float32Array;
}

/** Makes the textures both dates share, so that a dry knoll is dry on both. */
export function makeTexture(): Texture {
  return {
    fine: fractalNoise(W, H, { seed: 101, wavelengthPx: 4.5, roughness: 0.8, finestPx: 1 }),
    middle: fractalNoise(W, H, { seed: 102, wavelengthPx: 22, roughness: 0.62 }),
    broad: fractalNoise(W, H, { seed: 103, wavelengthPx: 150, roughness: 0.5, finestPx: 8 }),
    creeks: fractalNoise(W, H, { seed: 104, wavelengthPx: 13, roughness: 0.55, finestPx: 3 }),
    streaks: fractalNoise(W, H, { seed: 105, wavelengthPx: 30, roughness: 0.6, stretchX: 5 }),
  };
}
