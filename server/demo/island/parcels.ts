import { fractalNoise } from './fractal-noise.ts';
import { hashUnit, seededRng } from './seeded-rng.ts';

/** How to divide the ground; lengths in pixels, areas in pixels. */
export interface ParcelRecipe {
  seed: number;
  /** Spacing of the farms (or quarters) that share one grain. */
  districtPx: number;
  smallestPx: number;
  largestPx: number;
  /** Greatest ratio of length to width. */
  longest: number;
  /** How far boundaries bend. */
  bendPx: number;
}

/** A division of the whole grid into parcels. */
export interface Parcels {
  id: Int32Array;
  /** Distance to the nearest boundary, pixels. */
  edgePx: Float32Array;
  /** 1 for the broader boundaries between districts. */
  isDistrictEdge: Uint8Array;
  nParcels: number;
}

/** Splits of a convex piece of ground, each a line a·x + b·y = c, or a leaf. */
interface Split {
  a: number;
  b: number;
  c: number;
  /** Child indices; in a leaf both are −(parcel + 1). */
  low: number;
  high: number;
}

interface District {
  x: number;
  y: number;
  turn: number;
  stretch: number;
  root: number;
}

function splitGround(
  splits: Split[],
  rng: ReturnType<typeof seededRng>,
  box: [x0: number, y0: number, x1: number, y1: number],
  target: number,
  nextParcel: () => number,
): number {
  const [x0, y0, x1, y1] = box;
  const wide = x1 - x0;
  const tall = y1 - y0;
  const index = splits.length;
  splits.push({ a: 0, b: 0, c: 0, low: 0, high: 0 });
  const split = splits[index];
  if (wide * tall <= target * rng.range(0.75, 1.9)) {
    split.low = split.high = -nextParcel() - 1;
    return index;
  }
  const slant = rng.normal() * 0.06;
  const share = rng.range(0.34, 0.66);
  if (wide > tall * rng.range(0.85, 1.15)) {
    const at = x0 + wide * share;
    split.a = 1;
    split.b = slant;
    split.c = at + slant * (y0 + tall / 2);
    split.low = splitGround(splits, rng, [x0, y0, at, y1], target, nextParcel);
    split.high = splitGround(splits, rng, [at, y0, x1, y1], target, nextParcel);
  } else {
    const at = y0 + tall * share;
    split.a = slant;
    split.b = 1;
    split.c = at + slant * (x0 + wide / 2);
    split.low = splitGround(splits, rng, [x0, y0, x1, at], target, nextParcel);
    split.high = splitGround(splits, rng, [x0, at, x1, y1], target, nextParcel);
  }
  return index;
}

/**
 * Divides the grid into long, unequal, four-sided parcels: districts around scattered farms, each
 * with its own direction, cut again and again until the pieces are small enough.
 */
export function divideGround(width: number, height: number, recipe: ParcelRecipe): Parcels {
  const rng = seededRng(recipe.seed);
  const grain = fractalNoise(width, height, { seed: recipe.seed, wavelengthPx: 260, roughness: 0.5, finestPx: 20 });
  const bendX = fractalNoise(width, height, { seed: recipe.seed + 1, wavelengthPx: 90, roughness: 0.5, finestPx: 5 });
  const bendY = fractalNoise(width, height, { seed: recipe.seed + 2, wavelengthPx: 90, roughness: 0.5, finestPx: 5 });
  const step = recipe.districtPx;
  const nx = Math.ceil(width / step) + 4;
  const ny = Math.ceil(height / step) + 4;
  const splits: Split[] = [];
  const districts: District[] = [];
  let nParcels = 0;
  const nextParcel = (): number => nParcels++;
  for (let j = 0; j < ny; j++) {
    for (let i = 0; i < nx; i++) {
      const x = (i - 2 + rng.range(0.08, 0.92)) * step;
      const y = (j - 2 + rng.range(0.08, 0.92)) * step;
      const gx = Math.min(width - 1, Math.max(0, Math.round(x)));
      const gy = Math.min(height - 1, Math.max(0, Math.round(y)));
      const turn = 0.9 * grain[gy * width + gx] + rng.normal() * 0.22;
      const stretch = Math.sqrt(rng.range(1, recipe.longest));
      const reach = step * 2.4;
      const target = recipe.smallestPx * (recipe.largestPx / recipe.smallestPx) ** rng.next();
      const root = splitGround(
        splits,
        rng,
        [-reach / stretch, -reach * stretch, reach / stretch, reach * stretch],
        target,
        nextParcel,
      );
      districts.push({ x, y, turn, stretch, root });
    }
  }

  const id = new Int32Array(width * height);
  const edgePx = new Float32Array(width * height);
  const isDistrictEdge = new Uint8Array(width * height);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const i = y * width + x;
      const bx = x + recipe.bendPx * bendX[i];
      const by = y + recipe.bendPx * bendY[i];
      const ci = Math.floor(bx / step) + 2;
      const cj = Math.floor(by / step) + 2;
      let first = Infinity;
      let second = Infinity;
      let nearest = 0;
      let runnerUp = 0;
      for (let j = Math.max(0, cj - 2); j <= Math.min(ny - 1, cj + 2); j++) {
        for (let k = Math.max(0, ci - 2); k <= Math.min(nx - 1, ci + 2); k++) {
          const d = districts[j * nx + k];
          const away = (bx - d.x) * (bx - d.x) + (by - d.y) * (by - d.y);
          if (away < first) {
            second = first;
            runnerUp = nearest;
            first = away;
            nearest = j * nx + k;
          } else if (away < second) {
            second = away;
            runnerUp = j * nx + k;
          }
        }
      }
      const d = districts[nearest];
      const e = districts[runnerUp];
      const toDistrictEdge = (second - first) / (2 * Math.hypot(d.x - e.x, d.y - e.y) + 1e-6);
      const cos = Math.cos(d.turn);
      const sin = Math.sin(d.turn);
      // Cutting shrunken ground into squarish pieces gives long ones on the real ground.
      const u = ((bx - d.x) * cos + (by - d.y) * sin) / d.stretch;
      const v = (-(bx - d.x) * sin + (by - d.y) * cos) * d.stretch;
      let edge = toDistrictEdge;
      let at = d.root;
      for (;;) {
        const s = splits[at];
        if (s.low < 0) {
          id[i] = -s.low - 1;
          break;
        }
        const side = s.a * u + s.b * v - s.c;
        edge = Math.min(edge, Math.abs(side) / Math.hypot(s.a / d.stretch, s.b * d.stretch));
        at = side < 0 ? s.low : s.high;
      }
      edgePx[i] = edge;
      if (toDistrictEdge < 0.7) isDistrictEdge[i] = 1;
    }
  }
  return { id, edgePx, isDistrictEdge, nParcels };
}

/** Mean of `values` over each parcel. */
export function meanByParcel(parcels: Parcels, values: ArrayLike<number>): Float32Array {
  const sum = new Float64Array(parcels.nParcels);
  const n = new Uint32Array(parcels.nParcels);
  for (let i = 0; i < parcels.id.length; i++) {
    sum[parcels.id[i]] += values[i];
    n[parcels.id[i]]++;
  }
  return Float32Array.from(sum, (s, p) => (n[p] > 0 ? s / n[p] : 0));
}

/** A lasting random number in [0, 1) for a parcel. */
export function parcelUnit(parcel: number, salt: number): number {
  return hashUnit(parcel, salt);
}
