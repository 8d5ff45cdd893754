/**
 * Leaves out the pixels whose centre is within a distance of any pixel of another set (training pixels near held-out
 * ones).
 *
 * Both sets are flat indices of a grid `width` pixels wide; the distance is Euclidean, in pixels, between centres, and
 * the limit itself counts as near.
 * @returns the pixels kept, in the order given.
 * @throws RangeError when the distance is negative or not finite.
 */
export function dropPixelsNear(
  pixels: Uint32Array,
  others: ArrayLike<number>,
  width: number,
  distancePixels: number,
): Uint32Array {
  if (!(distancePixels >= 0) || !Number.isFinite(distancePixels)) {
    throw new RangeError(`A distance of at least 0 pixels is needed, got ${distancePixels}.`);
  }
  // Buckets as wide as the distance: whatever is near a pixel lies in its bucket or one of the eight around it.
  const bucketSize = Math.max(1, Math.ceil(distancePixels));
  const nBucketColumns = Math.ceil(width / bucketSize) + 2;
  const buckets = new Map<number, number[]>();
  for (let i = 0; i < others.length; i++) {
    const key = bucketOf(others[i]);
    const bucket = buckets.get(key);
    if (bucket) bucket.push(others[i]);
    else buckets.set(key, [others[i]]);
  }
  const limit = distancePixels * distancePixels;
  return pixels.filter((pixel) => !isNear(pixel));

  function bucketOf(pixel: number): number {
    const column = Math.floor((pixel % width) / bucketSize) + 1;
    const row = Math.floor(Math.floor(pixel / width) / bucketSize) + 1;
    return row * nBucketColumns + column;
  }

  function isNear(pixel: number): boolean {
    const column = pixel % width;
    const row = Math.floor(pixel / width);
    const key = bucketOf(pixel);
    for (let step = -1; step <= 1; step++) {
      for (let side = -1; side <= 1; side++) {
        for (const other of buckets.get(key + step * nBucketColumns + side) ?? []) {
          const dx = column - (other % width);
          const dy = row - Math.floor(other / width);
          if (dx * dx + dy * dy <= limit) return true;
        }
      }
    }
    return false;
  }
}
