/** 0 below `low`, 1 above `high`, a smooth cubic between; `low` may be the greater of the two. */
export function smoothstep(low: number, high: number, value: number): number {
  const t = Math.min(1, Math.max(0, (value - low) / (high - low)));
  return t * t * (3 - 2 * t);
}

/** Keeps a value within [low, high]. */
export function clamp(value: number, low: number, high: number): number {
  return value < low ? low : value > high ? high : value;
}

function gaussianKernel(sigma: number): Float64Array {
  const radius = Math.ceil(sigma * 3);
  const kernel = new Float64Array(radius * 2 + 1);
  let sum = 0;
  for (let k = -radius; k <= radius; k++) sum += kernel[k + radius] = Math.exp(-(k * k) / (2 * sigma * sigma));
  for (let k = 0; k < kernel.length; k++) kernel[k] /= sum;
  return kernel;
}

/** Convolves with a Gaussian of `sigma` pixels; the edge pixel is repeated beyond the edge. */
export function gaussianBlur(source: ArrayLike<number>, width: number, height: number, sigma: number): Float32Array {
  const kernel = gaussianKernel(sigma);
  const radius = (kernel.length - 1) / 2;
  const across = new Float32Array(width * height);
  const padded = new Float64Array(width + 2 * radius);
  for (let y = 0; y < height; y++) {
    const row = y * width;
    for (let x = -radius; x < width + radius; x++) padded[x + radius] = source[row + clamp(x, 0, width - 1)];
    for (let x = 0; x < width; x++) {
      let sum = 0;
      for (let k = 0; k < kernel.length; k++) sum += kernel[k] * padded[x + k];
      across[row + x] = sum;
    }
  }
  const out = new Float32Array(width * height);
  for (let y = 0; y < height; y++) {
    const to = y * width;
    for (let k = -radius; k <= radius; k++) {
      const from = clamp(y + k, 0, height - 1) * width;
      const weight = kernel[k + radius];
      for (let x = 0; x < width; x++) out[to + x] += weight * across[from + x];
    }
  }
  return out;
}

/** Averages `factor` × `factor` blocks; blocks cut by the far edges average what there is. */
export function blockAverage(
  source: ArrayLike<number>,
  width: number,
  height: number,
  factor: number,
): { values: Float32Array; width: number; height: number } {
  const w = Math.ceil(width / factor);
  const h = Math.ceil(height / factor);
  const values = new Float32Array(w * h);
  for (let y = 0; y < h; y++) {
    for (let x = 0; x < w; x++) {
      let sum = 0;
      let n = 0;
      for (let yy = y * factor; yy < Math.min(height, (y + 1) * factor); yy++) {
        for (let xx = x * factor; xx < Math.min(width, (x + 1) * factor); xx++) {
          sum += source[yy * width + xx];
          n++;
        }
      }
      values[y * w + x] = sum / n;
    }
  }
  return { values, width: w, height: h };
}

/** Value at a fractional position, bilinear between pixel centres at whole numbers, clamped at the edges. */
export function sampleBilinear(source: ArrayLike<number>, width: number, height: number, x: number, y: number): number {
  const fx = clamp(x, 0, width - 1);
  const fy = clamp(y, 0, height - 1);
  const x0 = Math.min(width - 2, Math.floor(fx));
  const y0 = Math.min(height - 2, Math.floor(fy));
  const i = y0 * width + x0;
  const top = source[i] + (source[i + 1] - source[i]) * (fx - x0);
  const low = source[i + width] + (source[i + width + 1] - source[i + width]) * (fx - x0);
  return top + (low - top) * (fy - y0);
}

/** Enlarges a grid by a whole factor, bilinear between cell centres. */
export function enlarge(source: Float32Array, width: number, height: number, factor: number): Float32Array {
  const w = width * factor;
  const out = new Float32Array(w * height * factor);
  for (let i = 0; i < out.length; i++) {
    const x = ((i % w) + 0.5) / factor - 0.5;
    const y = (Math.floor(i / w) + 0.5) / factor - 0.5;
    out[i] = sampleBilinear(source, width, height, x, y);
  }
  return out;
}
