import { createRng } from './rng.ts';

export interface LabelledPolygon {
  id: string;
  classIndex: number;
  /** Flat pixel indices of the polygon. */
  pixels: ArrayLike<number>;
}

export interface TrainingPixels {
  /** Flat pixel indices, ascending. */
  pixels: Uint32Array;
  /** Class index of each pixel. */
  labels: Uint8Array;
  /** Pixels of each class before and after the cap. */
  perClass: { available: number; drawn: number }[];
  /** Pixels that polygons of different classes claim; none of them is used. */
  nConflicting: number;
}

/**
 * Draws at most `maxPerClass` training pixels of each class, evenly at random over all pixels of its polygons.
 *
 * A pixel in several polygons of one class counts once. The result depends on the seed and the pixels alone, not on the
 * order of the polygons.
 * @throws RangeError when maxPerClass is not a positive integer or a class index is outside 0..nClasses−1.
 */
export function drawTrainingPixels(
  polygons: readonly LabelledPolygon[],
  nClasses: number,
  maxPerClass: number,
  seed: number,
): TrainingPixels {
  if (!Number.isInteger(maxPerClass) || maxPerClass < 1) {
    throw new RangeError(`At least one pixel a class is needed, got ${maxPerClass}.`);
  }
  const conflict = 255;
  const classOfPixel = new Map<number, number>();
  let nConflicting = 0;
  for (const { id, classIndex, pixels } of polygons) {
    if (!Number.isInteger(classIndex) || classIndex < 0 || classIndex >= Math.min(nClasses, conflict)) {
      throw new RangeError(`Polygon ${id} has class index ${classIndex}, expected 0..${nClasses - 1}.`);
    }
    for (let i = 0; i < pixels.length; i++) {
      const known = classOfPixel.get(pixels[i]);
      if (known === undefined) classOfPixel.set(pixels[i], classIndex);
      else if (known !== classIndex && known !== conflict) {
        classOfPixel.set(pixels[i], conflict);
        nConflicting++;
      }
    }
  }

  const byClass: number[][] = Array.from({ length: nClasses }, () => []);
  for (const [pixel, classIndex] of classOfPixel) if (classIndex !== conflict) byClass[classIndex].push(pixel);
  const chosen: number[] = [];
  const perClass = byClass.map((pixels, classIndex) => {
    const rng = createRng(seed, classIndex);
    const drawn =
      pixels.sort((a, b) => a - b).length <= maxPerClass ? pixels : rng.shuffle(pixels).slice(0, maxPerClass);
    for (const pixel of drawn) chosen.push(pixel);
    return { available: pixels.length, drawn: drawn.length };
  });
  const pixels = Uint32Array.from(chosen).sort();
  const labels = Uint8Array.from(pixels, (pixel) => classOfPixel.get(pixel) ?? conflict);
  return { pixels, labels, perClass, nConflicting };
}
