import { clamp } from './grid-filters.ts';
import type { Landscape } from './landscape.ts';
import { N_REFLECTIVE } from './materials.ts';
import type { Texture } from './texture.ts';

/** Reflectance of deep clear water, six bands. */
const DEEP = [0.024, 0.017, 0.0075, 0.0035, 0.0018, 0.0012] as const;
/** What stirred shelf water adds beside the coast. */
const SHELF = [0.016, 0.0175, 0.0045, 0.0012, 0.0002, 0.0001] as const;
/** What a full load of silt adds. */
export const SILT = [0.028, 0.054, 0.058, 0.021, 0.003, 0.0015] as const;
/** Bottom of clean sand, and of rock and weed. */
const SAND_BOTTOM = [0.09, 0.125, 0.13, 0.16, 0.1, 0.07] as const;
const WEED_BOTTOM = [0.02, 0.032, 0.026, 0.1, 0.05, 0.03] as const;
/** Two-way loss of light per metre of water. */
const LOSS_PER_METER = [0.16, 0.19, 0.68, 5, 30, 40] as const;
const FOAM = [0.36, 0.37, 0.37, 0.34, 0.16, 0.1] as const;

/**
 * Reflectance of one sea pixel, from deep water, bottom seen through it, silt, swell and surf.
 * `depthMeters` is positive; writes six values to `out`.
 */
export function colourSea(land: Landscape, texture: Texture, i: number, depthMeters: number, out: Float64Array): void {
  const { sea, coast } = land;
  const silt = clamp(sea.silt[i] * (1 + 0.16 * texture.middle[i] + 0.2 * texture.broad[i]), 0, 1);
  const glint = 0.0006 * texture.streaks[i] + 0.0011 * texture.broad[i];
  // Shelf water is stirred and full of life; it brightens towards the coast.
  const shelf = Math.exp(-coast.offshorePx[i] / 48) * (0.75 + 0.22 * texture.broad[i] + 0.1 * texture.middle[i]);
  const surf =
    coast.exposure[i] > 0.45 && coast.offshorePx[i] < 2.2
      ? clamp(0.2 * (1 - coast.estuary[i]) * (coast.exposure[i] - 0.3) * (1.1 + 0.8 * texture.fine[i]), 0, 0.3)
      : 0;
  for (let b = 0; b < N_REFLECTIVE; b++) {
    const bottom = WEED_BOTTOM[b] + (SAND_BOTTOM[b] - WEED_BOTTOM[b]) * sea.sand[i];
    const seen = Math.exp(-LOSS_PER_METER[b] * depthMeters * (1 + 2.5 * silt));
    const water = DEEP[b] + SHELF[b] * shelf + SILT[b] * silt + glint;
    const lit = water + (bottom - water) * seen;
    out[b] = Math.max(0.0005, lit + (FOAM[b] - lit) * surf);
  }
}
