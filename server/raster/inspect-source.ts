import { stat } from 'node:fs/promises';
import { readGdalType, isRepresentable, type BandDtype } from './band-dtype.ts';
import { isFaultOfFile, requireLocalPath, runGdal } from './gdal-process.ts';
import type { RasterGrid } from './raster-grid.ts';
import { resolveCrs, type SourceCrs } from './resolve-crs.ts';
import { computeSceneExtent, type Footprint, type LonLatBounds } from './scene-extent.ts';
import { SourceRefusal } from './source-refusal.ts';

export interface SourceBand {
  /** 1-based, as GDAL counts. */
  index: number;
  dtype: BandDtype;
  /** The declared value for "no data", where it can occur in this type; may be NaN. */
  nodata: number | null;
  description: string;
  /** Physical value = DN × scale + offset. */
  scale: number;
  offset: number;
  colorInterp: string;
}

export interface SourceInfo {
  driver: string;
  width: number;
  height: number;
  transform: Pick<RasterGrid, 'originX' | 'originY' | 'pixelWidth' | 'pixelHeight'>;
  crs: SourceCrs;
  /** Every band that is imagery; an alpha band is left out and named by `maskKind`. */
  bands: SourceBand[];
  /** Where validity comes from besides nodata values. */
  maskKind: 'none' | 'alpha' | 'dataset';
  footprint: Footprint;
  bounds: LonLatBounds;
}

export interface SourceLimits {
  maxPixels: number;
  maxBands: number;
}

export const defaultSourceLimits: SourceLimits = { maxPixels: 250_000_000, maxBands: 64 };

/** The part of `gdalinfo -json` that is read. */
export interface GdalInfo {
  driverShortName?: string;
  size?: [number, number];
  coordinateSystem?: { wkt?: string };
  geoTransform?: [number, number, number, number, number, number];
  gcps?: unknown;
  bands?: GdalInfoBand[];
}

interface GdalInfoBand {
  band: number;
  type: string;
  colorInterpretation?: string;
  noDataValue?: number | string;
  description?: string;
  scale?: number;
  offset?: number;
  mask?: { flags?: string[] };
  metadata?: { IMAGE_STRUCTURE?: { PIXELTYPE?: string } };
}

/**
 * Reads what an uploaded file is, without reading its pixels.
 * @throws {SourceRefusal} when it can't become a scene.
 * @throws {GdalProcessError} when GDAL ran out of time or memory, or was cancelled.
 */
export async function inspectSource(
  path: string,
  options: { limits?: SourceLimits; signal?: AbortSignal; timeoutMs?: number } = {},
): Promise<SourceInfo> {
  const { limits = defaultSourceLimits, signal, timeoutMs = 60_000 } = options;
  const file = await stat(requireLocalPath(path));
  if (!file.isFile()) throw notARaster('something that is not a file');
  const info = await readGdalInfo(path, timeoutMs, signal);
  const checked = checkGdalInfo(info, limits);
  const grid = { width: checked.width, height: checked.height, ...checked.transform };
  const crs = await resolveCrs(checked.wkt, grid, signal);
  const { footprint, bounds } = computeExtentOrRefuse(grid, crs);
  const { driver, width, height, transform, bands, maskKind } = checked;
  return { driver, width, height, transform, crs, bands, maskKind, footprint, bounds };
}

async function readGdalInfo(path: string, timeoutMs: number, signal: AbortSignal | undefined): Promise<GdalInfo> {
  try {
    const { stdout } = await runGdal('gdalinfo', ['-json', '-norat', '-noct', path], {
      origin: 'upload',
      timeoutMs,
      signal,
    });
    // Older GDAL prints bare nan and inf, which are not JSON.
    const json = stdout.replace(/"(?:[^"\\]|\\.)*"|-?\b(?:nan|inf)\b/gi, (part) =>
      part.startsWith('"') ? part : `"${part}"`,
    );
    return JSON.parse(json) as GdalInfo;
  } catch (error) {
    if (isFaultOfFile(error)) {
      throw notARaster('a file that none of the allowed readers recognises');
    }
    throw error;
  }
}

function notARaster(found: string): SourceRefusal {
  return new SourceRefusal(
    'not-a-raster',
    found,
    'a GeoTIFF, a Cloud Optimized GeoTIFF or a JPEG 2000 image',
    'Check that the file is whole and of one of these formats; convert others with gdal_translate -of GTiff.',
  );
}

interface CheckedInfo extends Pick<SourceInfo, 'driver' | 'width' | 'height' | 'transform' | 'bands' | 'maskKind'> {
  wkt: string;
}

/**
 * Judges what gdalinfo found, cheapest and most telling reason first.
 * @throws {SourceRefusal}
 */
export function checkGdalInfo(info: GdalInfo, limits: SourceLimits): CheckedInfo {
  const [width, height] = info.size ?? [0, 0];
  const listed = info.bands ?? [];
  if (listed.length === 0) {
    throw new SourceRefusal(
      'no-bands',
      'no bands',
      'at least one band',
      'A file that only holds other data sets must be split first: gdal_translate one of them to its own GeoTIFF.',
    );
  }
  if (listed.length > limits.maxBands) {
    throw new SourceRefusal(
      'too-many-bands',
      `${listed.length} bands`,
      `at most ${limits.maxBands}`,
      'Pick the bands that matter with gdal_translate -b.',
    );
  }
  if (width * height > limits.maxPixels) {
    throw new SourceRefusal(
      'too-many-pixels',
      `${width} × ${height} = ${width * height} pixels`,
      `at most ${limits.maxPixels} pixels`,
      'Cut the file to the study area with gdal_translate -projwin.',
    );
  }
  const bands = listed.map(readBand);
  // Before the CRS, because ground control points carry their own.
  const transform = readTransform(info);
  const wkt = info.coordinateSystem?.wkt ?? '';
  if (wkt === '' || /^(ENGCRS|LOCAL_CS|ENGINEERINGCRS)\[/.test(wkt)) {
    throw new SourceRefusal(
      'no-crs',
      wkt === '' ? 'no coordinate reference system' : 'a local coordinate system without a place on Earth',
      'a coordinate reference system inside the file',
      'Assign the right one with gdal_translate -a_srs, for example -a_srs EPSG:32628.',
    );
  }
  const maskKind = listed.some((band) => band.colorInterpretation === 'Alpha')
    ? 'alpha'
    : listed.some((band) => band.mask?.flags?.includes('PER_DATASET') && !band.mask.flags.includes('NODATA'))
      ? 'dataset'
      : 'none';
  const imagery = bands.filter((band) => band.colorInterp !== 'Alpha');
  if (imagery.length === 0) {
    throw new SourceRefusal(
      'no-bands',
      'only an alpha band',
      'at least one band of imagery',
      'Upload the imagery itself.',
    );
  }
  return { driver: info.driverShortName ?? '', width, height, transform, bands: imagery, maskKind, wkt };
}

function readBand(band: GdalInfoBand): SourceBand {
  const isComplex = /^C(Int|Float)/.test(band.type);
  const dtype = readGdalType(band.type, band.metadata?.IMAGE_STRUCTURE?.PIXELTYPE);
  if (isComplex || dtype === null) {
    throw new SourceRefusal(
      isComplex ? 'complex' : 'unsupported-type',
      `band ${band.band} of type ${band.type}`,
      'real samples: 8-, 16- or 32-bit integers, or 32- or 64-bit floating point',
      isComplex
        ? 'Turn it into amplitude or intensity first.'
        : 'Convert it with gdal_translate -ot, for example -ot Int32.',
    );
  }
  const declared = band.noDataValue === undefined ? null : Number(band.noDataValue);
  // Number('nan') is NaN, which is the value meant.
  const nodata = declared !== null && isRepresentable(dtype, declared) ? declared : null;
  return {
    index: band.band,
    dtype,
    nodata: nodata !== null && dtype === 'float32' && Number.isFinite(nodata) ? Math.fround(nodata) : nodata,
    description: band.description ?? '',
    scale: band.scale ?? 1,
    offset: band.offset ?? 0,
    colorInterp: band.colorInterpretation ?? 'Undefined',
  };
}

function readTransform(info: GdalInfo): SourceInfo['transform'] {
  const geoTransform = info.geoTransform;
  if (geoTransform === undefined) {
    throw new SourceRefusal(
      'no-transform',
      info.gcps === undefined ? 'no georeferencing transform' : 'ground control points instead of a transform',
      'a transform from pixels to map coordinates inside the file',
      'Georeference it with gdalwarp, which writes a north-up grid; a world file beside the image is not read.',
    );
  }
  const [originX, pixelWidth, rowTurn, originY, colTurn, minusPixelHeight] = geoTransform;
  // Numbers that are none come as text.
  if (!geoTransform.every(Number.isFinite)) {
    throw new SourceRefusal(
      'no-transform',
      'a transform with numbers that are not finite',
      'a transform from pixels to map coordinates inside the file',
      'Assign the right one with gdal_translate -a_ullr.',
    );
  }
  const isTurned = rowTurn !== 0 || colTurn !== 0;
  if (isTurned || !(pixelWidth > 0) || !(minusPixelHeight < 0)) {
    throw new SourceRefusal(
      'rotated',
      isTurned ? 'a rotated or sheared grid' : 'a grid whose rows or columns run backwards',
      'a north-up grid',
      'Resample it with gdalwarp, which writes a north-up grid.',
    );
  }
  return { originX, originY, pixelWidth, pixelHeight: -minusPixelHeight };
}

function computeExtentOrRefuse(grid: RasterGrid, crs: SourceCrs): { footprint: Footprint; bounds: LonLatBounds } {
  try {
    return computeSceneExtent(grid, crs.proj4);
  } catch (error) {
    throw new SourceRefusal(
      'unsupported-crs',
      `a grid that leaves the domain of "${crs.name}" (${error instanceof Error ? error.message : String(error)})`,
      'a grid wholly within its projection',
      'Cut the file to the study area, or reproject it with gdalwarp.',
    );
  }
}
