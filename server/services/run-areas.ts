import { ellipsoidalPolygonAreaM2, truePixelAreaM2 } from '../analysis/sampling/ellipsoidal-area.ts';
import proj4 from 'proj4';
import { getCrsTransform } from '../raster/crs-transform.ts';
import { pixelToMap } from '../raster/raster-grid.ts';
import type { PlacedScene } from './run-scene.ts';

/** Beyond this, a projection's own square metres are not areas on the ground (Web Mercator is 3 times too large at 55°). */
const MAX_DISTORTION = 0.01;

export interface PixelAreas {
  /** Area of a pixel of each row, m². */
  rowAreaM2: Float64Array;
  /** How it was worked out, for the reader of the figures. */
  method: string;
}

/**
 * Area of a pixel of each row of a scene: the grid's own where its projection keeps areas to within 1 % at the scene's
 * centre, as in UTM; otherwise the true area on the WGS 84 ellipsoid of the row's middle pixel.
 */
export function measurePixelAreas(placed: PlacedScene): PixelAreas {
  const { grid, proj4: projString } = placed;
  const transform = getCrsTransform(projString);
  const middleColumn = Math.floor(grid.width / 2);
  const trueArea = (row: number): number => {
    const offsets = [
      [0, 0],
      [0, 1],
      [1, 1],
      [1, 0],
    ] as const;
    const corners = offsets.map(([right, down]) => {
      const [x, y] = pixelToMap(grid, middleColumn + right, row + down);
      return transform.isGeographic ? ([x, y] as [number, number]) : transform.toLonLat(x, y);
    });
    const first = corners[0] as [number, number];
    return transform.isGeographic ? ellipsoidalPolygonAreaM2([[...corners, first]]) : truePixelAreaM2(corners);
  };
  const rowAreaM2 = new Float64Array(grid.height);
  if (!transform.isGeographic) {
    const metersPerUnit = (new proj4.Proj(projString) as { to_meter?: number }).to_meter ?? 1;
    const gridArea = grid.pixelWidth * grid.pixelHeight * metersPerUnit ** 2;
    const distortion = Math.abs(gridArea / trueArea(Math.floor(grid.height / 2)) - 1);
    if (distortion <= MAX_DISTORTION) {
      const percent = (distortion * 100).toFixed(2);
      return {
        rowAreaM2: rowAreaM2.fill(gridArea),
        method: `Areas are pixels × the grid’s pixel area, ${formatArea(gridArea)} m²; at the scene’s centre this is within ${percent} % of the area on the ellipsoid.`,
      };
    }
  }
  for (let row = 0; row < grid.height; row++) rowAreaM2[row] = trueArea(row);
  return {
    rowAreaM2,
    method: transform.isGeographic
      ? 'Areas are pixels × their true area on the WGS 84 ellipsoid, row by row.'
      : 'The projection distorts areas by more than 1 % here, so areas are pixels × the true area on the WGS 84 ellipsoid of the middle pixel of their row.',
  };
}

function formatArea(areaM2: number): string {
  return areaM2 >= 1 ? String(Number(areaM2.toPrecision(9))) : areaM2.toExponential(4);
}
