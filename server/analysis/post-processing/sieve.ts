import { labelPatches, type Neighbours } from './label-patches.ts';
import { listNeighbours } from './patch-neighbours.ts';
import { PatchQueue } from './patch-queue.ts';

export interface SieveOptions {
  /** Patches smaller than this go; a patch of just this area stays. */
  minAreaM2: number;
  neighbours: Neighbours;
  nodata: number;
}

export interface Sieved {
  codes: Uint8Array;
  /** Patches that were merged into another. */
  nMerged: number;
  /** Patches below the minimum that touch no other patch, such as an islet in nodata: they stay. */
  nLeft: number;
}

/** Sums of row areas may differ in the last digits from the product meant. */
const ROUNDING = 1e-9;

/**
 * Removes patches below a minimum mapping unit: the smallest first (of equal ones the one met first, row by row) takes the code of
 * its largest neighbour (of equal ones again the one met first) and grows together with it, until no patch below the minimum has
 * a neighbour. Areas are not rounded to pixels: a patch stays when its pixels' areas add up to the minimum. The map's border and
 * nodata end a patch and take nothing in. Unlike a single pass over all patches (gdal_sieve), this leaves none below the minimum
 * but patches without any neighbour.
 *
 * @param codes width × height, row-major
 * @param rowAreaM2 area of a pixel of each row
 */
export function sieve(
  codes: Uint8Array,
  width: number,
  rowAreaM2: Float64Array,
  { minAreaM2, neighbours, nodata }: SieveOptions,
): Sieved {
  const patches = labelPatches(codes, width, rowAreaM2, neighbours, nodata);
  const { labels, count, areaM2, code } = patches;
  const least = minAreaM2 * (1 - ROUNDING);
  const isSmall = new Uint8Array(count);
  const queue = new PatchQueue();
  for (let patch = 0; patch < count; patch++) {
    if (areaM2[patch] >= least) continue;
    isSmall[patch] = 1;
    queue.push(patch, areaM2[patch]);
  }
  const { start, neighbour } = listNeighbours(patches, width, neighbours, isSmall);
  const parent = Int32Array.from({ length: count }, (_, patch) => patch);
  // The patches a merged one is made of, as a chain; only those below the minimum are followed.
  const nextMember = new Int32Array(count).fill(-1);
  const lastMember = Int32Array.from(parent);
  const find = (patch: number): number => {
    let root = patch;
    while (parent[root] !== root) {
      parent[root] = parent[parent[root]];
      root = parent[root];
    }
    return root;
  };
  /** The lower number is kept, so that "met first" stays true of what has grown together. */
  const join = (a: number, b: number, newCode: number): number => {
    const [root, other] = a < b ? [a, b] : [b, a];
    parent[other] = root;
    areaM2[root] += areaM2[other];
    code[root] = newCode;
    nextMember[lastMember[root]] = other;
    lastMember[root] = lastMember[other];
    return root;
  };
  let nMerged = 0;
  let nLeft = 0;
  for (let entry = queue.pop(); entry; entry = queue.pop()) {
    const { patch } = entry;
    if (parent[patch] !== patch || areaM2[patch] !== entry.areaM2) continue;
    const around = new Set<number>();
    for (let member = patch; member >= 0; member = nextMember[member]) {
      for (let i = start[member]; i < start[member + 1]; i++) {
        const other = find(neighbour[i]);
        if (other !== patch) around.add(other);
      }
    }
    let largest = -1;
    for (const other of around) {
      const isLarger = largest < 0 || areaM2[other] > areaM2[largest];
      if (isLarger || (areaM2[other] === areaM2[largest] && other < largest)) largest = other;
    }
    if (largest < 0) {
      nLeft++;
      continue;
    }
    nMerged++;
    const newCode = code[largest];
    const same = [...around].filter((other) => other !== largest && code[other] === newCode);
    let root = join(patch, largest, newCode);
    // The patch may have stood between others of the code it takes: they hang together now.
    for (const other of same) root = join(root, other, newCode);
    if (areaM2[root] < least) queue.push(root, areaM2[root]);
  }
  const out = new Uint8Array(codes.length);
  for (let i = 0; i < codes.length; i++) out[i] = labels[i] < 0 ? nodata : code[find(labels[i])];
  return { codes: out, nMerged, nLeft };
}
