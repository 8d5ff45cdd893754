import type { DrawnPoint } from './draw-points.ts';
import { createPointGrid } from './point-grid.ts';

export interface SpacedDraw {
  /** Points kept, by stratum and in order of drawing. */
  kept: DrawnPoint[];
  /** For each stratum: candidates looked at and left out for lying too near. */
  nTooNear: number[];
  /** For each stratum: points still lacking when the candidates ran out; draw more of them and call again. */
  nLacking: number[];
  /** What the distance does to the estimates, to be said with the design; `null` without one. */
  effect: string | null;
}

export const SPACING_EFFECT =
  'With a least distance the points are no longer a simple random sample of each stratum: where a class lies in small or crowded patches, pixels in the middle of things are drawn less often and lone ones more often. The estimates take all pixels of a stratum as equally likely, so they may be off by an amount the sample cannot show, most for rare classes. The share of candidates left out says how far it goes; without a least distance there is no such error.';

/**
 * Keeps, of candidates in order of drawing, those at least `spacingPixels` from every point kept before, until each
 * stratum has its number.
 *
 * Strata take turns by place in their order, so that none has all its points placed before another. `existing` points (an
 * earlier state of the design) are kept untouched and count towards the numbers: a design is augmented by passing them,
 * with candidates drawn further along the same streams. Distances are between pixel centres, in pixels; `spacingPixels`
 * itself is far enough. Without spacing nothing is left out, and the design is a plain stratified random sample.
 * @throws RangeError when the spacing is negative or not finite.
 */
export function keepSpacing(
  candidates: readonly DrawnPoint[],
  wanted: readonly number[],
  spacingPixels: number,
  existing: readonly DrawnPoint[] = [],
): SpacedDraw {
  if (!(spacingPixels >= 0) || !Number.isFinite(spacingPixels)) {
    throw new RangeError(`A distance of at least 0 pixels is needed, got ${spacingPixels}.`);
  }
  const kept: DrawnPoint[] = [];
  const nKept = wanted.map(() => 0);
  const nTooNear = wanted.map(() => 0);
  const grid = createPointGrid(spacingPixels);
  const keep = (point: DrawnPoint): void => {
    kept.push(point);
    nKept[point.stratum]++;
    grid.add(point);
  };
  const known = new Set(existing.map(keyOf));
  existing.forEach(keep);
  const inTurn = [...candidates].sort((a, b) => a.order - b.order || a.stratum - b.stratum);
  for (const point of inTurn) {
    if (nKept[point.stratum] >= wanted[point.stratum] || known.has(keyOf(point))) continue;
    if (spacingPixels > 0 && grid.hasNear(point)) nTooNear[point.stratum]++;
    else keep(point);
  }
  kept.sort((a, b) => a.stratum - b.stratum || a.order - b.order);
  const nLacking = wanted.map((n, h) => Math.max(0, n - nKept[h]));
  return { kept, nTooNear, nLacking, effect: spacingPixels > 0 ? SPACING_EFFECT : null };
}

function keyOf({ stratum, order }: DrawnPoint): string {
  return `${stratum}/${order}`;
}
