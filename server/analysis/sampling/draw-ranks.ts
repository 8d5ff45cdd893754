import { createRng, hashText } from './rng.ts';

/**
 * Draws `n` of `size` units without replacement, as ranks 0..size−1 in the order of drawing.
 *
 * The order is the beginning of one fixed random permutation of the stratum, given by seed, key and size: a larger n
 * begins with the smaller one's ranks, so a design grows without being drawn again. Every set of n units is equally
 * likely. Memory goes with n, not with size.
 * Source: Fisher–Yates shuffle, kept sparse (Knuth, The Art of Computer Programming 2, sec. 3.4.2).
 * @throws RangeError when n exceeds size or either is not a whole number, or size is over 2³².
 */
export function drawRanks(size: number, n: number, seed: number, key: string): Float64Array {
  if (!Number.isInteger(size) || size < 0 || size > 0x100000000) {
    throw new RangeError(`A stratum of 0 to 2^32 units is needed, got ${size}.`);
  }
  if (!Number.isInteger(n) || n < 0 || n > size) throw new RangeError(`Cannot draw ${n} of ${size} units.`);
  const rng = createRng(seed, hashText(key));
  const moved = new Map<number, number>();
  return Float64Array.from({ length: n }, (_, i) => {
    const j = i + rng.nextBelow(size - i);
    const drawn = moved.get(j) ?? j;
    moved.set(j, moved.get(i) ?? i);
    moved.delete(i);
    return drawn;
  });
}
