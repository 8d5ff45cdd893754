import { seededRng } from './seeded-rng.ts';

/** What kind of fractal surface to make; lengths in pixels. */
export interface FractalRecipe {
  seed: number;
  /** Lattice spacing of the broadest octave. */
  wavelengthPx: number;
  /** Amplitude of each octave relative to the one before; 0.5 is smooth land, 0.7 is rough. */
  roughness: number;
  /** Octaves finer than this are left out. */
  finestPx?: number;
  /** Stretch along the columns: above 1 the features lie east–west. */
  stretchX?: number;
}

/** The four weights of the uniform cubic B-spline at fraction t between two lattice points. */
function splineWeights(t: number, out: Float64Array, at: number): void {
  const s = 1 - t;
  out[at] = (s * s * s) / 6;
  out[at + 1] = (3 * t * t * t - 6 * t * t + 4) / 6;
  out[at + 2] = (3 * s * s * s - 6 * s * s + 4) / 6;
  out[at + 3] = (t * t * t) / 6;
}

/** Adds one octave of B-spline lattice noise, its lattice filled with standard normals, to `out`. */
function addOctave(
  out: Float32Array,
  width: number,
  height: number,
  spacingX: number,
  spacingY: number,
  amplitude: number,
  seed: number,
): void {
  const rng = seededRng(seed);
  const nx = Math.ceil(width / spacingX) + 5;
  const ny = Math.ceil(height / spacingY) + 5;
  const phaseX = rng.next();
  const phaseY = rng.next();
  const weightX = new Float64Array(width * 4);
  const leftX = new Int32Array(width);
  for (let x = 0; x < width; x++) {
    const p = x / spacingX + phaseX;
    leftX[x] = Math.floor(p);
    splineWeights(p - leftX[x], weightX, x * 4);
  }
  const latticeRow = new Float64Array(nx);
  const rows = new Float32Array(ny * width);
  for (let j = 0; j < ny; j++) {
    for (let i = 0; i < nx; i++) latticeRow[i] = rng.normal();
    for (let x = 0; x < width; x++) {
      const l = leftX[x];
      const w = x * 4;
      rows[j * width + x] =
        weightX[w] * latticeRow[l] +
        weightX[w + 1] * latticeRow[l + 1] +
        weightX[w + 2] * latticeRow[l + 2] +
        weightX[w + 3] * latticeRow[l + 3];
    }
  }
  const weightY = new Float64Array(4);
  for (let y = 0; y < height; y++) {
    const p = y / spacingY + phaseY;
    const top = Math.floor(p);
    splineWeights(p - top, weightY, 0);
    const a = weightY[0] * amplitude;
    const b = weightY[1] * amplitude;
    const c = weightY[2] * amplitude;
    const d = weightY[3] * amplitude;
    let r = top * width;
    let o = y * width;
    for (let x = 0; x < width; x++, r++, o++) {
      out[o] += a * rows[r] + b * rows[r + width] + c * rows[r + 2 * width] + d * rows[r + 3 * width];
    }
  }
}

/**
 * Makes a fractal surface of summed octaves (fractional Brownian motion), scaled to mean 0 and
 * standard deviation 1. Row-major, width × height.
 */
export function fractalNoise(width: number, height: number, recipe: FractalRecipe): Float32Array {
  const out = new Float32Array(width * height);
  const stretch = recipe.stretchX ?? 1;
  const finest = recipe.finestPx ?? 1.6;
  let amplitude = 1;
  let octave = 0;
  // 1.93 rather than 2 keeps the lattices of the octaves from lining up.
  for (let spacing = recipe.wavelengthPx; spacing >= finest; spacing /= 1.93) {
    addOctave(out, width, height, spacing * stretch, spacing, amplitude, recipe.seed * 64 + octave);
    amplitude *= recipe.roughness;
    octave++;
  }
  let sum = 0;
  let squares = 0;
  for (const v of out) {
    sum += v;
    squares += v * v;
  }
  const mean = sum / out.length;
  const scale = 1 / Math.sqrt(Math.max(1e-12, squares / out.length - mean * mean));
  for (let i = 0; i < out.length; i++) out[i] = (out[i] - mean) * scale;
  return out;
}
