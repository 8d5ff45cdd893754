import { checkPolygonShape, type ShapeProblem } from '../analysis/sampling/polygon-shape.ts';
import { rasteriseMultiPolygon, rasterisePolygon } from '../analysis/sampling/rasterise-polygon.ts';
import type { ArealGeometry, Polygon } from '../../shared/contracts/geometry.ts';
import type { DrawingRefusal } from '../../shared/contracts/sample.ts';
import type { Scene } from '../entities/scene.ts';
import { toPixelPolygon, type PixelPolygon } from '../raster/pixel-polygon.ts';
import type { RasterGrid } from '../raster/raster-grid.ts';
import { getSceneGeometry, type SceneGeometry } from '../raster/tile-geometry.ts';
import { requireGrid } from './scenes.ts';

/** Pixels of the rectangle around a drawing; a training sample of more says nothing that a smaller one does not. */
const MAX_WINDOW_PIXELS = 1_000_000;

/** Pixels of the scene whose centre a drawing holds, or why it is refused; pixels without data are still among them. */
export type DrawnPixels =
  { refusal: DrawingRefusal; pixels: null } | { refusal: null; /** Flat indices, ascending. */ pixels: Uint32Array };

/** Finds what a drawing covers; a refusal is a result, not an exception. Checks come in the order a person would mend things. */
export function findDrawnPixels(scene: Scene, studyArea: ArealGeometry | null, drawing: Polygon): DrawnPixels {
  const shape = checkPolygonShape(drawing.coordinates);
  if (!shape.ok) return refuse(SHAPE_REFUSALS[shape.reason], shape.at);

  const { grid, crs } = requireGrid(scene);
  const geometry = getSceneGeometry(grid, crs);
  const outside = drawing.coordinates.flat().find((position) => !isInside(grid, geometry.toPixel(...position)));
  const rings = outside ? null : toPixelPolygon(drawing.coordinates, geometry);
  if (!rings) return refuse(OUTSIDE_SCENE, outside ?? drawing.coordinates[0]?.[0] ?? null);

  const window = findWindow(rings, grid);
  const nWindowPixels = window.width * window.height;
  const middle = middleOf(drawing);
  if (nWindowPixels > MAX_WINDOW_PIXELS) {
    return refuse({ ...TOO_LARGE, found: `a drawing ${window.width} × ${window.height} pixels across` }, middle);
  }
  const drawn = rasterisePolygon(shift(rings, window), window.width, window.height);
  if (drawn.length === 0) return refuse(NO_PIXEL, middle);
  const allowed = studyArea ? keepInside(drawn, studyArea, geometry, window) : drawn;
  if (allowed.length === 0) return refuse(OUTSIDE_STUDY_AREA, middle);
  return { refusal: null, pixels: toScenePixels(allowed, window, grid.width) };
}

/** The refusal of a drawing whose pixels all lack data. */
export function refuseWithoutData(drawing: Polygon, nPixels: number): DrawingRefusal {
  const found =
    nPixels === 1 ? 'one pixel, without data in every band' : `${nPixels} pixels, none with data in every band`;
  return { ...NO_PIXEL, found, at: middleOf(drawing), advice: 'Draw where every band of the scene has data.' };
}

type RefusalText = Omit<DrawingRefusal, 'at'>;

function refuse(text: RefusalText, at: readonly [number, number] | null): DrawnPixels {
  return { refusal: { ...text, at: at ? [at[0], at[1]] : null }, pixels: null };
}

const CROSSING: RefusalText = {
  reason: 'self-crossing',
  found: 'an outline that crosses or touches itself here',
  wanted: 'an outline that does not cross itself',
  advice: 'Move one of the corners beside this place.',
};
const SHAPE_REFUSALS: Record<ShapeProblem, RefusalText> = {
  'too-few-positions': {
    reason: 'too-few-positions',
    found: 'fewer than three corners',
    wanted: 'at least three corners',
    advice: 'Add a corner.',
  },
  'not-finite': {
    reason: 'too-few-positions',
    found: 'a corner that is no place on Earth',
    wanted: 'longitudes and latitudes in degrees',
    advice: 'Draw the outline again.',
  },
  'not-closed': {
    reason: 'not-closed',
    found: 'an outline that is not closed',
    wanted: 'a last position equal to the first',
    advice: 'Close the outline.',
  },
  'zero-area': {
    reason: 'no-area',
    found: 'corners that all lie on one line',
    wanted: 'an outline with an area',
    advice: 'Move a corner off the line.',
  },
  'self-crossing': CROSSING,
  'hole-crossing': { ...CROSSING, found: 'a hole that crosses or touches another ring here' },
  'hole-outside': { ...CROSSING, found: 'a hole outside the outline', wanted: 'holes inside the outline' },
  'too-intricate': {
    reason: 'too-large',
    found: 'too many long sides beside each other to check for crossings',
    wanted: 'an outline of a place',
    advice: 'Draw a simpler outline.',
  },
};
const OUTSIDE_SCENE: RefusalText = {
  reason: 'outside-scene',
  found: 'a corner outside the scene',
  wanted: 'all corners within the scene',
  advice: 'Move this corner into the scene.',
};
const OUTSIDE_STUDY_AREA: RefusalText = {
  reason: 'outside-study-area',
  found: 'no pixel centre within the study area',
  wanted: 'at least one pixel centre within the study area',
  advice: 'Draw within the study area’s outline.',
};
const NO_PIXEL: RefusalText = {
  reason: 'no-pixel',
  found: 'no pixel centre inside',
  wanted: 'at least one pixel centre inside, with data in every band',
  advice: 'Draw it larger: a pixel counts when its centre lies inside.',
};
const TOO_LARGE: RefusalText = {
  reason: 'too-large',
  found: '',
  wanted: 'at most a million pixels in the rectangle around it',
  advice: 'Draw several smaller samples.',
};

function isInside({ width, height }: RasterGrid, [column, row]: readonly [number, number]): boolean {
  return column >= 0 && column <= width && row >= 0 && row <= height;
}

function middleOf(drawing: Polygon): [number, number] {
  const ring = drawing.coordinates[0] ?? [];
  const lons = ring.map(([lon]) => lon);
  const lats = ring.map(([, lat]) => lat);
  const middle = (values: number[]) => (Math.min(...values) + Math.max(...values)) / 2;
  return [middle(lons), middle(lats)];
}

interface PixelWindow {
  x: number;
  y: number;
  width: number;
  height: number;
}

function findWindow(rings: PixelPolygon, grid: RasterGrid): PixelWindow {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [column, row] of rings.flat()) {
    left = Math.min(left, column);
    right = Math.max(right, column);
    top = Math.min(top, row);
    bottom = Math.max(bottom, row);
  }
  const x = Math.min(grid.width - 1, Math.max(0, Math.floor(left)));
  const y = Math.min(grid.height - 1, Math.max(0, Math.floor(top)));
  const width = Math.max(1, Math.min(grid.width, Math.ceil(right)) - x);
  const height = Math.max(1, Math.min(grid.height, Math.ceil(bottom)) - y);
  return { x, y, width, height };
}

function shift(rings: PixelPolygon, { x, y }: PixelWindow): PixelPolygon {
  return rings.map((ring) => ring.map(([column, row]) => [column - x, row - y] as const));
}

/** Of ascending pixels of a window, those whose centre lies within the study area. */
function keepInside(
  pixels: Uint32Array,
  studyArea: ArealGeometry,
  geometry: SceneGeometry,
  window: PixelWindow,
): Uint32Array {
  const polygons = studyArea.type === 'Polygon' ? [studyArea.coordinates] : studyArea.coordinates;
  const parts = polygons.flatMap((polygon) => {
    const rings = toPixelPolygon(polygon, geometry);
    return rings ? [shift(rings, window)] : [];
  });
  if (parts.length === 0) return new Uint32Array();
  const inside = new Uint8Array(window.width * window.height);
  for (const pixel of rasteriseMultiPolygon(parts, window.width, window.height)) inside[pixel] = 1;
  return pixels.filter((pixel) => inside[pixel] === 1);
}

function toScenePixels(pixels: Uint32Array, { x, y, width }: PixelWindow, sceneWidth: number): Uint32Array {
  return pixels.map((pixel) => (y + Math.floor(pixel / width)) * sceneWidth + x + (pixel % width));
}
