const asFloat = new Float32Array(1);
const asBits = new Int32Array(asFloat.buffer);

/** The next 32-bit float above a finite one. */
export function nextFloat32(value: number): number {
  asFloat[0] = value;
  if (asFloat[0] === 0) asBits[0] = 1;
  else asBits[0] += asFloat[0] > 0 ? 1 : -1;
  return asFloat[0];
}

/**
 * The 32-bit float t for which "x < t" decides as "x < threshold" does, for every 32-bit float x.
 * Thresholds are doubles; rounding them to the nearest float would move some values to the other side.
 */
export function lessThanThreshold(threshold: number): number {
  const rounded = Math.fround(threshold);
  return rounded < threshold ? nextFloat32(rounded) : rounded;
}

/** The 32-bit float t for which "x < t" decides as "x ≤ threshold" does, for every 32-bit float x. */
export function atMostThreshold(threshold: number): number {
  const rounded = Math.fround(threshold);
  return rounded <= threshold ? nextFloat32(rounded) : rounded;
}
