import { useQueries } from '@tanstack/react-query';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import type { BandLimits } from '../../lib/scene-view.ts';
import { placeMeasureQuery } from './place-measure.ts';

/** Sides of the window the colours are stretched to, in sides of the 5 × 5 outline: 35 × 35 pixels. */
const WINDOW = 7;
/** Holds about 95 % of what is around where its values are spread like a normal law. */
const SPREAD = 2;

/**
 * Stretch limits of each scene from what lies around a place, by scene; a scene is missing while it is read, and where
 * nothing can be read (the whole scene's limits then stand).
 */
export function useLocalLimits(
  projectId: string,
  scenes: readonly Scene[],
  outline5: Polygon,
  isOn: boolean,
): ReadonlyMap<string, BandLimits> {
  const window = enlarge(outline5, WINDOW);
  const measured = useQueries({
    queries: scenes.map((scene) => ({ ...placeMeasureQuery(projectId, scene, window), enabled: isOn })),
  });
  const limits = new Map<string, BandLimits>();
  if (!isOn) return limits;
  scenes.forEach((scene, place) => {
    const spectrum = measured[place]?.data?.spectrum;
    if (!spectrum) return;
    const byBand: Record<number, { low: number; high: number }> = {};
    for (const { number, mean, standardDeviation } of spectrum) {
      const band = scene.bands.find((one) => one.number === number);
      if (!band || mean === null || !standardDeviation || band.scale === 0) continue;
      const ends = [mean - SPREAD * standardDeviation, mean + SPREAD * standardDeviation]
        .map((value) => (value - band.offset) / band.scale)
        .toSorted((a, b) => a - b);
      byBand[number] = { low: ends[0] ?? 0, high: ends[1] ?? 1 };
    }
    limits.set(scene.id, byBand);
  });
  return limits;
}

/** The outline, so many times as large about its middle, in degrees. */
function enlarge(outline: Polygon, times: number): Polygon {
  const [ring = []] = outline.coordinates;
  const middle = (axis: 0 | 1) => {
    const values = ring.map((position) => position[axis]);
    return (Math.min(...values) + Math.max(...values)) / 2;
  };
  const [lon0, lat0] = [middle(0), middle(1)];
  const round = (degrees: number) => Number(degrees.toFixed(9));
  return {
    type: 'Polygon',
    coordinates: [ring.map(([lon, lat]) => [round(lon0 + (lon - lon0) * times), round(lat0 + (lat - lat0) * times)])],
  };
}
