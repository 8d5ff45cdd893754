import { findRingCrossing } from '../analysis/sampling/polygon-shape.ts';
import type { ArealGeometry } from '../../shared/contracts/geometry.ts';
import { InvalidInput } from '../errors.ts';

/** Refuses a study area that is not closed or crosses itself. @throws InvalidInput saying where */
export function checkStudyArea(geometry: ArealGeometry): void {
  const polygons = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates;
  for (const ring of polygons.flat()) {
    const first = ring[0];
    const last = ring.at(-1);
    if (first?.[0] !== last?.[0] || first?.[1] !== last?.[1]) {
      throw new InvalidInput('The study area is not closed.', {
        found: 'a ring whose last position is not its first',
        wanted: 'closed rings',
        advice: 'Close the ring and send again.',
      });
    }
  }
  for (const polygon of polygons) {
    const crossing = findRingCrossing(polygon);
    if (crossing === 'too-intricate') {
      throw new InvalidInput('The study area is too intricate.', {
        found: 'too many long sides beside each other to check for crossings',
        wanted: 'an outline of a place',
        advice: 'Simplify the outline and send again.',
      });
    }
    if (crossing) {
      const [lon, lat] = crossing.at;
      throw new InvalidInput('The study area crosses itself.', {
        found: `a crossing at ${lat.toFixed(5)}, ${lon.toFixed(5)}`,
        wanted: 'rings that do not cross or touch themselves or each other',
        advice: 'Mend the outline there and send again.',
        at: [lon, lat],
      });
    }
  }
}
