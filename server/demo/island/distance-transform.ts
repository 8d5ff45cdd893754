const FAR = 1e12;

/** One pass of the squared distance transform along a line of n values, in place. */
function transformLine(f: Float64Array, n: number, hull: Int32Array, bounds: Float64Array, out: Float64Array): void {
  let k = 0;
  hull[0] = 0;
  bounds[0] = -FAR;
  bounds[1] = FAR;
  for (let q = 1; q < n; q++) {
    let s = 0;
    for (;;) {
      const p = hull[k];
      s = (f[q] + q * q - (f[p] + p * p)) / (2 * (q - p));
      if (s > bounds[k] || k === 0) break;
      k--;
    }
    if (s <= bounds[k]) s = bounds[k];
    k++;
    hull[k] = q;
    bounds[k] = s;
    bounds[k + 1] = FAR;
  }
  k = 0;
  for (let q = 0; q < n; q++) {
    while (bounds[k + 1] < q) k++;
    const d = q - hull[k];
    out[q] = d * d + f[hull[k]];
  }
}

/**
 * Euclidean distance in pixels from each pixel centre to the nearest one where `mask` is non-zero.
 * Felzenszwalb & Huttenlocher (2012), Distance transforms of sampled functions.
 */
export function distanceTo(mask: ArrayLike<number>, width: number, height: number): Float32Array {
  const longest = Math.max(width, height);
  const f = new Float64Array(longest);
  const out = new Float64Array(longest);
  const hull = new Int32Array(longest);
  const bounds = new Float64Array(longest + 1);
  const squares = new Float64Array(width * height);
  for (let x = 0; x < width; x++) {
    for (let y = 0; y < height; y++) f[y] = mask[y * width + x] ? 0 : 1e9;
    transformLine(f, height, hull, bounds, out);
    for (let y = 0; y < height; y++) squares[y * width + x] = out[y];
  }
  const distance = new Float32Array(width * height);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) f[x] = squares[y * width + x];
    transformLine(f, width, hull, bounds, out);
    for (let x = 0; x < width; x++) distance[y * width + x] = Math.sqrt(out[x]);
  }
  return distance;
}
