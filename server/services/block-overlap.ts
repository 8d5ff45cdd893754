import { area, bboxPolygon, bbox, booleanDisjoint, featureCollection, intersect, polygon } from '@turf/turf';
import type { Polygon } from '../../shared/contracts/geometry.ts';

/** Shared edges may cross by the rounding of degrees: that much is no overlap, m². */
const SLIVER_M2 = 100;

/** The first of the blocks that shares ground with an outline. */
export function findBlockOverlap<T extends { geometry: Polygon }>(outline: Polygon, blocks: readonly T[]): T | null {
  const drawn = polygon(outline.coordinates);
  const box = bboxPolygon(bbox(drawn));
  for (const block of blocks) {
    const other = polygon(block.geometry.coordinates);
    if (booleanDisjoint(box, bboxPolygon(bbox(other)))) continue;
    const shared = intersect(featureCollection([drawn, other]));
    if (shared && area(shared) > SLIVER_M2) return block;
  }
  return null;
}
