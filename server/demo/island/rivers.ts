import type { Coastline } from './coastline.ts';
import { BAY } from './coastline.ts';
import { drawStroke, walkLine } from './draw-line.ts';
import type { Drainage } from './drainage.ts';
import { accumulateFlow, routeDrainage } from './drainage.ts';
import { fractalNoise } from './fractal-noise.ts';
import { clamp, smoothstep } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import { floodLochs } from './lochs.ts';
import type { Relief } from './relief.ts';

/** Flow, in 30 m pixels of catchment, from which a stream is mapped. */
const MAPPED_FLOW = 5200;
/** Flow from which a brook, narrower than half a pixel, tints the ground it runs through. */
const BROOK_FLOW = 1100;
/** Smallest catchment at the mouth of a river that is mapped at all. */
const RIVER_MOUTH_FLOW = 15_000;
/** The main stem is followed up until its catchment is this small. */
const SPRING_FLOW = 110;

/** Rivers and lochs. */
export interface Rivers {
  /** 1 where fresh water fills at least half the pixel, or a stream crosses the shore. */
  isWater: Uint8Array;
  /** Share of the pixel under a stream, 0–1. */
  coverage: Float32Array;
  /** 1 in lochs and the reservoir. */
  isLoch: Uint8Array;
  /** Pixels of catchment above each land pixel. */
  flow: Float32Array;
  /** The main river from spring to mouth, pixel by pixel before its bends are drawn. */
  mainStem: number[];
  /** Height of the water along the main stem, metres; it never rises on the way down. */
  mainStemMeters: number[];
  /** The sea pixel the main river runs into. */
  mouth: number;
  /** The sea pixels all mapped rivers run into, the main one's among them. */
  outlets: number[];
}

/** For each cell, the neighbour above it with the largest catchment, or -1. */
function largestDonors(drainage: Drainage, flow: Float32Array): Int32Array {
  const donor = new Int32Array(ISLAND_PIXELS).fill(-1);
  for (const cell of drainage.order) {
    const to = drainage.receiver[cell];
    if (donor[to] < 0 || flow[cell] > flow[donor[to]]) donor[to] = cell;
  }
  return donor;
}

/**
 * Follows the main river up from its mouth. Where streams meet it takes the one that comes from
 * the highest ground, among those that bring a fair share of the water.
 */
function traceMainStem(drainage: Drainage, flow: Float32Array, elevation: Float32Array, mouth: number): number[] {
  const highest = Float32Array.from(elevation);
  for (let k = drainage.order.length - 1; k >= 0; k--) {
    const cell = drainage.order[k];
    const to = drainage.receiver[cell];
    highest[to] = Math.max(highest[to], highest[cell]);
  }
  const stem = [mouth];
  for (let cell = mouth; ;) {
    let best = -1;
    for (const step of [1, -1, W, -W, W + 1, W - 1, -W + 1, -W - 1]) {
      const up = cell + step;
      if (drainage.receiver[up] !== cell || flow[up] < Math.max(SPRING_FLOW, 0.1 * flow[cell])) continue;
      if (best < 0 || highest[up] > highest[best]) best = up;
    }
    if (best < 0) break;
    stem.push(best);
    cell = best;
  }
  return stem.reverse();
}

function findMainMouth(drainage: Drainage, flow: Float32Array, isLand: Uint8Array): number {
  let mouth = -1;
  for (const cell of drainage.order) {
    if (isLand[drainage.receiver[cell]]) continue;
    const away = Math.hypot((cell % W) - BAY.x, Math.floor(cell / W) - BAY.y);
    if (away < 260 && (mouth < 0 || flow[cell] > flow[mouth])) mouth = cell;
  }
  return mouth;
}

/** The cells that carry a stream or brook. Each one's receiver carries one too, down to the sea. */
function selectStreams(drainage: Drainage, flow: Float32Array, isLand: Uint8Array, mainStem: number[]): Uint8Array {
  const carries = new Uint8Array(ISLAND_PIXELS);
  const mouthFlow = new Float32Array(ISLAND_PIXELS);
  for (const cell of drainage.order) {
    const to = drainage.receiver[cell];
    mouthFlow[cell] = isLand[to] ? mouthFlow[to] : flow[cell];
    if (flow[cell] >= BROOK_FLOW && mouthFlow[cell] >= RIVER_MOUTH_FLOW) carries[cell] = 1;
  }
  for (const cell of mainStem) carries[cell] = 1;
  return carries;
}

/**
 * Lays rivers along the flow of water: the main one from a spring on the high ground to the
 * estuary, tributaries joining it. Every stroke runs from a cell to the cell it drains to, so no
 * river has a loose end; bends come from one shared field, so junctions stay joined.
 */
export function layRivers(coast: Coastline, relief: Relief): Rivers {
  const unevenness = fractalNoise(W, H, { seed: 31, wavelengthPx: 18, roughness: 0.6, finestPx: 2 });
  const bendX = fractalNoise(W, H, { seed: 32, wavelengthPx: 30, roughness: 0.5, finestPx: 5 });
  const bendY = fractalNoise(W, H, { seed: 33, wavelengthPx: 30, roughness: 0.5, finestPx: 5 });
  const surface = relief.elevation.map((z, i) => (coast.isLand[i] ? Math.max(0.1, z + 0.8 * unevenness[i]) : 0));
  const drainage = routeDrainage(surface, coast.isLand, W, H, 0.05);
  const flow = accumulateFlow(drainage);
  const donor = largestDonors(drainage, flow);

  const mouthCell = findMainMouth(drainage, flow, coast.isLand);
  const mainStem = traceMainStem(drainage, flow, relief.elevation, mouthCell);
  const carries = selectStreams(drainage, flow, coast.isLand, mainStem);
  const streams = drainage.order.filter((cell) => carries[cell] === 1);

  const px = new Float32Array(ISLAND_PIXELS);
  const py = new Float32Array(ISLAND_PIXELS);
  const place = (cell: number): void => {
    const loose = 5.5 * smoothstep(110, 12, relief.elevation[cell]) * smoothstep(2, 16, coast.inlandPx[cell]);
    px[cell] = clamp((cell % W) + loose * bendX[cell], 2, W - 3);
    py[cell] = clamp(Math.floor(cell / W) + loose * bendY[cell], 2, H - 3);
  };
  for (const cell of streams) {
    place(cell);
    place(drainage.receiver[cell]);
  }
  // Smooth the staircase of the grid along each stream.
  for (let pass = 0; pass < 6; pass++) {
    for (const cell of streams) {
      const up = donor[cell];
      const down = drainage.receiver[cell];
      if (up < 0 || !carries[up]) continue;
      px[cell] = 0.25 * px[up] + 0.5 * px[cell] + 0.25 * px[down];
      py[cell] = 0.25 * py[up] + 0.5 * py[cell] + 0.25 * py[down];
    }
  }

  const onMainStem = new Uint8Array(ISLAND_PIXELS);
  for (const cell of mainStem) onMainStem[cell] = 1;
  const coverage = new Float32Array(ISLAND_PIXELS);
  const isWater = new Uint8Array(ISLAND_PIXELS);
  for (const cell of streams) {
    const to = drainage.receiver[cell];
    const isMapped = flow[cell] >= MAPPED_FLOW || onMainStem[cell] === 1;
    const widthPx = clamp(0.62 * Math.sqrt(flow[cell] / MAPPED_FLOW), 0.25, isMapped ? 4.2 : 0.45);
    drawStroke(coverage, px[cell], py[cell], px[to], py[to], widthPx);
    if (!isMapped) continue;
    walkLine(px[cell], py[cell], px[to], py[to], (pixel) => {
      isWater[pixel] = 1;
    });
  }
  const isLoch = floodLochs(coast, relief, drainage, flow);
  for (let i = 0; i < ISLAND_PIXELS; i++) {
    if (isLoch[i]) coverage[i] = 1;
    if (!coast.isLand[i]) coverage[i] = 0;
    else if (coverage[i] >= 0.5 || isLoch[i]) isWater[i] = 1;
    if (isWater[i]) coverage[i] = Math.max(coverage[i], 0.55);
  }
  const outlets = Array.from(streams)
    .filter((cell) => !coast.isLand[drainage.receiver[cell]] && (flow[cell] >= MAPPED_FLOW || cell === mouthCell))
    .map((cell) => drainage.receiver[cell]);
  return {
    isWater,
    coverage,
    isLoch,
    flow,
    mainStem,
    mainStemMeters: mainStem.map((cell) => drainage.filled[cell]),
    mouth: drainage.receiver[mouthCell],
    outlets,
  };
}
