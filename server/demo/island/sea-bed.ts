import type { Coastline } from './coastline.ts';
import { drawStroke } from './draw-line.ts';
import { distanceTo } from './distance-transform.ts';
import { fractalNoise } from './fractal-noise.ts';
import { smoothstep } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import { findLeastCostPath } from './least-cost-path.ts';
import type { Rivers } from './rivers.ts';

/** The sea floor. */
export interface SeaBed {
  /** Metres relative to high water, negative downwards; 0 on land. */
  bed: Float32Array;
  /** 0 rock and weed to 1 clean sand. */
  sand: Float32Array;
  /** Relative load of river silt in the water, 0–1. */
  silt: Float32Array;
  /** 1 in the rivers' channels across the shore. */
  channel: Uint8Array;
}

/**
 * Cuts the winding ways of the rivers' water from their mouths to where the sea is deep: broad for
 * the main river, narrow for the rest. Returns both masks, 1 in the channel.
 */
function cutChannels(coast: Coastline, rivers: Rivers): { main: Uint8Array; all: Uint8Array } {
  const winding = fractalNoise(W, H, { seed: 41, wavelengthPx: 40, roughness: 0.5, finestPx: 5 });
  const cost = new Float32Array(ISLAND_PIXELS);
  for (let i = 0; i < ISLAND_PIXELS; i++) {
    cost[i] = coast.isLand[i] ? 400 : Math.exp(0.8 * winding[i]) + 8 / (1 + coast.offshorePx[i]);
  }
  const coverage = new Float32Array(ISLAND_PIXELS);
  const cut = (outlet: number, deepPx: number, widthAt: (step: number) => number): void => {
    const path = findLeastCostPath(cost, W, H, outlet, (cell) => coast.offshorePx[cell] > deepPx);
    if (!path) throw new Error('A river has no way to the open sea.');
    for (let k = 1; k < path.length; k++) {
      const a = path[k - 1];
      const b = path[k];
      drawStroke(coverage, a % W, Math.floor(a / W), b % W, Math.floor(b / W), widthAt(k));
    }
  };
  const mask = (): Uint8Array => Uint8Array.from(coverage, (share, i) => (share >= 0.5 && !coast.isLand[i] ? 1 : 0));
  cut(rivers.mouth, 45, (step) => 4.2 + Math.min(5, step / 22));
  const main = mask();
  for (const outlet of rivers.outlets) if (outlet !== rivers.mouth) cut(outlet, 12, () => 1.8);
  return { main, all: mask() };
}

/** Shapes the sea floor: shelving sand in coves and the estuary, steep rock off the headlands. */
export function shapeSeaBed(coast: Coastline, rivers: Rivers): SeaBed {
  const channels = cutChannels(coast, rivers);
  const channel = channels.all.map((cut, i) => (cut || (rivers.isWater[i] && !coast.isLand[i]) ? 1 : 0));
  const fromChannel = distanceTo(channels.main, W, H);
  const shoals = fractalNoise(W, H, { seed: 42, wavelengthPx: 60, roughness: 0.58 });
  const banks = fractalNoise(W, H, { seed: 43, wavelengthPx: 150, roughness: 0.5 });
  const creeks = fractalNoise(W, H, { seed: 44, wavelengthPx: 24, roughness: 0.6, finestPx: 3 });
  const bed = new Float32Array(ISLAND_PIXELS);
  const sand = new Float32Array(ISLAND_PIXELS);
  const silt = new Float32Array(ISLAND_PIXELS);
  for (let i = 0; i < ISLAND_PIXELS; i++) {
    const off = coast.offshorePx[i];
    const shelter = 1 - coast.exposure[i];
    const inEstuary = coast.estuary[i];
    const gully = Math.abs(creeks[i]) < 0.16 ? 1 : 0;
    if (!coast.isLand[i]) {
      const fall = 0.9 * (1 - 0.72 * shelter * smoothstep(-0.6, 0.8, banks[i])) + 0.2;
      const open = -fall * off + (0.7 + 0.05 * off) * shoals[i];
      const flats =
        -0.25 -
        0.05 * off -
        0.0042 * Math.max(0, off - 26) ** 2 +
        0.62 * shoals[i] -
        3.6 * Math.exp(-((fromChannel[i] / 6) ** 2)) -
        0.8 * gully;
      bed[i] = Math.min(0.2, open + (flats - open) * inEstuary);
      if (channel[i]) bed[i] = Math.min(bed[i], -4.5);
      sand[i] = Math.max(smoothstep(0.2, 1, shelter + 0.3 * banks[i]), 0.75 * inEstuary);
    }
    const plume = Math.exp(-fromChannel[i] / 70) * (0.75 + 0.3 * shoals[i]);
    silt[i] = Math.max(0, Math.min(1, plume + 0.36 * inEstuary * Math.exp(-off / 60) + 0.18 * Math.exp(-off / 6)));
  }
  return { bed, sand, silt, channel };
}
