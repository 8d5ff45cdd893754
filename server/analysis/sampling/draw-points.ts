import { drawRanks } from './draw-ranks.ts';

/** Rows of a raster of strata, from `firstRow`, row-major and `width` pixels wide. */
export interface StrataStrip {
  firstRow: number;
  width: number;
  /** Code of the stratum of each pixel; other codes than those asked for are outside (nodata, not in the study area). */
  codes: ArrayLike<number>;
}

/** A stratum to draw in: its code in the raster, and a key that names it for good (its seed stream hangs on it). */
export interface DrawStratum {
  code: number;
  key: string;
}

/** A drawn pixel; row 0, column 0 is the upper left one, its centre at + 0.5. */
export interface DrawnPoint {
  /** Place of the stratum in the list given. */
  stratum: number;
  /** Place in the stratum's order of drawing, from 0. */
  order: number;
  row: number;
  column: number;
}

/**
 * First pass: counts the pixels of each stratum, strip by strip, in any order.
 * @throws RangeError when a code or a key comes twice.
 */
export function createStrataCounter(strata: readonly DrawStratum[]): {
  addStrip(strip: StrataStrip): void;
  sizes(): number[];
} {
  const places = placesOf(strata);
  const sizes = strata.map(() => 0);
  return {
    addStrip({ codes }) {
      for (let i = 0; i < codes.length; i++) {
        const place = places.get(codes[i]);
        if (place !== undefined) sizes[place]++;
      }
    },
    sizes: () => [...sizes],
  };
}

/**
 * Second pass: finds the pixels of a stratified random draw without replacement, strip by strip from the top.
 *
 * `wanted[h]` pixels are drawn in stratum h by rank (its n-th pixel in row-major order), so that only the draw is in
 * memory and never the raster. The same seed, keys and raster give the same points; larger numbers give the same points
 * and more after them.
 * @throws RangeError when a stratum is asked for more pixels than `sizes` says, strips do not follow each other, or the
 * raster turns out to hold other numbers than the first pass counted.
 */
export function createPointFinder(
  strata: readonly DrawStratum[],
  sizes: readonly number[],
  wanted: readonly number[],
  seed: number,
): { addStrip(strip: StrataStrip): void; points(): DrawnPoint[] } {
  const places = placesOf(strata);
  const queues = strata.map(({ key }, stratum) => {
    const ranks = drawRanks(sizes[stratum], wanted[stratum], seed, key);
    const byRank = Array.from(ranks, (rank, order) => ({ rank, order })).sort((a, b) => a.rank - b.rank);
    return { byRank, nSeen: 0, nFound: 0 };
  });
  const found: DrawnPoint[] = [];
  let nextRow = 0;
  return {
    addStrip({ firstRow, width, codes }) {
      if (firstRow !== nextRow) throw new RangeError(`Expected a strip from row ${nextRow}, got row ${firstRow}.`);
      nextRow += codes.length / width;
      for (let i = 0; i < codes.length; i++) {
        const stratum = places.get(codes[i]);
        if (stratum === undefined) continue;
        const queue = queues[stratum];
        const next = queue.byRank[queue.nFound];
        if (next?.rank === queue.nSeen++) {
          found.push({ stratum, order: next.order, row: firstRow + Math.floor(i / width), column: i % width });
          queue.nFound++;
        }
      }
    },
    points() {
      queues.forEach(({ nSeen }, h) => {
        if (nSeen !== sizes[h]) throw new RangeError(`Stratum ${h} holds ${nSeen} pixels, ${sizes[h]} were counted.`);
      });
      return [...found].sort((a, b) => a.stratum - b.stratum || a.order - b.order);
    },
  };
}

function placesOf(strata: readonly DrawStratum[]): Map<number, number> {
  const places = new Map(strata.map(({ code }, place) => [code, place]));
  const keys = new Set(strata.map(({ key }) => key));
  if (places.size !== strata.length || keys.size !== strata.length) {
    throw new RangeError('Each stratum needs a code and a key of its own.');
  }
  return places;
}
