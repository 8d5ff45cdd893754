import type { Polygon } from '../../../../shared/contracts/geometry.ts';

/**
 * Outlines as SVG path data in one box, north up, one scale for both axes at the middle latitude.
 *
 * @returns null without any corner
 */
export function outlinePaths(
  outlines: readonly Polygon[],
  box: { width: number; height: number; margin: number },
): string[] | null {
  const corners = outlines.flatMap((outline) => outline.coordinates.flat());
  if (corners.length === 0) return null;
  const lons = corners.map(([lon]) => lon);
  const lats = corners.map(([, lat]) => lat);
  const [west, east] = [Math.min(...lons), Math.max(...lons)];
  const [south, north] = [Math.min(...lats), Math.max(...lats)];
  const lonScale = Math.cos((((south + north) / 2) * Math.PI) / 180);
  const widthDeg = Math.max((east - west) * lonScale, 1e-9);
  const heightDeg = Math.max(north - south, 1e-9);
  const scale = Math.min((box.width - 2 * box.margin) / widthDeg, (box.height - 2 * box.margin) / heightDeg);
  const left = (box.width - widthDeg * scale) / 2;
  const top = (box.height - heightDeg * scale) / 2;
  const print = ([lon, lat]: readonly [number, number]) =>
    `${(left + (lon - west) * lonScale * scale).toFixed(1)} ${(top + (north - lat) * scale).toFixed(1)}`;
  return outlines.map((outline) => outline.coordinates.map((ring) => `M${ring.map(print).join('L')}Z`).join(''));
}
