import { distanceTo } from './distance-transform.ts';
import { fractalNoise } from './fractal-noise.ts';
import { gaussianBlur, smoothstep } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import { labelPatches } from './patches.ts';

/** Centre of the estuary bay, in pixels. */
export const BAY = { x: 812, y: 768 } as const;

/** Where land and sea lie; distances in pixels. */
export interface Coastline {
  /** 1 on land above high water. */
  isLand: Uint8Array;
  /** Distance to the nearest sea pixel, on land. */
  inlandPx: Float32Array;
  /** Distance to the nearest land pixel, at sea. */
  offshorePx: Float32Array;
  /** 0 in sheltered coves to 1 on open headlands. */
  exposure: Float32Array;
  /** 0 away from the estuary to 1 in it. */
  estuary: Float32Array;
  /** Land pixels of the island each land pixel belongs to, 0 at sea. */
  islandPixels: Float32Array;
}

function gaussianAt(x: number, y: number, cx: number, cy: number, rx: number, ry: number, turn: number): number {
  const dx = x - cx;
  const dy = y - cy;
  const u = (dx * Math.cos(turn) + dy * Math.sin(turn)) / rx;
  const v = (-dx * Math.sin(turn) + dy * Math.cos(turn)) / ry;
  return Math.exp(-(u * u + v * v));
}

/** Positive on land, negative at sea, before small islets and pools are cleared. */
function outlineField(): Float32Array {
  const broad = fractalNoise(W, H, { seed: 85, wavelengthPx: 270, roughness: 0.57 });
  const fine = fractalNoise(W, H, { seed: 12, wavelengthPx: 60, roughness: 0.66 });
  const bendX = fractalNoise(W, H, { seed: 13, wavelengthPx: 150, roughness: 0.5, finestPx: 6 });
  const bendY = fractalNoise(W, H, { seed: 14, wavelengthPx: 150, roughness: 0.5, finestPx: 6 });
  const field = new Float32Array(ISLAND_PIXELS);
  for (let y = 0; y < H; y++) {
    for (let x = 0; x < W; x++) {
      const i = y * W + x;
      // Bent coordinates keep the bays from being ellipses.
      const bx = x + 26 * bendX[i];
      const by = y + 26 * bendY[i];
      const u = (bx - W * 0.5) / (W * 0.425);
      const v = (by - H * 0.5) / (H * 0.395);
      const r = Math.sqrt(u * u + v * v - 0.2 * u * v);
      let e = 1.1 * (1 - r ** 2) + 0.44 * broad[i] + 0.12 * fine[i];
      e += 0.6 * gaussianAt(bx, by, 470, 430, 330, 260, 0);
      e -= 1.35 * gaussianAt(bx, by, BAY.x, BAY.y, 112, 70, 0.5);
      e -= 1.35 * gaussianAt(bx, by, BAY.x + 130, BAY.y + 105, 150, 62, 0.75);
      e -= 1.15 * gaussianAt(bx, by, 105, 300, 150, 34, 0.35);
      e -= 0.9 * gaussianAt(bx, by, 800, 110, 40, 110, -0.35);
      e -= 0.8 * gaussianAt(bx, by, 300, 905, 44, 90, 0.5);
      const margin = Math.min(x, y, W - 1 - x, H - 1 - y);
      field[i] = e - 2.4 * smoothstep(46, -8, margin + 9 * bendX[i]);
    }
  }
  return field;
}

/** Draws the coast: a fractal outline with bays, islets and coves. */
export function drawCoastline(): Coastline {
  const field = outlineField();
  const isLand = new Uint8Array(ISLAND_PIXELS);
  for (let i = 0; i < ISLAND_PIXELS; i++) isLand[i] = field[i] > 0 ? 1 : 0;
  const patches = labelPatches(isLand, W, H);
  // Sea pools cut off from the open sea become land; single rocks smaller than five pixels go under.
  for (let i = 0; i < ISLAND_PIXELS; i++) {
    const size = patches.nPixels[patches.id[i]];
    if (isLand[i] && size < 5) isLand[i] = 0;
    else if (!isLand[i] && size < 4000) isLand[i] = 1;
  }
  const final = labelPatches(isLand, W, H);
  const isSea = isLand.map((v) => 1 - v);
  const islandPixels = new Float32Array(ISLAND_PIXELS);
  const ragged = fractalNoise(W, H, { seed: 15, wavelengthPx: 90, roughness: 0.5, finestPx: 5 });
  const estuary = new Float32Array(ISLAND_PIXELS);
  for (let y = 0; y < H; y++) {
    for (let x = 0; x < W; x++) {
      const i = y * W + x;
      if (isLand[i]) islandPixels[i] = final.nPixels[final.id[i]];
      estuary[i] = smoothstep(
        0.1,
        0.62,
        gaussianAt(x, y, BAY.x + 20, BAY.y + 12, 190, 130, 0.5) * (1 + 0.18 * ragged[i]),
      );
    }
  }
  const seaShare = gaussianBlur(isSea, W, H, 11);
  const exposure = seaShare.map((v) => smoothstep(0.36, 0.66, v));
  return {
    isLand,
    inlandPx: distanceTo(isSea, W, H),
    offshorePx: distanceTo(isLand, W, H),
    exposure,
    estuary,
    islandPixels,
  };
}
