import { createRng } from './rng.ts';

export interface PlacedPolygon {
  id: string;
  /** A point of the polygon, in the units of the block size. */
  x: number;
  y: number;
}

/**
 * Puts polygons into k folds by the square block of ground they lie in, so that neighbours stay together and a fold is judged by
 * ground apart from what was learned from. Blocks go, the fullest first, to the fold with the fewest polygons; among equally
 * full ones the seed decides. The result does not depend on the order given.
 * Source: Roberts et al. 2017, Ecography 40:913–929 (cross-validation by spatial blocks).
 * @returns the fold 0..k−1 of each polygon
 * @throws RangeError when k is not an integer of 2 or more, the size is not positive, or there are fewer blocks than folds
 */
export function assignBlockFolds(
  polygons: readonly PlacedPolygon[],
  blockSize: number,
  k: number,
  seed: number,
): Map<string, number> {
  if (!Number.isInteger(k) || k < 2) throw new RangeError(`Two folds or more are needed, got ${k}.`);
  if (!(blockSize > 0)) throw new RangeError(`A block has a size above 0, got ${blockSize}.`);
  const blocks = new Map<string, string[]>();
  const inOrder = [...polygons].sort((a, b) => (a.id < b.id ? -1 : 1));
  for (const { id, x, y } of inOrder) {
    const key = `${Math.floor(x / blockSize)} ${Math.floor(y / blockSize)}`;
    const block = blocks.get(key);
    if (block) block.push(id);
    else blocks.set(key, [id]);
  }
  if (blocks.size < k) {
    throw new RangeError(`The polygons lie in ${blocks.size} blocks; ${k} folds need at least ${k}.`);
  }
  const keys = createRng(seed).shuffle([...blocks.keys()].sort());
  const ids = keys.map((key) => blocks.get(key)!).sort((a, b) => b.length - a.length);
  const sizes = new Array<number>(k).fill(0);
  const foldOf = new Map<string, number>();
  for (const block of ids) {
    const fold = sizes.indexOf(Math.min(...sizes));
    sizes[fold] += block.length;
    for (const id of block) foldOf.set(id, fold);
  }
  return foldOf;
}
