import type { LabelledPolygon } from './draw-training-pixels.ts';

export interface OwnedPixels {
  /** Flat pixel indices, ascending. */
  pixels: Uint32Array;
  /** For each pixel, the place of its polygon in the list given. */
  owners: Uint32Array;
  /** Pixels of several polygons of one class; the first polygon keeps them. */
  nRepeated: number;
  /** Pixels that polygons of different classes claim; left out, since their reference class is not known. */
  nConflicting: number;
}

/** Gives each pixel to one polygon, so that no pixel counts twice as reference, and none of two classes at all. */
export function assignPixelsOnce(polygons: readonly LabelledPolygon[]): OwnedPixels {
  const conflict = -1;
  const ownerOf = new Map<number, number>();
  const repeated = new Set<number>();
  let nConflicting = 0;
  polygons.forEach(({ classIndex, pixels }, place) => {
    for (let i = 0; i < pixels.length; i++) {
      const pixel = pixels[i];
      const owner = ownerOf.get(pixel);
      if (owner === undefined) ownerOf.set(pixel, place);
      else if (owner === conflict) continue;
      else if (polygons[owner].classIndex === classIndex) repeated.add(pixel);
      else {
        ownerOf.set(pixel, conflict);
        repeated.delete(pixel);
        nConflicting++;
      }
    }
  });
  const kept: number[] = [];
  for (const [pixel, owner] of ownerOf) if (owner !== conflict) kept.push(pixel);
  const pixels = Uint32Array.from(kept).sort();
  const owners = Uint32Array.from(pixels, (pixel) => ownerOf.get(pixel)!);
  return { pixels, owners, nRepeated: repeated.size, nConflicting };
}
