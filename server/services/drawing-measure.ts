import type { ArealGeometry, Polygon } from '../../shared/contracts/geometry.ts';
import type { DrawingRefusal } from '../../shared/contracts/sample.ts';
import { ellipsoidalPolygonAreaM2 } from '../analysis/sampling/ellipsoidal-area.ts';
import type { App } from '../app-context.ts';
import type { Band } from '../entities/band.ts';
import type { Scene } from '../entities/scene.ts';
import { InvalidInput } from '../errors.ts';
import { readPixelFeatures } from '../raster/pixel-features.ts';
import { findDrawnPixels, refuseWithoutData } from './drawing-check.ts';
import { requireGrid } from './scenes.ts';

const M2_PER_HA = 10_000;

export interface BandSpectrum {
  band: Band;
  /** Of the scaled values; null where no pixel has data. Standard deviation with n in the denominator. */
  mean: number | null;
  standardDeviation: number | null;
}

/** What a drawing holds of a scene. */
export interface DrawingMeasure {
  refusal: DrawingRefusal | null;
  /** Pixels whose centre lies inside, and in the study area, and that have data in every band. */
  pixelCount: number;
  /** Pixels whose centre lies inside and that lack data in some band. */
  nodataPixels: number;
  /** Area of the drawn polygon on the ellipsoid, not of its pixels: it does not jump when a corner moves. */
  areaHa: number;
  spectrum: BandSpectrum[];
}

const NOTHING = { pixelCount: 0, nodataPixels: 0, areaHa: 0, spectrum: [] };

/** Measures a drawing on a scene that is ready. The drawing may be refused; that is part of the answer. */
export async function measureDrawing(
  app: App,
  scene: Scene,
  studyArea: ArealGeometry | null,
  drawing: Polygon,
): Promise<DrawingMeasure> {
  const { refusal, pixels } = findDrawnPixels(scene, studyArea, drawing);
  if (refusal) return { ...NOTHING, refusal };
  const { grid } = requireGrid(scene);
  const files = await Promise.all(
    scene.bands.map(async ({ fileKey }) => app.bands.open(await app.files.localPath(fileKey))),
  );
  const features = new Float32Array(pixels.length * files.length);
  const isValid = await readPixelFeatures(grid, files, pixels, { features, keep: true });
  const pixelCount = isValid.reduce((sum, valid) => sum + valid, 0);
  return {
    refusal: pixelCount === 0 ? refuseWithoutData(drawing, pixels.length) : null,
    pixelCount,
    nodataPixels: pixels.length - pixelCount,
    areaHa: ellipsoidalPolygonAreaM2(drawing.coordinates) / M2_PER_HA,
    spectrum: scene.bands.map((band, place) => ({
      band,
      ...summarise(band, features, isValid, place, files.length),
    })),
  };
}

function summarise(band: Band, features: Float32Array, isValid: Uint8Array, place: number, nBands: number) {
  let n = 0;
  let mean = 0;
  let squares = 0;
  // Running mean and squares (Welford 1962, Technometrics 4:419–420), so that large stored values keep their digits.
  for (let i = 0; i < isValid.length; i++) {
    if (!isValid[i]) continue;
    const value = features[i * nBands + place] ?? NaN;
    const delta = value - mean;
    mean += delta / ++n;
    squares += delta * (value - mean);
  }
  if (n === 0) return { mean: null, standardDeviation: null };
  return {
    mean: mean * band.scale + band.offset,
    standardDeviation: Math.sqrt(squares / n) * Math.abs(band.scale),
  };
}

/** Measures a drawing that is to be stored. @throws InvalidInput `drawing-refused` with the reason and the place */
export async function requireDrawing(
  app: App,
  scene: Scene,
  studyArea: ArealGeometry | null,
  drawing: Polygon,
): Promise<Pick<DrawingMeasure, 'pixelCount' | 'areaHa'>> {
  const { refusal, pixelCount, areaHa } = await measureDrawing(app, scene, studyArea, drawing);
  if (refusal) {
    const { found, wanted, advice, at, reason } = refusal;
    throw new InvalidInput(
      'The drawing cannot be a sample.',
      { found, wanted, advice, ...(at ? { at } : {}), errors: [{ path: 'geometry', message: reason }] },
      'drawing-refused',
    );
  }
  return { pixelCount, areaHa };
}
