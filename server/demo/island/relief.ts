import type { Coastline } from './coastline.ts';
import { accumulateFlow, routeDrainage } from './drainage.ts';
import { fractalNoise } from './fractal-noise.ts';
import { blockAverage, clamp, enlarge, gaussianBlur, sampleBilinear, smoothstep } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W, PIXEL_METERS } from './island-grid.ts';

const SUMMIT_METERS = 690;

/** Heights of the land and how steep it is. */
export interface Relief {
  /** Metres above high water; 0 at sea. */
  elevation: Float32Array;
  /** Metres of fall per metre. */
  slope: Float32Array;
}

interface Massif {
  x: number;
  y: number;
  long: number;
  wide: number;
  turn: number;
  rate: number;
}

const MASSIFS: Massif[] = [
  { x: 430, y: 400, long: 205, wide: 92, turn: -0.62, rate: 1 },
  { x: 640, y: 262, long: 120, wide: 74, turn: 0.25, rate: 0.62 },
  { x: 250, y: 640, long: 95, wide: 60, turn: 0.9, rate: 0.3 },
  { x: 930, y: 430, long: 110, wide: 44, turn: 1.1, rate: 0.2 },
  { x: 560, y: 800, long: 120, wide: 34, turn: 0.2, rate: 0.16 },
];

/** Half-size grid of the relative rate at which the rock rises: high in the massifs, low in the vales. */
function upliftRate(): Float32Array {
  const w = W / 2;
  const h = H / 2;
  const broken = fractalNoise(w, h, { seed: 21, wavelengthPx: 60, roughness: 0.55 });
  const rate = new Float32Array(w * h);
  for (let y = 0; y < h; y++) {
    for (let x = 0; x < w; x++) {
      const i = y * w + x;
      let sum = 0.055 + 0.03 * clamp(broken[i] + 0.8, 0, 3);
      for (const m of MASSIFS) {
        const dx = 2 * x + 0.5 - m.x;
        const dy = 2 * y + 0.5 - m.y;
        const u = (dx * Math.cos(m.turn) + dy * Math.sin(m.turn)) / m.long;
        const v = (-dx * Math.sin(m.turn) + dy * Math.cos(m.turn)) / m.wide;
        sum += m.rate * Math.exp(-((u * u + v * v) ** 0.85)) * clamp(1 + 0.28 * broken[i], 0.4, 1.8);
      }
      rate[i] = sum;
    }
  }
  return rate;
}

/**
 * Wears a rising surface down by rivers: the stream-power law dz/dt = U − K·A^m·S with m = 0.45,
 * solved implicitly from the coast upwards (Braun & Willett 2013), with a little slope creep.
 * `cellPx` is the cell size in 30 m pixels; heights are relative.
 */
function wearDown(
  surface: Float32Array,
  uplift: Float32Array,
  isLand: Uint8Array,
  width: number,
  height: number,
  cellPx: number,
  nSteps: number,
): void {
  const TIME_STEP = 9;
  // Uneven rock keeps the valleys from following the grid.
  const hardness = fractalNoise(width, height, { seed: 24, wavelengthPx: 9, roughness: 0.75, finestPx: 1 });
  for (let step = 0; step < nSteps; step++) {
    const drainage = routeDrainage(surface, isLand, width, height, 0.01);
    const flow = accumulateFlow(drainage);
    for (const cell of drainage.order) {
      const to = drainage.receiver[cell];
      const diagonal = Math.abs(cell - to) !== 1 && Math.abs(cell - to) !== width;
      const length = cellPx * (diagonal ? Math.SQRT2 : 1);
      const power =
        (0.11 * Math.exp(0.45 * hardness[cell]) * TIME_STEP * (flow[cell] * cellPx * cellPx) ** 0.45) / length;
      surface[cell] = (drainage.filled[cell] + uplift[cell] * TIME_STEP + power * surface[to]) / (1 + power);
    }
    const creep = 0.5 / cellPx;
    for (let y = 1; y < height - 1; y++) {
      for (let x = 1; x < width - 1; x++) {
        const i = y * width + x;
        if (!isLand[i]) continue;
        const mean = (surface[i - 1] + surface[i + 1] + surface[i - width] + surface[i + width]) / 4;
        surface[i] += creep * (mean - surface[i]);
      }
    }
  }
}

/** Steepness in metres per metre from central differences. */
function slopeOf(elevation: Float32Array): Float32Array {
  const slope = new Float32Array(ISLAND_PIXELS);
  for (let y = 1; y < H - 1; y++) {
    for (let x = 1; x < W - 1; x++) {
      const i = y * W + x;
      slope[i] =
        Math.hypot(elevation[i + 1] - elevation[i - 1], elevation[i + W] - elevation[i - W]) / (2 * PIXEL_METERS);
    }
  }
  return slope;
}

/** Raises the island and lets rivers cut it, coarse first, then fine. */
export function raiseRelief(coast: Coastline): Relief {
  const uplift = upliftRate();
  const rough = fractalNoise(W, H, { seed: 22, wavelengthPx: 90, roughness: 0.6 });
  const onGrid = (factor: 2 | 4) => {
    const land = blockAverage(coast.isLand, W, H, factor);
    return {
      width: land.width,
      height: land.height,
      isLand: Uint8Array.from(land.values, (v) => (v >= 0.5 ? 1 : 0)),
      uplift: factor === 2 ? uplift : blockAverage(uplift, W / 2, H / 2, factor / 2).values,
    };
  };
  const coarse = onGrid(4);
  const start = blockAverage(rough, W, H, 4).values;
  let surface = start.map((v, i) => (coarse.isLand[i] ? 2 + 0.5 * Math.max(-3, v) : 0));
  wearDown(surface, coarse.uplift, coarse.isLand, coarse.width, coarse.height, 4, 40);
  const middle = onGrid(2);
  surface = enlarge(surface, coarse.width, coarse.height, 2).map((v, i) => (middle.isLand[i] ? v : 0));
  wearDown(surface, middle.uplift, middle.isLand, middle.width, middle.height, 2, 10);

  let highest = 0;
  for (const v of surface) if (v > highest) highest = v;
  const scale = SUMMIT_METERS / highest;
  const smooth = gaussianBlur(enlarge(surface, middle.width, middle.height, 2), W, H, 1.1);
  const bendX = fractalNoise(W, H, { seed: 25, wavelengthPx: 26, roughness: 0.55, finestPx: 3 });
  const bendY = fractalNoise(W, H, { seed: 26, wavelengthPx: 26, roughness: 0.55, finestPx: 3 });
  const grain = fractalNoise(W, H, { seed: 23, wavelengthPx: 22, roughness: 0.62 });
  const elevation = new Float32Array(ISLAND_PIXELS);
  for (let i = 0; i < ISLAND_PIXELS; i++) {
    if (!coast.isLand[i]) continue;
    const base = sampleBilinear(smooth, W, H, (i % W) + 2.6 * bendX[i], Math.floor(i / W) + 2.6 * bendY[i]) * scale;
    // Open headlands end in cliffs; sheltered shores slope gently.
    const shore = coast.exposure[i] * 16 * smoothstep(0, 3, coast.inlandPx[i]) + 0.28 * Math.min(14, coast.inlandPx[i]);
    const detail = grain[i] * (0.5 + 7.5 * smoothstep(60, 420, base));
    elevation[i] = Math.max(0.4, base + shore * (1 - 0.85 * coast.estuary[i]) + detail);
  }
  return { elevation, slope: slopeOf(elevation) };
}
